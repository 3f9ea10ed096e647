import { fitNonlinear, type NonlinearProblem, type NonlinearSolution } from "kinetics-core/least-squares";

/** The measured points. */
export interface SaturationPoints {
  readonly concentrations: readonly number[];
  readonly rates: readonly number[];
}

/** A curve rises from 0 or falls from 0, and no member of the family does both: 1 or −1. */
export type Orientation = 1 | -1;

function boundsOf(orientation: Orientation): readonly (readonly [number, number])[] {
  const height = orientation > 0 ? [0, Number.POSITIVE_INFINITY] : [Number.NEGATIVE_INFINITY, 0];
  return [
    [height[0] ?? 0, height[1] ?? 0],
    [0, Number.POSITIVE_INFINITY],
  ];
}

/** The curve in V and K: v = V c/(K + c), K ≥ 0. */
export function curveInLimits(
  { concentrations, rates }: SaturationPoints,
  orientation: Orientation,
): NonlinearProblem {
  return {
    residuals: rates.length,
    parameters: 2,
    bounds: boundsOf(orientation),
    evaluate(theta, residuals, jacobian) {
      const [limiting, half] = [theta[0] ?? 0, theta[1] ?? 0];
      for (let i = 0; i < rates.length; i++) {
        const c = concentrations[i] ?? 0;
        const saturation = c === 0 ? 0 : c / (half + c);
        residuals[i] = limiting * saturation - (rates[i] ?? 0);
        const [byLimiting, byHalf] = jacobian ?? [];
        if (byLimiting) byLimiting[i] = saturation;
        if (byHalf) byHalf[i] = c === 0 ? 0 : (-limiting * saturation) / (half + c);
      }
      return true;
    },
  };
}

/** The same curve in its slope β = V/K at the origin and κ = 1/K ≥ 0: v = β c/(1 + κ c), a straight line at κ = 0. */
export function curveFromOrigin(
  { concentrations, rates }: SaturationPoints,
  orientation: Orientation,
): NonlinearProblem {
  return {
    residuals: rates.length,
    parameters: 2,
    bounds: boundsOf(orientation),
    evaluate(theta, residuals, jacobian) {
      const [slope, curvature] = [theta[0] ?? 0, theta[1] ?? 0];
      for (let i = 0; i < rates.length; i++) {
        const c = concentrations[i] ?? 0;
        const bent = c / (1 + curvature * c);
        residuals[i] = slope * bent - (rates[i] ?? 0);
        const [bySlope, byCurvature] = jacobian ?? [];
        if (bySlope) bySlope[i] = bent;
        if (byCurvature) byCurvature[i] = -slope * bent * bent;
      }
      return true;
    },
  };
}

/** Where the least sum of squares lies: at some K, or beyond the last one either way. */
export type SaturationShape = { readonly orientation: Orientation } & (
  | { readonly shape: "curve"; readonly limits: NonlinearSolution; readonly origin: NonlinearSolution }
  /** K → ∞: a straight line through the origin. */
  | { readonly shape: "straight"; readonly origin: NonlinearSolution }
  /** K = 0: one rate at every concentration. */
  | { readonly shape: "level"; readonly limits: NonlinearSolution }
  | { readonly shape: "unsettled" }
);

const GRID_PER_DECADE = 8;
/** Decades of K searched below the least and above the greatest concentration. */
const DECADES_BEYOND = 3;

/**
 * For a given K the best V is linear, so one scan over K, evenly in ln K, sees every valley; the fit starts in the
 * deepest. Straightened plots (1/v against 1/c) would give a start too, but one that a single low rate throws away.
 */
export function fitCurve(points: SaturationPoints): SaturationShape {
  const start = deepestStart(points);
  const orientation = start.limiting < 0 ? -1 : 1;
  const origin = fitNonlinear(curveFromOrigin(points, orientation), [
    start.limiting / start.half,
    1 / start.half,
  ]);
  const highest = Math.max(...points.concentrations);
  if (origin.status === "converged" && (origin.parameters[1] ?? 0) * highest <= NO_BEND)
    return { orientation, shape: "straight", origin };
  const [slope = 0, curvature = 0] = origin.status === "converged" ? origin.parameters : [];
  const limits = fitNonlinear(
    curveInLimits(points, orientation),
    curvature > 0 && Number.isFinite(slope / curvature)
      ? [slope / curvature, 1 / curvature]
      : [start.limiting, start.half],
  );
  if (limits.status !== "converged") return { orientation, shape: "unsettled" };
  if ((limits.parameters[1] ?? 0) <= NO_HALF * leastAbove0(points.concentrations))
    return { orientation, shape: "level", limits };
  return origin.status === "converged"
    ? { orientation, shape: "curve", limits, origin }
    : { orientation, shape: "unsettled" };
}

/** A bend κ c this small is the rounding of a straight line. */
const NO_BEND = 1e-9;
/** A K this far below the least concentration is none: no rate there differs from V by as much as rounding. */
const NO_HALF = 1e-9;

function leastAbove0(concentrations: readonly number[]): number {
  return Math.min(...concentrations.filter((c) => c > 0));
}

function deepestStart({ concentrations, rates }: SaturationPoints): { limiting: number; half: number } {
  const low = Math.log10(leastAbove0(concentrations)) - DECADES_BEYOND;
  const high = Math.log10(Math.max(...concentrations)) + DECADES_BEYOND;
  const count = Math.ceil((high - low) * GRID_PER_DECADE);
  let best = { limiting: 0, half: 10 ** low, gain: Number.NEGATIVE_INFINITY };
  for (let k = 0; k <= count; k++) {
    const half = 10 ** (low + ((high - low) * k) / count);
    let along = 0;
    let size = 0;
    concentrations.forEach((c, i) => {
      const saturation = c / (half + c);
      along += saturation * (rates[i] ?? 0);
      size += saturation * saturation;
    });
    // The fall of the sum of squares from that of V = 0.
    const gain = (along / size) * along;
    if (gain > best.gain) best = { limiting: along / size, half, gain };
  }
  return best;
}
