import { type Calibration, calibrate } from "./calibrate";
import type { CalibrateInput, CalibrationInput, CalibrationLine } from "./calibration";
import { fitCalibrationLine } from "./fit-calibration-line";

/** Standards to test with, and results that must be there. */

/** Six standards on y = 1 + 2 x. */
export const x = [0, 1, 2, 3, 4, 5];
export const exact = x.map((value) => 1 + 2 * value);
/** With errors of one size, alternating. */
export const scattered = exact.map((value, i) => value + 0.05 * (i % 2 === 0 ? 1 : -1));

export function line(input: CalibrationInput): CalibrationLine {
  const result = fitCalibrationLine(input);
  if (result.status !== "fitted") throw new Error(result.message);
  return result;
}

export function calibrated(input: CalibrateInput): Calibration {
  const result = calibrate(input);
  if (result.status !== "calibrated") throw new Error(result.message);
  return result;
}

export const codes = (result: Calibration) => result.flags.map((flag) => flag.code);
