import { fSurvival } from "kinetics-core/distributions";
import type { LackOfFitTest } from "./candidate";
import { EXACT_RELATIVE, SAME_CONCENTRATION } from "./constants";

/**
 * F-test of a law against the scatter of repeated recipes, with the common weights. Null without repeats, where repeats
 * agree to the last digit, or with as many parameters as recipes. `recipes`: concentrations of every run in one order of species.
 */
export function replicateLackOfFit(
  recipes: readonly (readonly number[])[],
  residuals: readonly number[],
  weights: readonly number[],
  parameters: number,
): LackOfFitTest | null {
  const groups = groupsOf(recipes);
  const pureFreedom = recipes.length - groups.length;
  const lackFreedom = groups.length - parameters;
  if (pureFreedom < 1 || lackFreedom < 1) return null;
  let pure = 0;
  let total = 0;
  let weightOfAll = 0;
  for (const members of groups) {
    const weight = members.reduce((sum, j) => sum + (weights[j] ?? 0), 0);
    const centre = members.reduce((sum, j) => sum + (weights[j] ?? 0) * (residuals[j] ?? 0), 0) / weight;
    for (const j of members) {
      pure += (weights[j] ?? 0) * ((residuals[j] ?? 0) - centre) ** 2;
      total += (weights[j] ?? 0) * (residuals[j] ?? 0) ** 2;
      weightOfAll += weights[j] ?? 0;
    }
  }
  // Rates entered twice differ by nothing: they are one reading, and no replicates.
  if (!(pure > EXACT_RELATIVE ** 2 * weightOfAll)) return null;
  const fStatistic = Math.max(0, total - pure) / lackFreedom / (pure / pureFreedom);
  if (!Number.isFinite(fStatistic)) return null;
  return {
    fStatistic,
    degreesOfFreedom: [lackFreedom, pureFreedom],
    pValue: fSurvival(fStatistic, lackFreedom, pureFreedom),
  };
}

/** Indices of the runs of each recipe. */
function groupsOf(recipes: readonly (readonly number[])[]): readonly (readonly number[])[] {
  const groups: number[][] = [];
  recipes.forEach((recipe, j) => {
    const group = groups.find((members) => sameRecipe(recipes[members[0] ?? 0] ?? [], recipe));
    if (group === undefined) groups.push([j]);
    else group.push(j);
  });
  return groups;
}

function sameRecipe(a: readonly number[], b: readonly number[]): boolean {
  return a.every((value, i) => {
    const other = b[i] ?? 0;
    return Math.abs(value - other) <= SAME_CONCENTRATION * Math.max(Math.abs(value), Math.abs(other));
  });
}
