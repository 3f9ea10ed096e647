import { studentTFactor } from "kinetics-core/distributions";
import { fitNonlinear } from "./fit-nonlinear";
import type { NonlinearProblem, NonlinearSolution } from "./nonlinear-problem";
import { standardErrorsOf } from "./solution-uncertainty";

/** One end of a profile interval. */
export interface ProfileEnd {
  /** Where the profile crosses the limit, or the bound that it meets before; null where there is no end. */
  readonly at: number | null;
  /**
   * "crossed": the sum of squares rises to the limit there. "bound": the parameter's own bound comes first. "open": it
   * never rises that far. "failed": a refit with the parameter held did not settle.
   */
  readonly kind: "crossed" | "bound" | "open" | "failed";
}

export interface ProfileInterval {
  readonly low: ProfileEnd;
  readonly high: ProfileEnd;
  /** Both ends; null unless the interval closes on both sides. */
  readonly interval: readonly [number, number] | null;
}

/**
 * Profile-t interval of one parameter: all values θ_p for which
 *
 *   τ(θ_p) = √((S(θ_p) − S_min)/s²) ≤ t(level, m − n),
 *
 * S(θ_p) the least sum of squares with θ_p held and all others refitted (Bates and Watts, Nonlinear Regression
 * Analysis, 1988, chapter 6). It follows the model where the symmetric interval only follows its tangent, does not depend
 * on how the other parameters are written, and says so where the data set no end.
 *
 * @param solution of `problem`, converged. Null where it has no degree of freedom, no covariance or no scatter, where the
 * parameter is fixed, and where a refit finds a smaller sum of squares, so that the solution was not the least.
 */
export function profileInterval(
  problem: NonlinearProblem,
  solution: NonlinearSolution,
  parameter: number,
  level = 0.95,
): ProfileInterval | null {
  const errors = standardErrorsOf(solution);
  const error = errors?.[parameter] ?? 0;
  const scatter = solution.residualStandardDeviation ?? 0;
  if (!(error > 0 && scatter > 0)) return null;
  const limit = studentTFactor(level, solution.degreesOfFreedom);
  const profile: Profile = { problem, solution, parameter, error, scatter, limit };
  const low = endOf(profile, -1);
  const high = low === null ? null : endOf(profile, 1);
  if (low === null || high === null) return null;
  const closed = low.at !== null && high.at !== null;
  return { low, high, interval: closed ? [low.at, high.at] : null };
}

interface Profile {
  readonly problem: NonlinearProblem;
  readonly solution: NonlinearSolution;
  readonly parameter: number;
  readonly error: number;
  readonly scatter: number;
  readonly limit: number;
}

/** Values this many times the symmetric half-width away count as without end. */
const FARTHEST = 1e5;
const STEP_OUT = 2;
/** In standard errors: a model that ends this near to a refit has no more to say. */
const SHORTEST_STEP = 1e-3;
const MOST_REFITS = 60;
/** A refit starts next to its answer; one that takes longer than this does not find it. */
const REFIT = { mostEvaluations: 100 };
/** Of the limit; the profile is nearly straight there, so the end has as many digits. */
const TOLERANCE = 1e-9;
/** Part of the variance by which a refit may undercut the solution by rounding. */
const UNDERCUT = 1e-6;

interface Refit {
  readonly value: number;
  /** τ − limit. */
  readonly excess: number;
  readonly parameters: Float64Array;
}

/** One end of the interval in direction `side`; null where the solution turns out not to be the least. */
function endOf(profile: Profile, side: -1 | 1): ProfileEnd | null {
  const { solution, parameter, error, limit } = profile;
  const best = solution.parameters[parameter] ?? 0;
  const bound = boundOf(profile, side);
  const farthest = best + side * FARTHEST * limit * error;
  let inner: Refit = { value: best, excess: -limit, parameters: solution.parameters };
  let before: Refit | null = null;
  let step = limit * error;
  if (side * (bound - best) <= 0) return { at: best, kind: "bound" };
  for (let count = 0; count < MOST_REFITS; count++) {
    const value = side * (inner.value + side * step - bound) >= 0 ? bound : inner.value + side * step;
    const outer = refit(profile, value, inner, before);
    if (outer === "undercut") return null;
    if (outer === "failed") {
      // Perhaps beyond what the model can have: come nearer.
      step /= 2;
      if (step < SHORTEST_STEP * error) return { at: null, kind: "failed" };
      continue;
    }
    if (outer.excess >= 0) return crossing(profile, inner, outer);
    if (value === bound) return { at: bound, kind: "bound" };
    if (side * (value - farthest) >= 0) break;
    before = inner;
    inner = outer;
    step *= STEP_OUT;
  }
  return { at: null, kind: "open" };
}

