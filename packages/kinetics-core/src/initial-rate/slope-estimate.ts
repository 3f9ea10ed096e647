import { evaluateCurve } from "./evaluate-curve";
import type { FittedCurve, SlopeEstimate } from "./initial-rate";
import type { PreparedTrace } from "./prepared-trace";
import type { WindowFit } from "./window-fit";

/** A fit on one window as the caller sees it: window on the caller's clock, conversion where the span is known. */
export function slopeEstimate({ readings, progress }: PreparedTrace, fit: WindowFit): SlopeEstimate {
  const curve = fit.curve();
  const first = readings.time[fit.from] ?? Number.NaN;
  const last = readings.time[fit.to - 1] ?? Number.NaN;
  const change = Math.abs(evaluateCurve(curve, last) - evaluateCurve(curve, 0));
  return {
    estimator: fit.estimator,
    degree: fit.degree,
    slope: fit.slope,
    standardError: fit.standardError,
    window: [first + readings.timeZero, last + readings.timeZero],
    points: fit.to - fit.from,
    conversion: progress ? change / progress.span : null,
    curve: raised(curve, readings.offset),
  };
}

function raised(curve: FittedCurve, offset: number): FittedCurve {
  if (curve.kind !== "polynomial") return { ...curve, start: curve.start + offset };
  const [constant = 0, ...rest] = curve.coefficients;
  return { ...curve, coefficients: [constant + offset, ...rest] };
}
