import type { RateLawInput, RateLawRun, SharedUncertainty } from "kinetics-core/rate-law";

/** Runs with a known law and known errors, to test coverage with. Same seed, same runs. */
export interface Scenario {
  readonly species: readonly string[];
  readonly orders: readonly number[];
  readonly rateConstant: number;
  /** Set concentrations, run by run. */
  readonly recipes: readonly (readonly number[])[];
  /** Standard deviation of ln v between runs. */
  readonly scatter: number;
  /** Relative standard error of each run's rate at its true value; stated as an absolute error. */
  readonly rateErrors: readonly number[];
  /** Relative standard deviation of every concentration, private to the run (pipetting). */
  readonly pipetting?: number;
  readonly shared?: readonly SharedUncertainty[];
  readonly blocks?: readonly string[];
  readonly blockScatter?: number;
}

/** `deviate`: standard normal. */
export function simulateRuns(scenario: Scenario, deviate: () => number): RateLawInput {
  const { species, orders, pipetting = 0, shared = [] } = scenario;
  const blockErrors = new Map<string, number>();
  for (const block of scenario.blocks ?? [])
    if (!blockErrors.has(block)) blockErrors.set(block, (scenario.blockScatter ?? 0) * deviate());
  const sharedErrors = shared.map((one) => one.relative * deviate());
  const runs = scenario.recipes.map((recipe, j): RateLawRun => {
    const label = labelOf(j);
    const block = scenario.blocks?.[j];
    let logarithm =
      Math.log(scenario.rateConstant) +
      scenario.scatter * deviate() +
      (block === undefined ? 0 : (blockErrors.get(block) ?? 0));
    species.forEach((name, i) => {
      const touched = shared.reduce(
        (sum, one, k) =>
          one.species.includes(name) && (one.runs?.includes(label) ?? true)
            ? sum + (sharedErrors[k] ?? 0)
            : sum,
        0,
      );
      // What was set is not quite what was in the vessel.
      logarithm += (orders[i] ?? 0) * (Math.log(recipe[i] ?? 1) + pipetting * deviate() + touched);
    });
    shared.forEach((one, k) => {
      if (one.onRate === true && (one.runs?.includes(label) ?? true)) logarithm += sharedErrors[k] ?? 0;
    });
    const truth = Math.exp(logarithm);
    const error = (scenario.rateErrors[j] ?? 0) * truth;
    return {
      label,
      concentrations: Object.fromEntries(species.map((name, i) => [name, recipe[i] ?? 0])),
      rate: truth + error * deviate(),
      ...(error > 0 ? { rateStandardError: error } : {}),
      ...(pipetting > 0
        ? { relativeUncertainty: Object.fromEntries(species.map((name) => [name, pipetting])) }
        : {}),
      ...(block === undefined ? {} : { block }),
    };
  });
  return { species, runs, shared };
}

export function labelOf(run: number): string {
  return `R${String(run + 1).padStart(2, "0")}`;
}

/** Nine runs of a study to test with: two series, a repeat of the base recipe, and a run off both series. */
export const nineRecipes = [
  [0.01, 0.02],
  [0.02, 0.02],
  [0.04, 0.02],
  [0.08, 0.02],
  [0.02, 0.01],
  [0.02, 0.04],
  [0.02, 0.08],
  [0.02, 0.02],
  [0.05, 0.05],
] as const;
export const nineRuns: Scenario = {
  species: ["A", "B"],
  orders: [1, 2],
  rateConstant: 11.8,
  recipes: nineRecipes,
  scatter: 0.02,
  rateErrors: nineRecipes.map((_, j) => 0.005 + 0.003 * (j % 4)),
  pipetting: 0.004,
};
