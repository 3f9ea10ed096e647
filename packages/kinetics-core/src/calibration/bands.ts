import { type Estimate, estimateOf } from "kinetics-core/quantities";
import type { CalibrationLine } from "./calibration";
import { signalAt } from "./fit-calibration-line";

/** Squared standard error of the line at a concentration, in units of s²: 1/W + (x − x̄)²/S_xx. */
export function lineFactor(line: CalibrationLine, concentration: number): number {
  return line.inverseWeight + (concentration - line.centre.concentration) ** 2 * line.inverseSpread;
}

/** The line at a concentration with its confidence interval; the band is this as a function of the concentration. */
export function confidenceBand(line: CalibrationLine, concentration: number): Estimate {
  return bandOf(line, concentration, lineFactor(line, concentration));
}

/**
 * The mean of `replicates` new signals at a concentration, with the interval that will hold it.
 *
 * @param weight of each new signal on the scale of the standards' weights; 1 where these have none.
 */
export function predictionBand(
  line: CalibrationLine,
  concentration: number,
  replicates = 1,
  weight = 1,
): Estimate {
  return bandOf(line, concentration, lineFactor(line, concentration) + 1 / (weight * replicates));
}

function bandOf(line: CalibrationLine, concentration: number, factor: number): Estimate {
  const { residualStandardDeviation: s, degreesOfFreedom, level } = line;
  const error = s === null ? null : s * Math.sqrt(factor);
  return estimateOf(signalAt(line, concentration), error, degreesOfFreedom, level);
}
