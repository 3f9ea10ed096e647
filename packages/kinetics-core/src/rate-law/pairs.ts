import { type Estimate, estimateOf, type Flag } from "kinetics-core/quantities";
import { SAME_CONCENTRATION, sameConcentration, type UsableRun } from "./usable-runs";

/**
 * The table that people check by hand: every pair of runs that differ in one concentration only, with
 *     order = ln(v₂/v₁)/ln(c₂/c₁)
 * and its standard uncertainty from the stated errors of the two rates and of all concentrations (an error in another
 * species counts with that species' fitted order). Known errors, so a normal interval; none without stated errors.
 */
export interface PairOrder {
  readonly runs: readonly [string, string];
  readonly species: string;
  readonly order: Estimate;
}

/** A study of hundreds of runs has more pairs than anybody reads. */
const MOST_PAIRS = 1000;

export function pairOrders(
  runs: readonly UsableRun[],
  species: readonly string[],
  orders: readonly number[],
  level: number,
): { readonly pairs: readonly PairOrder[]; readonly flags: readonly Flag[] } {
  const pairs: PairOrder[] = [];
  let left = 0;
  species.forEach((name, i) => {
    for (const group of groupsThatShareOthers(runs, i)) {
      group.forEach((first, a) => {
        for (const second of group.slice(a + 1)) {
          if (sameConcentration(first.concentrations[i] ?? 0, second.concentrations[i] ?? 0)) continue;
          if (pairs.length >= MOST_PAIRS) left += 1;
          else
            pairs.push({
              runs: [first.label, second.label],
              species: name,
              order: orderOf(first, second, i, orders, level),
            });
        }
      });
    }
  });
  const flags: readonly Flag[] =
    left === 0
      ? []
      : [
          {
            code: "pairs-shortened",
            severity: "note",
            message: `The pairwise table holds the first ${MOST_PAIRS} pairs of runs; ${left} more differ in one concentration only.`,
          },
        ];
  return { pairs, flags };
}

function orderOf(
  first: UsableRun,
  second: UsableRun,
  species: number,
  orders: readonly number[],
  level: number,
): Estimate {
  const ratio = Math.log((second.concentrations[species] ?? 1) / (first.concentrations[species] ?? 1));
  const order = Math.log(second.rate / first.rate) / ratio;
  let variance = 0;
  for (const run of [first, second]) {
    variance += (run.rateError / run.rate) ** 2;
    run.privateErrors.forEach((error, i) => {
      variance += ((i === species ? order : (orders[i] ?? 0)) * error) ** 2;
    });
  }
  const error = variance > 0 ? Math.sqrt(variance) / Math.abs(ratio) : null;
  return estimateOf(order, error, Number.POSITIVE_INFINITY, level);
}

/** Runs with a positive rate in groups that agree in every concentration but one, each in the order of the runs. */
function groupsThatShareOthers(
  runs: readonly UsableRun[],
  species: number,
): readonly (readonly UsableRun[])[] {
  const eligible = runs.filter((run) => run.rate > 0 && (run.concentrations[species] ?? 0) > 0);
  return groupsByRecipe(eligible, (run) => run.concentrations.filter((_, i) => i !== species));
}

/** Runs that agree in the given concentrations to within rounding, found by sorting rather than by comparing all pairs. */
export function groupsByRecipe(
  runs: readonly UsableRun[],
  recipe: (run: UsableRun) => readonly number[],
): readonly (readonly UsableRun[])[] {
  let groups: readonly (readonly UsableRun[])[] = [runs];
  const width = runs[0] === undefined ? 0 : recipe(runs[0]).length;
  for (let i = 0; i < width; i++)
    groups = groups.flatMap((group) => splitBy(group, (run) => recipe(run)[i] ?? 0));
  const place = new Map(runs.map((run, j) => [run, j]));
  const position = (run: UsableRun | undefined) => (run === undefined ? 0 : (place.get(run) ?? 0));
  return groups
    .map((group) => [...group].sort((a, b) => position(a) - position(b)))
    .sort((a, b) => position(a[0]) - position(b[0]));
}

function splitBy(
  group: readonly UsableRun[],
  value: (run: UsableRun) => number,
): readonly (readonly UsableRun[])[] {
  const sorted = [...group].sort((a, b) => value(a) - value(b));
  const parts: UsableRun[][] = [];
  for (const run of sorted) {
    const part = parts.at(-1);
    const start = part?.[0];
    if (
      part !== undefined &&
      start !== undefined &&
      value(run) - value(start) <= SAME_CONCENTRATION * Math.abs(value(run))
    )
      part.push(run);
    else parts.push([run]);
  }
  return parts;
}
