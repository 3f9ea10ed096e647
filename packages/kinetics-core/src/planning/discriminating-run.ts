import { studentTFactor, studentTQuantile } from "kinetics-core/distributions";
import { type FittedLaw, predictRate } from "kinetics-core/prediction";
import { type Flag, percent } from "kinetics-core/quantities";
import { type FeasibleSet, isFeasible, type Recipe, recipeGrid } from "./feasible-set";
import { bestOf } from "./next-run";
import { cautionsOf } from "./planning-cautions";

export interface DiscriminationRequest {
  /** The two leading candidates, each as fitted to the same runs. */
  readonly first: FittedLaw;
  readonly second: FittedLaw;
  /** Ranges of every species that either law contains. */
  readonly feasible: FeasibleSet;
  /** s: standard deviation of ln v of one run. */
  readonly scatter: number;
  readonly candidates?: readonly Recipe[];
}

export interface DiscriminatingRun {
  readonly status: "planned";
  readonly recipe: Recipe;
  /** v of the first law over v of the second there. */
  readonly ratio: number;
  /** |Δ ln v| over its standard deviation in one run: scatter and both laws' own uncertainty. */
  readonly separation: number;
  /**
   * Runs of this recipe that tell the laws apart at the level of the first, four times in five; null where not even
   * many would, since what blurs the difference is the uncertainty of the laws and not scatter.
   */
  readonly runsNeeded: number | null;
  readonly flags: readonly Flag[];
}

export type DiscriminationResult =
  | DiscriminatingRun
  | { readonly status: "nothing-feasible" | "not-told-apart" | "bad-input"; readonly message: string };

/** How often the difference shall be found. */
const POWER = 0.8;
/** Below this the laws agree to rounding everywhere: they are one law there. */
const SAME_RATE = 1e-6;
const MOST_RUNS = 100;

/**
 * The run in which two candidates differ most: with both as fitted, Δ = ln v₁ − ln v₂ there, and the T-optimal next run
 * maximises Δ² (Atkinson and Fedorov, Biometrika 62 (1975) 57-70), here over s² + u₁² + u₂², as what a run can show is
 * blurred by its scatter and by both predictions (Box and Hill, Technometrics 9 (1967) 57-71). Runs needed:
 * m ≥ (z_level + z_power)² s²/(Δ² − (z_level + z_power)²(u₁² + u₂²)).
 */
export function discriminatingRun(request: DiscriminationRequest): DiscriminationResult {
  const { first, second, feasible, scatter, candidates = [] } = request;
  if (!(scatter > 0) || !Number.isFinite(scatter))
    return {
      status: "bad-input",
      message: `The scatter of ln v is ${scatter}; it must be above 0, for example 0.03 for 3 %.`,
    };
  const compare = comparison(first, second);
  const score = (recipe: Recipe) => {
    const pair = compare(recipe);
    return pair === null ? null : pair.difference ** 2 / (scatter ** 2 + pair.variance);
  };
  const usable = candidates.filter((recipe) => isFeasible(feasible, recipe));
  const recipe = bestOf(feasible, [...recipeGrid(feasible), ...usable], score);
  const pair = recipe === null ? null : compare(recipe);
  if (recipe === null || pair === null)
    return {
      status: "nothing-feasible",
      message: `No feasible mixture gives a rate above 0 by both “${first.equation.law}” and “${second.equation.law}”. Widen the ranges.`,
    };
  if (Math.abs(pair.difference) < SAME_RATE)
    return {
      status: "not-told-apart",
      message: `Within these ranges “${first.equation.law}” and “${second.equation.law}” give the same rates, so no run there tells them apart. Widen the ranges, or add a product at the start.`,
    };
  return {
    status: "planned",
    recipe,
    ratio: Math.exp(pair.difference),
    separation: Math.abs(pair.difference) / Math.sqrt(scatter ** 2 + pair.variance),
    runsNeeded: runsNeeded(pair, scatter, first.level),
    flags: [...cautionsOf(first, [recipe]), ...smallDifference(pair.difference, scatter)],
  };
}

interface Pair {
  readonly difference: number;
  /** u₁² + u₂². */
  readonly variance: number;
}

function comparison(first: FittedLaw, second: FittedLaw): (recipe: Recipe) => Pair | null {
  return (recipe) => {
    const one = predictRate(first, recipe);
    const other = predictRate(second, recipe);
    if (one.status !== "predicted" || other.status !== "predicted") return null;
    return {
      difference: one.logRate.logarithm - other.logRate.logarithm,
      variance: (one.logRate.variance ?? 0) + (other.logRate.variance ?? 0),
    };
  };
}

function runsNeeded({ difference, variance }: Pair, scatter: number, level: number): number | null {
  const wanted =
    (studentTFactor(level, Number.POSITIVE_INFINITY) + studentTQuantile(POWER, Number.POSITIVE_INFINITY)) **
    2;
  const room = difference ** 2 - wanted * variance;
  if (!(room > 0)) return null;
  const runs = Math.ceil((wanted * scatter ** 2) / room);
  return runs <= MOST_RUNS ? runs : null;
}

function smallDifference(difference: number, scatter: number): readonly Flag[] {
  const size = Math.abs(difference);
  if (size >= scatter) return [];
  return [
    {
      code: "laws-hardly-differ",
      severity: "weakens",
      message: `Even where they differ most within these ranges, the two laws are ${percent(Math.expm1(size))} apart in rate, less than one run scatters (${percent(scatter)}). Wider ranges would help more than repeats.`,
    },
  ];
}
