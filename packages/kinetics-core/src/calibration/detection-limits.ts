import { studentTQuantile } from "kinetics-core/distributions";
import { lineFactor } from "./bands";
import type { CalibrationLine } from "./calibration";

/** Blank deviations to the limit of detection and of quantitation; 3 and 10 in older texts (common practice). */
const DETECTION_FACTOR = 3.3;
const QUANTITATION_FACTOR = 10;

export interface DetectionLimits {
  /** Null where the line carries no uncertainty or has no slope. */
  readonly limitOfDetection: number | null;
  readonly limitOfQuantitation: number | null;
}

/**
 * Limits from the scatter about the line: factor · s/(|b| √w). With weights, s belongs to a signal of weight 1; give the
 * weight of a blank (in practice of the lowest standard) for limits that do not depend on how weights were scaled.
 */
export function detectionLimits(
  line: CalibrationLine,
  {
    detection = DETECTION_FACTOR,
    quantitation = QUANTITATION_FACTOR,
    weight = 1,
  }: { readonly detection?: number; readonly quantitation?: number; readonly weight?: number } = {},
): DetectionLimits {
  const { residualStandardDeviation: s } = line;
  const slope = Math.abs(line.slope.estimate ?? 0);
  if (s === null || slope === 0) return { limitOfDetection: null, limitOfQuantitation: null };
  const unit = s / slope / Math.sqrt(weight);
  return { limitOfDetection: detection * unit, limitOfQuantitation: quantitation * unit };
}

/**
 * Critical concentration of DIN 32645 (cf. ISO 11843): the reading that a blank exceeds with probability `alpha` only,
 * (s/|b|) t(1 − α, ν) √(1/m + 1/W + x̄²/S_xx). Twice this is detected with probability 1 − β where β = α. Null without
 * uncertainty or slope.
 */
export function criticalConcentration(line: CalibrationLine, alpha: number, replicates = 1): number | null {
  const { residualStandardDeviation: s, degreesOfFreedom } = line;
  const slope = Math.abs(line.slope.estimate ?? 0);
  if (s === null || slope === 0) return null;
  return (
    (s / slope) *
    studentTQuantile(1 - alpha, degreesOfFreedom) *
    Math.sqrt(1 / replicates + lineFactor(line, 0))
  );
}

/**
 * Concentration at which a reading is known to 1/k of itself (DIN 32645, k = 3): the smallest root of
 * x = k (s/|b|) t(1 − α/2, ν) √(1/m + 1/W + (x − x̄)²/S_xx), which is quadratic in x. Null where there is none: the
 * slope itself is too poorly known, or there is no uncertainty.
 */
export function quantificationConcentration(
  line: CalibrationLine,
  alpha: number,
  replicates = 1,
  k = 3,
): number | null {
  const { residualStandardDeviation: s, degreesOfFreedom, centre, inverseSpread, inverseWeight } = line;
  const slope = Math.abs(line.slope.estimate ?? 0);
  if (s === null || slope === 0) return null;
  const unit = (k * (s / slope) * studentTQuantile(1 - alpha / 2, degreesOfFreedom)) ** 2;
  // x² = K(1/m + 1/W + (x − x̄)²/S): (1 − K/S) x² + 2 (K/S) x̄ x − K(1/m + 1/W + x̄²/S) = 0.
  const a = 1 - unit * inverseSpread;
  const b = unit * inverseSpread * centre.concentration;
  const c = unit * (1 / replicates + inverseWeight + centre.concentration ** 2 * inverseSpread);
  if (!(a > 0)) return null;
  return c / (b + Math.sqrt(b ** 2 + a * c));
}
