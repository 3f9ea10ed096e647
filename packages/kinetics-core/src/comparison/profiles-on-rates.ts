import { type ProfileInterval, profileMarginal } from "kinetics-core/inference";
import { fitNonlinear } from "kinetics-core/least-squares";
import type { RateEquation } from "kinetics-core/rate-equation";
import type { RateFit } from "./best-fit-on-rates";
import { INTERVAL_LEVEL } from "./constants";
import { type CandidateRun, rateProblem } from "./rate-problem";

/**
 * Profiles of the parameters whose Wald interval misleads: constants, and orders that an added term rests on. A limit is
 * where the least Σ w r² over the other parameters exceeds the least of all by t² s². In the order of θ; null where
 * there is nothing to profile.
 */
export function profilesOnRates(
  equation: RateEquation,
  runs: readonly CandidateRun[],
  fit: RateFit,
): readonly (ProfileInterval | null)[] {
  const added = new Set(equation.simpler.map(({ parameter }) => parameter));
  return equation.parameters.map(({ kind }, k) =>
    kind === "constant" || added.has(k) ? profileOnRates(equation, runs, fit, k) : null,
  );
}

/** Interval of a constant: it ends at the lower bound where that is within, and is null where it is open above. */
export function constantInterval(profile: ProfileInterval, low: number): readonly [number, number] | null {
  if (profile.upper === null) return null;
  const lower = profile.lower ?? (profile.profile[0]?.value === low ? low : null);
  return lower === null ? null : [lower, profile.upper];
}

function profileOnRates(
  equation: RateEquation,
  runs: readonly CandidateRun[],
  fit: RateFit,
  index: number,
): ProfileInterval | null {
  const { theta } = fit;
  const definition = equation.parameters[index];
  const variance = fit.unscaledCovariance?.[index + 1]?.[index + 1];
  const freedom = runs.length - theta.length - 1;
  if (definition === undefined || variance === undefined || freedom < 1) return null;
  const scale = fit.runSquares / freedom;
  const problem = rateProblem(equation, runs);
  const estimate = theta[index] ?? Number.NaN;
  let start = Float64Array.from(theta);
  let last = estimate;
  const refit = (value: number): number | null => {
    // Refits of one side begin where its last ended; the other side begins at the fit.
    if (value < estimate !== last < estimate) start = Float64Array.from(theta);
    last = value;
    start[index] = value;
    const bounds = problem.bounds?.map((one, k) => (k === index ? ([value, value] as const) : one)) ?? [];
    const held = fitNonlinear({ ...problem, bounds }, start);
    if (held.status !== "converged") return null;
    start = Float64Array.from(held.parameters);
    return held.residualSquares / scale;
  };
  return profileMarginal({
    estimate,
    standardError: Math.sqrt(variance * scale),
    degreesOfFreedom: freedom,
    deviance: fit.residualSquares / scale,
    refit,
    bounds: definition.bounds,
    level: INTERVAL_LEVEL,
    name: definition.name,
  });
}
