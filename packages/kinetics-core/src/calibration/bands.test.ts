import { describe, expect, it } from "vitest";
import { confidenceBand, predictionBand } from "./bands";
import { line, scattered, x } from "./example-line";

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
