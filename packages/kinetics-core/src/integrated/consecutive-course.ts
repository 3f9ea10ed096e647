import { decayRatio, decayRatioSlope } from "kinetics-core/smooth-ratios";
import type { CoursePoint } from "./course-point";

/**
 * A → I → P, first order each: the intermediate over a₀, with x = k₁t and y = k₂t,
 *
 *   i = x·D,   D = (e^(−x) − e^(−y))/(y − x) = e^(−s)·h(d),   s = min(x, y), d = |y − x|, h(d) = (1 − e^(−d))/d.
 *
 * D, a divided difference of e^(−x), is symmetric in x and y, so that s and d give one smooth function: x·e^(−x) where
 * the two steps are equally fast. With the slower one outside, neither e^(−s) nor h(d) overflows. Its derivatives are
 * −e^(−s)(h + h′) by the smaller argument and e^(−s)h′ by the larger. `x`, `y` ≥ 0.
 */
export function consecutiveCourse(x: number, y: number, into: CoursePoint): void {
  const smaller = Math.min(x, y);
  const distance = Math.abs(y - x);
  const outside = Math.exp(-smaller);
  const ratio = decayRatio(distance);
  const slope = decayRatioSlope(distance);
  const bySmaller = -outside * (ratio + slope);
  const byLarger = outside * slope;
  into.part = x * outside * ratio;
  into.byProgress = outside * ratio + x * (x <= y ? bySmaller : byLarger);
  into.bySecond = x * (x <= y ? byLarger : bySmaller);
}
