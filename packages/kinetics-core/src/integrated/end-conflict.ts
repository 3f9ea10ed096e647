import { dot } from "kinetics-core/linear-algebra";
import type { CourseLaw } from "./course-law";
import { type CourseFit, effectiveDeviation, fitCourse, type ScaledEnd } from "./fit-course";
import type { ScaledTrace } from "./search-course";

/**
 * How far a stated end signal is from the one that the readings show, in standard uncertainties: with SS the sums of
 * squares of the fits with the stated and with a free end, over the effective variance of the latter,
 *
 *   z² = SS(stated) + ((fitted end − stated)/u)² − SS(free),   sign of (free end − stated).
 *
 * Where the fit is linear this is ((free − stated)/√(u_free² + u²))²; where it is not, as for an order with its end, the
 * profile is the one that can be trusted. Null where the readings show no end of their own.
 */
export function endConflict(
  law: CourseLaw,
  trace: ScaledTrace,
  stated: CourseFit,
  end: ScaledEnd,
): number | null {
  if (end.kind === "free") return null;
  const free = stated.freeEnd ?? fitCourse(law, trace, { kind: "free" });
  if (free.status !== "fitted" || free.cornered || free.stopped.includes(true)) return null;
  if (free.noise.degreesOfFreedom === 0) return null;
  if (free.errorOf({ theta: [], scales: [], end: 1 }) === "undetermined") return null;
  const variance = effectiveDeviation(free.noise) ** 2;
  const onReadings = stated.found.residuals.subarray(0, trace.time.length);
  const rise =
    (dot(onReadings, onReadings) - free.found.residualSquares) / variance + stated.endDeviation ** 2;
  const z = Math.sign(free.found.problem.linear.end - end.value) * Math.sqrt(Math.max(rise, 0));
  // Readings without any noise know their end without an error: there is no number of standard uncertainties.
  return Number.isFinite(z) ? z : null;
}
