import { type CoursePoint, nothingLeft } from "./course-point";

/**
 * A + P → 2 P, rate k[A][P]: the part α of A that is left, with x = k·a₀·t and q = p₀/a₀ ≥ 0, the seed:
 *
 *   dα/dx = −α(1 + q − α),   α = (1 + q)ε/(ε + q),   ε = e^(−(1+q)x),
 *   ∂α/∂x = −α·q(1 + q)/(ε + q),   ∂α/∂q = −ε((1 − ε) + q(1 + q)x)/(ε + q)².
 *
 * Without a seed (q = 0) nothing happens, and α is 1 for all times. `x` ≥ 0.
 */
export function autocatalyticCourse(x: number, seed: number, into: CoursePoint): void {
  const total = 1 + seed;
  const shrunk = Math.exp(-total * x);
  const divisor = shrunk + seed;
  if (!(divisor > 0)) {
    // No seed, and so long a time that even ε is below the least number.
    nothingLeft(into);
    into.part = 1;
    return;
  }
  const part = (total * shrunk) / divisor;
  into.part = part;
  into.byProgress = (-part * seed * total) / divisor;
  into.bySecond = (-shrunk / divisor) * ((-Math.expm1(-total * x) + seed * total * x) / divisor);
}
