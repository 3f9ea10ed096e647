import { decayRatio, decayRatioSlope } from "kinetics-core/smooth-ratios";
import type { CoursePoint } from "./course-point";

/**
 * A ⇌ P, first order both ways: the part of A that is left, with x = k₁t and y = k₋₁t,
 *
 *   α = 1 − x·h(x + y) = y·h(x + y) + e^(−(x+y)),   h(s) = (1 − e^(−s))/s,
 *   ∂α/∂x = y·h′ − e^(−(x+y)),   ∂α/∂y = −x·h′,
 *
 * in the forms that lose no digits when little is left. At long times α = k₋₁/(k₁ + k₋₁). `x`, `y` ≥ 0.
 */
export function reversibleCourse(x: number, y: number, into: CoursePoint): void {
  const sum = x + y;
  const shrunk = Math.exp(-sum);
  const slope = decayRatioSlope(sum);
  into.part = y * decayRatio(sum) + shrunk;
  into.byProgress = y * slope - shrunk;
  into.bySecond = -x * slope;
}
