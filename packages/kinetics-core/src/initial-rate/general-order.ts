import type { Shape } from "kinetics-core/least-squares";
import { decayRatio, decayRatioSlope, logRatio, logRatioSlope } from "kinetics-core/smooth-ratios";

/**
 * Course of a reaction of order n in one reactant. With x = k·t (k the initial rate over the starting amount) the
 * part c that is left obeys dc/dx = −cⁿ, c(0) = 1, so
 *
 *   c = exp(−u),   u = x·log1p(z)/z,   z = (n − 1)x,
 *
 * which is e^(−x) at n = 1 and passes through it smoothly: log1p(z)/z is a power series there, not a second
 * formula. Below n = 1 everything is used up at x = 1/(1 − n) and c stays 0.
 */

/** Part consumed, 1 − c, at progress x ≥ 0 for order n. Accurate to rounding for small x too. */
export function partConsumed(progress: number, order: number): number {
  const z = (order - 1) * progress;
  return z <= -1 ? 1 : -Math.expm1(-progress * logRatio(z));
}

/**
 * φ(τ) = (1 − c(κτ))/κ, which has slope 1 at mixing whatever its shape: the linear scale of the fit is the
 * initial slope itself. Shape parameters are the curvature a = nκ and κ, because
 *   φ = τ − aτ²/2 + a(2a − κ)τ³/6 − …:
 * the start of a trace fixes a and says little about κ, so that the flat direction of the fit lies along an axis.
 * With z = (a − κ)τ, u = κτ·log1p(z)/z and g(z) = d(log1p(z)/z)/dz,
 *   ∂φ/∂a = cτ²g(z),   ∂φ/∂κ = (cτ·log1p(z)/z − φ)/κ − cτ²g(z),
 * and once a reaction of order below one has used everything up, φ = 1/κ.
 * `time`: scaled so that the last one is about 1, ≥ 0.
 */
export function generalOrderShape(time: Float64Array): Shape {
  return {
    bounds: [
      [-LARGEST_ACCELERATION, LARGEST_PROGRESS],
      [LEAST_PROGRESS, LARGEST_PROGRESS],
    ],
    evaluate([curvature = 0, progress = 1], value, derivatives) {
      const [byCurvature, byProgress] = derivatives;
      if (!byCurvature || !byProgress) throw new RangeError("The general order has two derivatives");
      for (let i = 0; i < time.length; i++) {
        const t = time[i] ?? Number.NaN;
        const z = (curvature - progress) * t;
        if (z <= -1) {
          value[i] = 1 / progress;
          byCurvature[i] = 0;
          byProgress[i] = -1 / (progress * progress);
          continue;
        }
        const logarithm = Math.log1p(z);
        const reduced = z === 0 ? t : (t * logarithm) / z;
        const consumed = -Math.expm1(-progress * reduced);
        const left = 1 - consumed;
        const bent = left * t * t * logRatioSlope(z, logarithm);
        value[i] = consumed / progress;
        byCurvature[i] = bent;
        byProgress[i] = (left * reduced - consumed / progress) / progress - bent;
      }
    },
  };
}

/**
 * φ(τ) = (1 − e^(−κτ))/κ, smooth through κ = 0 where it is a straight line, and an accelerating course below.
 * Shape parameter [κ]; ∂φ/∂κ = τ²·h′(κτ), h(x) = (1 − e^(−x))/x.
 */
export function exponentialShape(time: Float64Array): Shape {
  return {
    bounds: [[-LARGEST_ACCELERATION, LARGEST_PROGRESS]],
    evaluate([progress = 0], value, derivatives) {
      const [byProgress] = derivatives;
      if (!byProgress) throw new RangeError("The exponential has one derivative");
      for (let i = 0; i < time.length; i++) {
        const t = time[i] ?? Number.NaN;
        const x = progress * t;
        value[i] = t * decayRatio(x);
        byProgress[i] = t * t * decayRatioSlope(x);
      }
    },
  };
}

/** Below this κ the curve no longer depends on it by more than a thousandth. */
const LEAST_PROGRESS = 1e-3;
/** Over by a millionth of the window. */
const LARGEST_PROGRESS = 1e6;
const LARGEST_ACCELERATION = 5;
