import { LEAST_CHANGE_WITHIN_RUN } from "./constants";

/**
 * r of a power law: ln k and every free order whose reactant hardly changes while a run lasts, so that only
 * differences between runs, which scatter, determine it. m − r are the degrees of freedom of the intervals.
 *
 * `changes`: of every species with a free order, the relative change |c_end − c_0|/c_0 in each run. The median run
 * decides: one run that was followed to its end cannot carry an order alone.
 */
export function parametersLeftToRuns(changes: readonly (readonly number[])[]): number {
  return 1 + changes.filter((runs) => medianOf(runs) < LEAST_CHANGE_WITHIN_RUN).length;
}

function medianOf(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  const upper = sorted[middle] ?? 0;
  return sorted.length % 2 === 1 ? upper : ((sorted[middle - 1] ?? 0) + upper) / 2;
}
