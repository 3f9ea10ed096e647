import { describe, expect, it } from "vitest";
import { calibrate } from "./calibrate";
import { calibrated, codes, exact, line, scattered, x } from "./example-line";

describe("the line", () => {
  it("loses no digits to a large offset or a small step of the concentrations", () => {
    const step = 1e-6;
    const far = line({ concentrations: x.map((value) => 300 + step * value), signals: scattered });
    const near = line({ concentrations: x, signals: scattered });
    expect(((far.slope.estimate ?? 0) * step) / (near.slope.estimate ?? 1)).toBeCloseTo(1, 7);
    const origin = line({ concentrations: x.map((value) => step * value), signals: scattered });
    expect(((origin.slope.estimate ?? 0) * step) / (near.slope.estimate ?? 1)).toBeCloseTo(1, 13);
  });

  it("counts a standard of weight 2 as it counts two standards of weight 1", () => {
    const doubled = line({ concentrations: [...x, 5], signals: [...scattered, scattered[5] ?? 0] });
    const weighted = line({ concentrations: x, signals: scattered, weights: [1, 1, 1, 1, 1, 2] });
    expect(weighted.slope.estimate).toBeCloseTo(doubled.slope.estimate ?? 0, 12);
    expect(weighted.intercept.estimate).toBeCloseTo(doubled.intercept.estimate ?? 0, 12);
    expect(weighted.degreesOfFreedom).toBe(doubled.degreesOfFreedom - 1);
  });

  it("through the origin has no intercept to be uncertain about", () => {
    const through = line({ concentrations: x, signals: exact, intercept: "none" });
    expect(through.intercept).toEqual({ estimate: 0, standardError: null, interval: null, level: 0.95 });
    expect(through).toMatchObject({ covariance: null, correlation: null, degreesOfFreedom: 5 });
    // Σxy/Σx² = (Σx + 2Σx²)/Σx² = 2 + 15/55.
    expect(through.slope.estimate).toBeCloseTo(2 + 15 / 55, 12);
  });

  it("of two standards is exact and claims no uncertainty", () => {
    const two = calibrated({ concentrations: [1, 2], signals: [3, 5], readings: [[4]] });
    expect(two.line.slope).toMatchObject({ standardError: null, interval: null });
    expect(two.line.slope.estimate).toBeCloseTo(2, 14);
    expect(two).toMatchObject({ limitOfDetection: null, limitOfQuantitation: null });
    expect(two.readings[0]).toMatchObject({ standardError: null, interval: null, g: null });
    expect(two.readings[0]?.estimate).toBeCloseTo(1.5, 14);
    expect(codes(two)).toContain("no-freedom");
  });

  it.each([
    ["arrays of different length", { concentrations: [1, 2], signals: [1] }, "lengths-differ", "signals"],
    [
      "weights of another length",
      { concentrations: [1, 2], signals: [1, 2], weights: [1] },
      "lengths-differ",
      "weights",
    ],
    ["what is no number", { concentrations: [1, 2], signals: [1, Number.NaN] }, "not-finite", "signals"],
    [
      "a weight of zero",
      { concentrations: [1, 2], signals: [1, 2], weights: [1, 0] },
      "bad-weight",
      "weights",
    ],
    ["one level", { concentrations: [2, 2], signals: [1, 2] }, "too-few-standards", "concentrations"],
    ["nothing", { concentrations: [], signals: [] }, "too-few-standards", "concentrations"],
    [
      "blanks alone for a line through the origin",
      { concentrations: [0, 0], signals: [1, 2], intercept: "none" as const },
      "too-few-standards",
      "concentrations",
    ],
    [
      "figures whose squares overflow",
      { concentrations: [1, 2, 3], signals: [1e200, -1e200, 1e200] },
      "beyond-precision",
      "signals",
    ],
  ])("refuses %s with the argument and a way out", (_, input, status, argument) => {
    const result = calibrate(input);
    expect(result).toMatchObject({ status, argument });
    expect("message" in result && result.message).toMatch(/\.$/);
  });

  it.each([
    ["an unknown without signals", { readings: [[1], []] }, "reading-empty", 1],
    ["a signal that is no number", { readings: [[1, Number.POSITIVE_INFINITY]] }, "reading-not-finite", 0],
    ["too few weights of readings", { readings: [[1]], readingWeights: [] }, "lengths-differ", null],
    ["a weight of a reading below 0", { readings: [[1]], readingWeights: [-1] }, "bad-weight", 0],
  ])("refuses %s", (_, more, status, index) => {
    expect(calibrate({ concentrations: x, signals: scattered, ...more })).toMatchObject({ status, index });
  });
});
