import { partConsumed } from "./general-order";
import type { FittedCurve } from "./initial-rate";

/**
 * Signal of a fitted curve at `time`, counted from mixing, in the trace's own units. The general order is
 * S(t) = start + span·(1 − c), c = [1 + (n − 1)kt]^(−1/(n − 1)), with c = 0 once an order below one has used
 * everything up.
 */
export function evaluateCurve(curve: FittedCurve, time: number): number {
  switch (curve.kind) {
    case "polynomial":
      return curve.coefficients.reduceRight((sum, coefficient) => sum * time + coefficient, 0);
    case "exponential":
      return curve.start - curve.span * Math.expm1(-curve.rateConstant * time);
    case "general-order":
      return curve.start + curve.span * partConsumed(curve.rateConstant * time, curve.order);
  }
}
