import { decayRatio, decayRatioSlope } from "kinetics-core/smooth-ratios";
import type { CoursePoint } from "./course-point";

/**
 * A + B → products, rate k[A][B]: the part α of A that is left, with x = k·a₀·t and the excess δ = b₀/a₀ − 1 ≥ −1:
 *
 *   dα/dx = −α(α + δ),   α = δ/((1 + δ)e^(δx) − 1) = 1/(e^y + x(e^y − 1)/y),   y = δx.
 *
 * The second form is smooth through equal amounts, δ = 0, where α = 1/(1 + x). For y ≥ 0 it is multiplied through by
 * e^(−y), so that a large excess (α = e^(−y)) does not overflow. With h(y) = (1 − e^(−y))/y:
 *
 *   y ≥ 0:  α = e^(−y)/D,  D = 1 + x·h(y),        ∂α/∂δ = −x·α·(1 + x(h + h′))/D
 *   y < 0:  α = 1/M,       M = e^y + x·h(−y),     ∂α/∂δ = −x·α²·(e^y − x·h′(−y))
 *
 * and ∂α/∂x = −αβ with β = α + δ = (1 + δ)·α·e^y, B over a₀, free of the cancellation of α + δ at the end. `x` ≥ 0.
 */
export function unequalSecondOrderCourse(x: number, excess: number, into: CoursePoint): void {
  const y = excess * x;
  if (y >= 0) {
    const ratio = decayRatio(y);
    const divisor = 1 + x * ratio;
    const part = Math.exp(-y) / divisor;
    into.part = part;
    into.byProgress = (-part * (1 + excess)) / divisor;
    into.bySecond = (-x * part * (1 + x * (ratio + decayRatioSlope(y)))) / divisor;
    return;
  }
  const shrunk = Math.exp(y);
  const part = 1 / (shrunk + x * decayRatio(-y));
  into.part = part;
  into.byProgress = -part * part * (1 + excess) * shrunk;
  into.bySecond = -x * part * part * (shrunk - x * decayRatioSlope(-y));
}
