import { describe, expect, it } from "vitest";
import { criticalConcentration, detectionLimits, quantificationConcentration } from "./detection-limits";
import { line, scattered, x } from "./example-line";
import { readConcentration } from "./inverse-reading";

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
