import { describe, expect, it } from "vitest";
import type { CalibrationInput, CalibrationLine } from "./calibration";
import { criticalConcentration, detectionLimits, quantificationConcentration } from "./detection-limits";
import { fitCalibrationLine } from "./fit-calibration-line";
import { readConcentration } from "./inverse-reading";

function line(input: CalibrationInput): CalibrationLine {
  const result = fitCalibrationLine(input);
  if (result.status !== "fitted") throw new Error(result.message);
  return result;
}

/** Six standards on y = 1 + 2 x with errors of one size, alternating. */
const x = [0, 1, 2, 3, 4, 5];
const scattered = x.map((value, i) => 1 + 2 * value + 0.05 * (i % 2 === 0 ? 1 : -1));

describe("detection", () => {
  it("limits scale with the deviation over the slope, and the weight of a blank takes the scaling of weights out", () => {
    const weights = [4, 4, 1, 1, 1, 1];
    const one = line({ concentrations: x, signals: scattered, weights });
    const ten = line({ concentrations: x, signals: scattered, weights: weights.map((w) => 10 * w) });
    const plain = detectionLimits(one);
    expect(plain.limitOfDetection).toBeCloseTo(
      (3.3 * (one.residualStandardDeviation ?? 0)) / (one.slope.estimate ?? 1),
      12,
    );
    expect((plain.limitOfQuantitation ?? 0) / (plain.limitOfDetection ?? 1)).toBeCloseTo(10 / 3.3, 12);
    expect(detectionLimits(one, { weight: 4 }).limitOfDetection).toBeCloseTo(
      detectionLimits(ten, { weight: 40 }).limitOfDetection ?? 0,
      12,
    );
  });

  it("the quantification concentration is read to a third of itself, or does not exist", () => {
    const fitted = line({ concentrations: x, signals: scattered });
    const at = quantificationConcentration(fitted, 0.05) ?? 0;
    const { estimate, standardError } = readConcentration(fitted, {
      signal: (fitted.intercept.estimate ?? 0) + (fitted.slope.estimate ?? 0) * at,
      replicates: 1,
    });
    // t(0.975, 4) = 2.776445.
    expect((2.776445 * (standardError ?? 0)) / (estimate ?? 1)).toBeCloseTo(1 / 3, 6);
    const flat = line({ concentrations: x, signals: [1, 1.4, 0.8, 1.5, 0.9, 1.3] });
    expect(quantificationConcentration(flat, 0.05)).toBeNull();
    const two = line({ concentrations: [0, 1], signals: [0, 1] });
    expect([criticalConcentration(two, 0.05), quantificationConcentration(two, 0.05)]).toEqual([null, null]);
  });
});
