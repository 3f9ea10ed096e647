import { fSurvival } from "kinetics-core/distributions";
import { freeOrderLaw } from "./course-laws";
import { type CourseFit, courseJacobian, effectiveDeviation, linearisedFit } from "./fit-course";
import { type LackOfFit, lackOfFit } from "./lack-of-fit";
import { linearInformation } from "./linear-information";
import type { ScaledReadings } from "./scaled-reading";
import { searchCourse } from "./search-course";

/** What a fitted trace knows of its order. */
export interface OrderCheck {
  /** Of the free order, or of what a held one would have if it were free; null where the readings do not determine it. */
  readonly standardError: number | null;
  readonly degreesOfFreedom: number;
  /** Free order less held order; 0 for a free one. */
  readonly shift: number;
  /** Of the rise of the sum of squares by holding the order, over the effective variance of the free one: F(1, df). */
  readonly pValue: number;
}

/** Null where no fit with a free order leaves a degree of freedom. A held order is freed from where it stands. */
export function orderCheck(
  order: number | "free",
  fit: CourseFit,
  { trace, end }: ScaledReadings,
): OrderCheck | null {
  const freed = order === "free" ? fit : freedOrder(order, fit, trace, end);
  if (freed === null || freed.noise.degreesOfFreedom === 0) return null;
  const { degreesOfFreedom } = freed.noise;
  const error = freed.stopped.includes(true)
    ? "undetermined"
    : freed.errorOf({ theta: [0, 1], scales: [], end: 0 });
  const rise = Math.max(fit.found.residualSquares - freed.found.residualSquares, 0);
  return {
    standardError: error === "undetermined" ? null : error.standardError,
    degreesOfFreedom: error === "undetermined" ? degreesOfFreedom : error.degreesOfFreedom,
    shift: order === "free" ? 0 : (freed.found.theta[1] ?? Number.NaN) - order,
    pValue: fSurvival(rise / effectiveDeviation(freed.noise) ** 2, 1, degreesOfFreedom),
  };
}

/** On the same rows and with the same weight of the end, so that sums of squares compare. */
function freedOrder(
  order: number,
  { found, condition }: CourseFit,
  trace: ScaledReadings["trace"],
  end: ScaledReadings["end"],
): CourseFit | null {
  const near = Float64Array.of(found.theta[0] ?? Number.NaN, order);
  const free = searchCourse(freeOrderLaw(), trace, condition, near);
  if (free.status !== "found") return null;
  return linearisedFit(free, trace, condition, end.kind === "stated" ? end.standardUncertainty : 0);
}

export function courseLackOfFit(fit: CourseFit, { trace }: ScaledReadings): LackOfFit | null {
  const left = fit.found.problem.parts[0];
  if (left === undefined) return null;
  const n = trace.time.length;
  const columns = courseJacobian(fit.found, fit.condition).map((column) => column.subarray(0, n));
  const { basis } = linearInformation(columns);
  return lackOfFit(trace.time, left, fit.found.residuals.subarray(0, n), basis, trace.rounding);
}
