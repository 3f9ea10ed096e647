import { dot } from "kinetics-core/linear-algebra";
import { freeOrderLaw } from "./course-laws";
import { type CourseFit, courseJacobian, rowVariance } from "./fit-course";
import { type LackOfFit, lackOfFit } from "./lack-of-fit";
import { linearInformation } from "./linear-information";
import type { ScaledReadings } from "./scaled-reading";

/** What a fitted trace knows of its order. */
export interface OrderCheck {
  /** Of the free order, or of what a held one would have if it were free. */
  readonly standardError: number;
  /** By how much the readings would move a held order: one Gauss-Newton step. 0 for a free order. */
  readonly shift: number;
}

/** The order as one parameter more, linearised at the fit; null where the trace does not determine it. */
export function orderCheck(
  order: number | "free",
  fit: CourseFit,
  { trace, end }: ScaledReadings,
): OrderCheck | null {
  const { found, condition, noise } = fit;
  if (noise.degreesOfFreedom === 0) return null;
  const fitted = courseJacobian(found, condition);
  const jacobian = order === "free" ? fitted : [...fitted, byOrder(order, fit, trace.time)];
  const place = order === "free" ? 1 : fitted.length;
  if (trace.time.length <= jacobian.length) return null;
  const row = linearInformation(jacobian).rowOf(jacobian.map((_, j) => (j === place ? 1 : 0)));
  if (row === null) return null;
  const endUncertainty = end.kind === "stated" ? end.standardUncertainty : 0;
  return {
    standardError: Math.sqrt(rowVariance(row, noise, condition, endUncertainty)),
    shift: order === "free" ? 0 : dot(row, found.residuals),
  };
}

/** ∂S/∂n of a course whose order is held. */
function byOrder(order: number, { found }: CourseFit, time: Float64Array): Float64Array {
  const column = new Float64Array(found.residuals.length);
  const onReadings = () => new Float64Array(time.length);
  const derivative = column.subarray(0, time.length);
  freeOrderLaw().evaluate(
    time,
    Float64Array.of(found.theta[0] ?? Number.NaN, order),
    [onReadings()],
    [[onReadings()], [derivative]],
  );
  const scale = found.problem.linear.scales[0] ?? Number.NaN;
  for (let i = 0; i < derivative.length; i++) derivative[i] = scale * (derivative[i] ?? Number.NaN);
  return column;
}

export function courseLackOfFit(fit: CourseFit, { trace }: ScaledReadings): LackOfFit | null {
  const left = fit.found.problem.parts[0];
  if (left === undefined) return null;
  const n = trace.time.length;
  const columns = courseJacobian(fit.found, fit.condition).map((column) => column.subarray(0, n));
  const { basis } = linearInformation(columns);
  return lackOfFit(trace.time, left, fit.found.residuals.subarray(0, n), basis, trace.rounding);
}
