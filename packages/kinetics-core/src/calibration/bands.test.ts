import { describe, expect, it } from "vitest";
import { confidenceBand, predictionBand } from "./bands";
import type { CalibrationInput, CalibrationLine } from "./calibration";
import { fitCalibrationLine } from "./fit-calibration-line";

function line(input: CalibrationInput): CalibrationLine {
  const result = fitCalibrationLine(input);
  if (result.status !== "fitted") throw new Error(result.message);
  return result;
}

/** Six standards on y = 1 + 2 x with errors of one size, alternating. */
const x = [0, 1, 2, 3, 4, 5];
const scattered = x.map((value, i) => 1 + 2 * value + 0.05 * (i % 2 === 0 ? 1 : -1));

describe("bands", () => {
  const fitted = line({ concentrations: x, signals: scattered });

  it("are narrowest at the mean of the standards, and wider for a new signal than for the line", () => {
    const width = (band: typeof confidenceBand, at: number) => band(fitted, at).standardError ?? 0;
    expect(width(confidenceBand, 2.5)).toBeLessThan(width(confidenceBand, 2.4));
    expect(width(confidenceBand, 2.5)).toBeCloseTo(
      (fitted.residualStandardDeviation ?? 0) / Math.sqrt(6),
      12,
    );
    const line0 = width(confidenceBand, 0);
    expect(line0).toBeCloseTo(fitted.intercept.standardError ?? 0, 12);
    expect(predictionBand(fitted, 0).standardError ?? 0).toBeCloseTo(
      Math.hypot(line0, fitted.residualStandardDeviation ?? 0),
      12,
    );
    expect(predictionBand(fitted, 0, 4, 0.25).standardError).toBeCloseTo(
      predictionBand(fitted, 0).standardError ?? 0,
      12,
    );
  });
});
