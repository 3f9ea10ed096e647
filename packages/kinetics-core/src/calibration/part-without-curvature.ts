import type { CalibrationLine } from "./calibration";
import { fitCalibrationLine } from "./fit-calibration-line";
import { linearRange } from "./linear-range";

/** A dense set of levels is searched in steps: the answer is advice, not a limit. */
const MOST_TRIALS = 20;

/**
 * Where curvature is shown, the highest standard that can be kept: the line through it and all below is the longest that
 * does not show curvature. A parabola through a signal that levels off puts its bend too low, so this reaches further than
 * `curvedFrom` does; a single standard just beyond the bend may still be in it, since one point does not show curvature.
 * Null where no curvature is shown, or where too few standards would be left to tell.
 */
export function partWithoutCurvature(line: CalibrationLine): number | null {
  const whole = linearRange(line);
  if (whole.status === "not-assessed" || whole.curvedFrom === null) return null;
  const sizes = [...new Set(line.standards.map((one) => Math.abs(one.concentration)))].sort((a, b) => b - a);
  const step = Math.ceil(sizes.length / MOST_TRIALS);
  for (let i = step; i < sizes.length; i += step) {
    const top = sizes[i] ?? 0;
    const kept = line.standards.filter((one) => Math.abs(one.concentration) <= top);
    const part = fitCalibrationLine({
      concentrations: kept.map((one) => one.concentration),
      signals: kept.map((one) => one.signal),
      weights: kept.map((one) => one.weight),
      intercept: line.interceptFitted ? "fitted" : "none",
      level: line.level,
    });
    if (part.status !== "fitted") return null;
    const range = linearRange(part);
    if (range.status === "not-assessed") return null;
    if (range.curvedFrom === null) return top;
  }
  return null;
}
