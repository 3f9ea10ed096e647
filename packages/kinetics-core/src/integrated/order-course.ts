import { logRatio, logRatioSlope } from "kinetics-core/smooth-ratios";
import { type CoursePoint, nothingLeft } from "./course-point";

/**
 * One reactant, order n: dc/dx = −cⁿ, c(0) = 1, with the progress x = κt, κ = k·c₀^(n−1) the initial fractional rate.
 *
 *   c = e^(−u),   u = x·ln(1 + z)/z,   z = (n − 1)x,
 *   ∂c/∂x = −cⁿ = −c/(1 + z),   ∂c/∂n = −c·x²·g(z),   g = d(ln(1 + z)/z)/dz.
 *
 * n = 1 is the middle of a power series. Below n = 1 all is used up at x = 1/(1 − n): c and its derivatives stay 0 from
 * there on. Below n = 0 the rate has no bound just before that end. `x` ≥ 0.
 */
export function orderCourse(x: number, order: number, into: CoursePoint): void {
  const z = (order - 1) * x;
  if (!(z > -1) || z === Number.POSITIVE_INFINITY) {
    nothingLeft(into);
    return;
  }
  const part = Math.exp(-x * logRatio(z));
  into.part = part;
  into.byProgress = -part / (1 + z);
  into.bySecond = -part * x * (x * logRatioSlope(z));
}
