import { studentTFactor } from "kinetics-core/distributions";
import type { Flag } from "kinetics-core/quantities";

/**
 * Interval of one parameter by profile of the marginal likelihood: all values at which the least deviance over the
 * other parameters exceeds the least of all by no more than t², t Student's for the degrees of freedom of the fit. On
 * a linear model with held variances this is the Wald interval itself; where the likelihood is lopsided it is not
 * symmetric, and where the data do not bound the parameter it does not close (Bates and Watts, Nonlinear Regression
 * Analysis, 1988, 6.1). With ζ = ±√(deviance − least) each limit is the root of ζ(value) = ±t, and ζ is nearly
 * straight.
 */
export interface ProfileRequest {
  readonly estimate: number;
  /** Wald standard error, for the first step. */
  readonly standardError: number;
  readonly degreesOfFreedom: number;
  /** Deviance at the estimate, of the same kind that `refit` returns: σ_j² and τ² held at their estimates. */
  readonly deviance: number;
  /** Least deviance with the parameter held at `value`; null where no fit was found. */
  readonly refit: (value: number) => number | null;
  /** Values the parameter can take, inclusive; free where absent. */
  readonly bounds?: readonly [number, number];
  /** Default 0.95. */
  readonly level?: number;
  /** How the flags name the parameter. */
  readonly name: string;
}

export interface ProfileInterval {
  /** Null unless both sides close. */
  readonly interval: readonly [number, number] | null;
  /** Limit of each side, null where it is open: a lower limit may stand without an upper one. */
  readonly lower: number | null;
  readonly upper: number | null;
  readonly level: number;
  /** Every value tried with its ζ, in rising order: the profile plot. */
  readonly profile: readonly { readonly value: number; readonly signedRoot: number }[];
  readonly flags: readonly Flag[];
}

/** Doublings of the first step, t standard errors, after which a side counts as open: a thousand times that step. */
const MOST_DOUBLINGS = 10;
const MOST_REFINEMENTS = 60;
/** Part of the distance to the estimate to which a limit is located. */
const RELATIVE_ACCURACY = 1e-8;
/** A refit this far below the least deviance has found a better fit than the one reported. */
const BETTER_BY = 1e-3;

export function profileMarginal(request: ProfileRequest): ProfileInterval {
  const { estimate, standardError, degreesOfFreedom, name, level = 0.95 } = request;
  const none = { interval: null, lower: null, upper: null, level, profile: [] };
  if (!(Number.isFinite(estimate) && Number.isFinite(request.deviance)))
    return { ...none, flags: [cannot(name, "there is no finite estimate to start from")] };
  if (!(standardError > 0 && Number.isFinite(standardError) && degreesOfFreedom > 0))
    return { ...none, flags: [cannot(name, "there is no standard error to start from")] };
  const factor = studentTFactor(level, degreesOfFreedom);
  const tried: { value: number; signedRoot: number }[] = [{ value: estimate, signedRoot: 0 }];
  let better = false;
  const rootAt = (value: number): number | null => {
    const deviance = request.refit(value);
    if (deviance === null || !Number.isFinite(deviance)) return null;
    const rise = deviance - request.deviance;
    if (rise < -BETTER_BY) better = true;
    const root = Math.sqrt(Math.max(0, rise));
    tried.push({ value, signedRoot: value < estimate ? -root : root });
    return root;
  };
  const [least, greatest] = request.bounds ?? [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
  const lower = limit(rootAt, estimate, -factor * standardError, factor, least);
  const upper = limit(rootAt, estimate, factor * standardError, factor, greatest);
  const interval =
    lower.value !== null && upper.value !== null ? ([lower.value, upper.value] as const) : null;
  return {
    // A better fit elsewhere makes every limit wrong.
    interval: better ? null : interval,
    lower: better ? null : lower.value,
    upper: better ? null : upper.value,
    level,
    profile: tried.sort((a, b) => a.value - b.value),
    flags: better
      ? [cannot(name, "a better fit than the reported one was found on the way; fit again from there")]
      : [...sideFlags(name, "below", lower), ...sideFlags(name, "above", upper)],
  };
}

interface Side {
  readonly value: number | null;
  readonly failed: boolean;
}

/** Where ζ reaches `factor` on one side: steps outwards, each twice as far, then Illinois regula falsi. */
function limit(
  rootAt: (value: number) => number | null,
  estimate: number,
  firstStep: number,
  factor: number,
  bound: number,
): Side {
  let inner = estimate;
  let innerExcess = -factor;
  let step = firstStep;
  for (let doubling = 0; doubling <= MOST_DOUBLINGS; doubling++) {
    const wanted = estimate + step;
    const outer = firstStep < 0 ? Math.max(wanted, bound) : Math.min(wanted, bound);
    if (outer === inner) return { value: null, failed: false };
    const root = rootAt(outer);
    if (root === null) return { value: null, failed: true };
    if (root >= factor)
      return refined(rootAt, estimate, factor, [inner, innerExcess], [outer, root - factor]);
    inner = outer;
    innerExcess = root - factor;
    step *= 2;
  }
  return { value: null, failed: false };
}

function refined(
  rootAt: (value: number) => number | null,
  estimate: number,
  factor: number,
  below: readonly [number, number],
  above: readonly [number, number],
): Side {
  let [inner, innerExcess] = below;
  let [outer, outerExcess] = above;
  let last = 0;
  for (let i = 0; i < MOST_REFINEMENTS && outerExcess > 0; i++) {
    const value = (inner * outerExcess - outer * innerExcess) / (outerExcess - innerExcess);
    const width = Math.abs(outer - inner);
    if (width <= RELATIVE_ACCURACY * Math.abs(outer - estimate)) return { value, failed: false };
    const root = rootAt(value);
    if (root === null) return { value: null, failed: true };
    const excess = root - factor;
    if (Math.abs(excess) <= RELATIVE_ACCURACY * factor) return { value, failed: false };
    if (excess > 0) {
      outer = value;
      outerExcess = excess;
      if (last > 0) innerExcess /= 2;
      last = 1;
    } else {
      inner = value;
      innerExcess = excess;
      if (last < 0) outerExcess /= 2;
      last = -1;
    }
  }
  return { value: outer, failed: false };
}

function cannot(name: string, why: string): Flag {
  return {
    code: "profile-impossible",
    severity: "weakens",
    message: `No profile interval of ${name}: ${why}.`,
  };
}

function sideFlags(name: string, where: "below" | "above", side: Side): readonly Flag[] {
  if (side.value !== null) return [];
  return [
    side.failed
      ? cannot(name, `the fit with it held ${where} its estimate failed`)
      : {
          code: "profile-open",
          severity: "weakens",
          message: `The runs do not bound ${name} from ${where}: the fit stays acceptable as far as it was followed. Runs where ${name} matters more would bound it, or state what is known of it.`,
        },
  ];
}
