import type { FittedLaw } from "kinetics-core/prediction";
import { type Flag, inARow, numberInWords } from "kinetics-core/quantities";
import { type FeasibleSet, isFeasible, type Recipe, recipeGrid, refineRecipe } from "./feasible-set";
import { cautionsOf } from "./planning-cautions";
import {
  type Design,
  designOf,
  gradientAt,
  leverageOf,
  parameterNames,
  spread,
  standardErrorsOf,
  withRun,
} from "./run-information";

export interface NextRunRequest {
  /** Law in force; its parameters need not be known well, only roughly where they are. */
  readonly law: FittedLaw;
  /** Recipes of the runs that count already. */
  readonly made: readonly Recipe[];
  readonly feasible: FeasibleSet;
  /** s: standard deviation of ln v of one run, scatter between runs and its own error. */
  readonly scatter: number;
  /**
   * `all`: the run that shrinks the joint confidence region of ln k and parameters most (D-optimal). A parameter's
   * name ("n_A", "ln k"): the one that brings its own standard error down most, which tells its order from the others.
   */
  readonly aim?: "all" | { readonly parameter: string };
  /** How many runs to plan, one after another; default 1. */
  readonly count?: number;
  /** Recipes to choose among besides the grid; those that are not feasible are left out. */
  readonly candidates?: readonly Recipe[];
}

export interface PlannedRun {
  readonly recipe: Recipe;
  /** Factor by which this run shrinks the volume of the joint region: √(1 + gᵀCg). */
  readonly regionFactor: number;
  /** By name, "ln k" and the parameters; null where it stays open. */
  readonly standardErrorsBefore: Readonly<Record<string, number | null>>;
  readonly standardErrorsAfter: Readonly<Record<string, number | null>>;
}

export type NextRunResult =
  | { readonly status: "planned"; readonly runs: readonly PlannedRun[]; readonly flags: readonly Flag[] }
  | { readonly status: "bad-input" | "nothing-feasible"; readonly place: string; readonly message: string };

/**
 * The next run or runs. |M + g gᵀ/s²| = |M| (1 + gᵀ C g), so the D-optimal next run is where ln v is predicted worst
 * (Fedorov, Theory of Optimal Experiments (1972), 2.5; the greedy sequence is his first-order one). For one parameter
 * the variance becomes C_ii − (C g)_i²/(1 + gᵀ C g). A grid over the feasible set is searched, then refined in ln c.
 */
export function nextRuns(request: NextRunRequest): NextRunResult {
  const { law, made, feasible, scatter, aim = "all", count = 1, candidates = [] } = request;
  const names = parameterNames(law);
  const target = aim === "all" ? -1 : names.indexOf(aim.parameter);
  const fault = faultOf(request, names, target);
  if (fault !== null) return fault;
  const gradient = gradientAt(law);
  const grid = [...recipeGrid(feasible), ...candidates.filter((recipe) => isFeasible(feasible, recipe))];
  let design = designOf(law, made);
  const runs: PlannedRun[] = [];
  for (let i = 0; i < count; i++) {
    const current = design;
    const score = (recipe: Recipe) => scoreOf(current, gradient(recipe), target);
    const recipe = bestOf(feasible, grid, score);
    const row = recipe === null ? null : gradient(recipe);
    if (recipe === null || row === null) return noneUsable(law);
    design = withRun(current, row);
    runs.push({
      recipe,
      regionFactor: Math.sqrt(1 + leverageOf(row, spread(current.covariance, row))),
      standardErrorsBefore: standardErrorsOf(current, scatter),
      standardErrorsAfter: standardErrorsOf(design, scatter),
    });
  }
  return {
    status: "planned",
    runs,
    flags: cautionsOf(
      law,
      runs.map((run) => run.recipe),
    ),
  };
}

/** The best of a grid, refined; null where the law gives no rate anywhere. */
export function bestOf(
  feasible: FeasibleSet,
  grid: readonly Recipe[],
  score: (recipe: Recipe) => number | null,
): Recipe | null {
  let best: { recipe: Recipe; score: number } | null = null;
  for (const recipe of grid) {
    const value = score(recipe);
    if (value !== null && (best === null || value > best.score)) best = { recipe, score: value };
  }
  return best === null ? null : refineRecipe(feasible, best.recipe, score).recipe;
}

function scoreOf(design: Design, gradient: Float64Array | null, target: number): number | null {
  if (gradient === null) return null;
  const spreadOut = spread(design.covariance, gradient);
  const leverage = leverageOf(gradient, spreadOut);
  return target < 0 ? leverage : (spreadOut[target] ?? Number.NaN) ** 2 / (1 + leverage);
}

type Fault = Exclude<NextRunResult, { readonly status: "planned" }>;

function faultOf(
  { law, feasible, scatter, aim = "all", count = 1 }: NextRunRequest,
  names: readonly string[],
  target: number,
): Fault | null {
  const bad = (place: string, message: string): Fault => ({ status: "bad-input", place, message });
  if (aim !== "all" && target < 0)
    return bad("aim", `${aim.parameter} is not a parameter of the law; it has ${inARow(names)}.`);
  if (!(scatter > 0) || !Number.isFinite(scatter))
    return bad("scatter", `The scatter of ln v is ${scatter}; it must be above 0, for example 0.03 for 3 %.`);
  if (!(Number.isInteger(count) && count >= 1 && count <= 50))
    return bad("count", `${numberInWords(count)} runs were asked for; between 1 and 50 can be planned.`);
  const missing = law.equation.species.filter((name) => feasible.ranges[name] === undefined);
  return missing.length === 0
    ? null
    : bad(
        `feasible.ranges.${missing[0]}`,
        `There is no range of concentrations for ${inARow(missing)}; give one, or one value twice.`,
      );
}

function noneUsable(law: FittedLaw): Fault {
  return {
    status: "nothing-feasible",
    place: "feasible",
    message: `The law “${law.equation.law}” gives no rate above 0 in any feasible mixture. Widen the ranges.`,
  };
}