function boundOf({ problem, parameter }: Profile, side: -1 | 1): number {
  const [low, high] = problem.bounds?.[parameter] ?? [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
  return side < 0 ? low : high;
}

/** Between two refits on either side of the limit, by regula falsi with halving (Illinois). */
function crossing(profile: Profile, innerStart: Refit, outerStart: Refit): ProfileEnd | null {
  let inner = innerStart;
  let outer = outerStart;
  let [innerWeight, outerWeight, last] = [1, 1, 0];
  for (let count = 0; count < MOST_REFITS; count++) {
    const [below, above] = [inner.excess * innerWeight, outer.excess * outerWeight];
    const value = (inner.value * above - outer.value * below) / (above - below);
    const found = refit(profile, value, inner, outer);
    if (found === "undercut") return null;
    if (found === "failed") return { at: null, kind: "failed" };
    const settled = Math.abs(outer.value - inner.value) <= 4 * Number.EPSILON * Math.abs(value);
    if (Math.abs(found.excess) <= TOLERANCE * profile.limit || settled) return { at: value, kind: "crossed" };
    // The end that stays for a second round counts half, or it would stay for good.
    const side = found.excess < 0 ? -1 : 1;
    if (side < 0) {
      inner = found;
      innerWeight = 1;
      if (last === side) outerWeight /= 2;
    } else {
      outer = found;
      outerWeight = 1;
      if (last === side) innerWeight /= 2;
    }
    last = side;
  }
  return { at: null, kind: "failed" };
}

/**
 * The others refitted with the parameter held at `value`, from where the valley is expected there: on the line through
 * two refits, or along the tangent at the solution where there is only one.
 *
 * A refit that does not settle still bounds S(θ_p) from above, and below the limit that is all that is asked.
 */
function refit(
  profile: Profile,
  value: number,
  from: Refit,
  other: Refit | null,
): Refit | "failed" | "undercut" {
  const { problem, solution, parameter, scatter, limit } = profile;
  const fixed = Array.from({ length: problem.parameters }, (_, j) => {
    const bounds = problem.bounds?.[j] ?? ([Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY] as const);
    return j === parameter ? ([value, value] as const) : bounds;
  });
  const held: NonlinearProblem = { ...problem, bounds: fixed };
  const along = fitNonlinear(held, expectedAt(profile, value, from, other, fixed), REFIT);
  const fit =
    along.status === "converged" ? along : fitNonlinear(held, withValue(from, parameter, value), REFIT);
  if (!("residualSquares" in fit)) return "failed";
  const rise = (fit.residualSquares - solution.residualSquares) / scatter ** 2;
  if (rise < -UNDERCUT) return "undercut";
  const excess = Math.sqrt(Math.max(rise, 0)) - limit;
  if (fit.status !== "converged" && excess >= 0) return "failed";
  return { value, excess, parameters: fit.parameters };
}

function withValue({ parameters }: Refit, parameter: number, value: number): Float64Array {
  const start = Float64Array.from(parameters);
  start[parameter] = value;
  return start;
}

function expectedAt(
  { solution, parameter }: Profile,
  value: number,
  from: Refit,
  other: Refit | null,
  bounds: readonly (readonly [number, number])[],
): Float64Array {
  const covariance = solution.unscaledCovariance;
  const own = covariance?.[parameter]?.[parameter] ?? 0;
  const start = withValue(from, parameter, value);
  start.forEach((theta, j) => {
    if (j === parameter) return;
    // Along the valley of a linear model, dθ_j/dθ_p = C_jp/C_pp.
    const slope =
      other === null
        ? (covariance?.[j]?.[parameter] ?? 0) / own
        : ((other.parameters[j] ?? 0) - theta) / (other.value - from.value);
    const moved = theta + slope * (value - from.value);
    const [low, high] = bounds[j] ?? [theta, theta];
    start[j] = Number.isFinite(moved) ? Math.min(Math.max(moved, low), high) : theta;
  });
  return start;
}
