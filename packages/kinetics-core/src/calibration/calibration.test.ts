import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import {
  type CalibrateInput,
  type Calibration,
  type CalibrationLine,
  calibrate,
  confidenceBand,
  criticalConcentration,
  detectionLimits,
  fitCalibrationLine,
  linearRange,
  linearRangeFlags,
  predictionBand,
  pureErrorOf,
  quantificationConcentration,
  readConcentration,
  standardAdditions,
  straightnessAt,
  testCurvature,
  testLackOfFit,
  unevenScatter,
} from "./index";

function line(input: CalibrateInput): CalibrationLine {
  const result = fitCalibrationLine(input);
  if (result.status !== "fitted") throw new Error(result.message);
  return result;
}

function calibrated(input: CalibrateInput): Calibration {
  const result = calibrate(input);
  if (result.status !== "calibrated") throw new Error(result.message);
  return result;
}

const codes = (result: Calibration) => result.flags.map((flag) => flag.code);

/** Six standards on y = 1 + 2 x with errors of one size, alternating. */
const x = [0, 1, 2, 3, 4, 5];
const scattered = x.map((value, i) => 1 + 2 * value + 0.05 * (i % 2 === 0 ? 1 : -1));
const exact = x.map((value) => 1 + 2 * value);

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

describe("readings", () => {
  const fitted = line({ concentrations: x, signals: scattered });

  it("ends of the interval are where the prediction band passes through the signal", () => {
    const { interval } = readConcentration(fitted, { signal: 7.3, replicates: 3 });
    const [low, high] = interval ?? [0, 0];
    expect(predictionBand(fitted, low, 3).interval?.[1]).toBeCloseTo(7.3, 9);
    expect(predictionBand(fitted, high, 3).interval?.[0]).toBeCloseTo(7.3, 9);
  });

  it("standard additions are the mirrored reading of an exact zero", () => {
    const added = standardAdditions(fitted);
    const { intercept, slope } = fitted;
    expect(added.estimate).toBeCloseTo((intercept.estimate ?? 0) / (slope.estimate ?? 1), 12);
    const [low, high] = added.interval ?? [0, 0];
    expect(confidenceBand(fitted, -low).interval?.[0]).toBeCloseTo(0, 9);
    expect(confidenceBand(fitted, -high).interval?.[1]).toBeCloseTo(0, 9);
  });

  it("have no interval, and say why, where the slope may be zero", () => {
    const flat = calibrated({
      concentrations: x,
      signals: [1, 1.4, 0.8, 1.5, 0.9, 1.3],
      readings: [[1.1]],
    });
    expect(flat.readings[0]?.interval).toBeNull();
    expect(flat.readings[0]?.g).toBeGreaterThan(1);
    expect(flat.readings[0]?.set?.kind).not.toBe("bounded");
    expect(codes(flat)).toEqual(expect.arrayContaining(["slope-not-shown", "reading-unbounded"]));
    const level = calibrated({ concentrations: [0, 1, 2], signals: [1, 2, 1], readings: [[1]] });
    expect(level.readings[0]).toMatchObject({ estimate: null, interval: null });
  });

  it("outside the standards, below the limits, or with restless replicates are named", () => {
    const result = calibrated({
      concentrations: x,
      signals: scattered,
      readings: [[13], [1.06], [1.3], [5, 6], [5]],
    });
    const message = (code: string) => result.flags.find((flag) => flag.code === code)?.message ?? "";
    expect(message("reading-outside-standards")).toMatch(/^Reading 1 lies outside the standards, 0 to 5,/);
    expect(message("reading-below-detection")).toMatch(/^Reading 2 is below/);
    expect(message("reading-below-quantitation")).toMatch(/^Reading 3 is between/);
    expect(message("reading-scatter")).toMatch(/^Reading 4 has/);
    expect(codes(result)).not.toContain("reading-unbounded");
  });
});

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

describe("replicates", () => {
  const concentrations = [1, 1, 2, 2, 3, 3, 4, 4];

  it("tell what the line misses from what scatters", () => {
    const bent = [1, 1.02, 2, 2.02, 2.8, 2.82, 3.4, 3.42];
    const fitted = line({ concentrations, signals: bent });
    const pure = pureErrorOf(fitted);
    expect(pure?.degreesOfFreedom).toBe(4);
    // Each pair differs by 0.02: s² = 0.02²/2.
    expect(pure?.standardDeviation).toBeCloseTo(0.02 / Math.SQRT2, 12);
    const lack = testLackOfFit(fitted);
    expect(lack?.degreesOfFreedom).toEqual([2, 4]);
    expect(lack?.pValue).toBeLessThan(1e-3);
    expect(codes(calibrated({ concentrations, signals: bent }))).toContain("lack-of-fit");
  });

  it("are needed for the test, must scatter, and need more levels than parameters", () => {
    expect(testLackOfFit(line({ concentrations: x, signals: scattered }))).toBeNull();
    expect(testLackOfFit(line({ concentrations, signals: [1, 1, 2, 2, 2.8, 2.8, 3.4, 3.4] }))).toBeNull();
    expect(testLackOfFit(line({ concentrations: [1, 1, 2, 2], signals: [1, 1.1, 2, 2.1] }))).toBeNull();
    expect(pureErrorOf(line({ concentrations: x, signals: scattered }))).toBeNull();
  });

  it("of one level are one level after a change of unit", () => {
    const converted = concentrations.map((value, i) => (i % 2 === 0 ? value * 0.1 * 3 : (value * 3) / 10));
    expect(pureErrorOf(line({ concentrations: converted, signals: concentrations }))?.degreesOfFreedom).toBe(
      4,
    );
  });

  it("compare the scatter of the ends", () => {
    const growing = [1, 1.01, 2, 2.05, 3, 3.2, 4, 5];
    const pure = pureErrorOf(line({ concentrations, signals: growing }));
    const uneven = pure === null ? null : unevenScatter(pure);
    expect(uneven?.ratio).toBeCloseTo(1e4, 4);
  });
});

describe("curvature", () => {
  it("needs a level and a standard to spare", () => {
    expect(testCurvature(line({ concentrations: [0, 1, 2], signals: [0, 1, 3] })).status).toBe(
      "too-few-standards",
    );
    const twoLevels = line({ concentrations: [1, 1, 2, 2], signals: [1, 2, 3, 4] });
    expect(testCurvature(twoLevels).status).toBe("too-few-standards");
    const through = { concentrations: [0, 1, 2], signals: [0.01, 1, 3], intercept: "none" as const };
    expect(testCurvature(line(through)).status).toBe("tested");
  });

  it("is no number on a line without scatter, and a finite one on an exact parabola", () => {
    expect(testCurvature(line({ concentrations: x, signals: exact })).status).toBe("exact");
    const parabola = testCurvature(line({ concentrations: x, signals: x.map((c) => c + 0.1 * c * c) }));
    if (parabola.status !== "tested") throw new Error(parabola.status);
    expect(parabola.quadratic.estimate).toBeCloseTo(0.1, 12);
    expect(Number.isFinite(parabola.fStatistic)).toBe(true);
    expect(parabola.pValue).toBeLessThan(1e-20);
  });
});

describe("the linear range", () => {
  /** Signals with an exact slope of 1, an exact quadratic coefficient, and residuals of exactly this deviation. */
  function standards(quadratic: number, deviation: number, levels: readonly number[] = [1, 2, 3, 4, 5, 6]) {
    const contrast = [1, -3, 2, 2, -3, 1];
    const norm = Math.sqrt(contrast.reduce((sum, value) => sum + value ** 2, 0) / 3);
    return {
      concentrations: levels,
      signals: levels.map((c, i) => c + quadratic * c * c + (deviation * (contrast[i] ?? 0)) / norm),
    };
  }

  it("six standards with 1 % scatter show straightness for a ninth of the range, and say how many would show all", () => {
    const range = linearRange(line(standards(0, 0.06)));
    if (range.status !== "assessed") throw new Error(range.message);
    expect(range.straightUpTo / range.highest).toBeCloseTo(1 / 9.3, 2);
    expect(range.curvedFrom).toBeNull();
    // u(q) = σ/√(112/3), t(0.975, 3) = 3.182446; q itself is 0 here.
    const error = 0.06 / Math.sqrt(112 / 3);
    expect(range.mostPerConcentration).toBeCloseTo(3.182446 * error, 6);
    expect(range.straightUpTo).toBeCloseTo(0.02 / (3.182446 * error), 6);
    const more = range.moreStandards ?? 0;
    expect(more).toBeGreaterThan(300);
    const enough = (1.96 + 1.2816) * error * Math.sqrt(6 / (6 + more)) * 6;
    expect(enough).toBeCloseTo(0.02, 3);
    expect(range.scatterNeeded).toBeCloseTo(0.02 / 6 / ((3.182446 + 1.2816) * error), 6);
  });

  it("the further standards that it asks for do show it, in about four cases of five", () => {
    const range = linearRange(line(standards(0, 0.06)));
    const rounds = range.status === "assessed" ? Math.ceil((range.moreStandards ?? 0) / 6) : 0;
    const draws = randomDraws(77);
    let shown = 0;
    for (let replicate = 0; replicate < 200; replicate++) {
      const concentrations = Array.from({ length: 6 * (rounds + 1) }, (_, i) => 1 + (i % 6));
      const signals = concentrations.map((c) => c + 0.06 * draws.normal());
      const found = linearRange(line({ concentrations, signals }));
      if (found.status === "assessed" && found.straightUpTo === found.highest) shown += 1;
    }
    // Central 99.8 % of a binomial of 200 with 80 %: 142 to 177 (SciPy 1.17).
    expect(shown).toBeGreaterThanOrEqual(142);
    expect(shown).toBeLessThanOrEqual(177);
  });

  it("a precise line is straight to its highest standard, a bent one curved from a concentration on", () => {
    const straight = linearRange(line(standards(0, 0.0004)));
    expect(straight).toMatchObject({ straightUpTo: 6, curvedFrom: null, moreStandards: null });
    const bent = line(standards(-0.02, 0.0004));
    const range = linearRange(bent);
    if (range.status !== "assessed") throw new Error(range.message);
    expect(range.curvedFrom).toBeGreaterThan((0.02 * 0.8) / 0.02);
    expect(range.curvedFrom).toBeLessThan(1.1);
    expect(range.straightUpTo).toBeLessThan(range.curvedFrom ?? 0);
    expect([0.5, 3].map((c) => straightnessAt(range, c))).toEqual(["straight", "curved"]);
    expect(range.moreStandards).toBeNull();
  });

  it("weakens where straightness is not shown and blocks where over a fifth of the points lie in the curve", () => {
    const range = linearRange(line(standards(-0.02, 0.0004)));
    const severity = (points: readonly number[]) =>
      linearRangeFlags(range, points, "readings").map((flag) => `${flag.code}: ${flag.severity}`);
    expect(severity([0.1, 0.2])).toEqual([]);
    expect(severity([0.1, 0.2, 0.3, 0.4, 5])).toEqual(["curvature-shown: weakens"]);
    expect(severity([0.1, 0.2, 0.3, 4, 5])).toEqual(["curvature-shown: blocks"]);
    const open = linearRange(line(standards(0, 0.06)));
    const [flag] = linearRangeFlags(open, [0.1, 4], "readings");
    expect(flag).toMatchObject({ code: "straightness-not-shown", severity: "weakens" });
    expect(flag?.message).toMatch(/readings at 4 lie beyond it.*more standards on the same levels/);
  });

  it("is not assessed with too few standards or a level line, and says so once", () => {
    const few = linearRange(line({ concentrations: [0, 1, 2], signals: [0, 1, 2.1] }));
    expect(few.status).toBe("not-assessed");
    expect(straightnessAt(few, 1)).toBe("not-shown");
    expect(linearRangeFlags(few, [1], "standards")[0]?.code).toBe("straightness-not-tested");
    expect(linearRange(line({ concentrations: [0, 1, 2, 3], signals: [1, 1, 1, 1] })).status).toBe(
      "not-assessed",
    );
    expect(linearRangeFlags(few, [], "readings")).toEqual([]);
  });
});

describe("findings about the line", () => {
  it("computed figures, little freedom, an intercept that is not needed and one that is", () => {
    expect(codes(calibrated({ concentrations: x, signals: exact }))).toContain("exact-table");
    expect(codes(calibrated({ concentrations: [0, 1, 2], signals: [0, 1, 2.1] }))).toContain(
      "little-freedom",
    );
    const near = calibrated({ concentrations: x, signals: scattered.map((value) => value - 1) });
    expect(codes(near)).toContain("intercept-covers-zero");
    expect(codes(calibrated({ concentrations: x, signals: scattered, intercept: "none" }))).toContain(
      "intercept-needed",
    );
  });

  it("with weights the limits are said to be those of a signal of weight 1", () => {
    const result = calibrated({ concentrations: x, signals: scattered, weights: [9, 4, 2, 1, 1, 1] });
    const flag = result.flags.find((one) => one.code === "limits-of-unit-weight");
    expect(flag?.message).toMatch(/weight of the lowest standard, 9/);
  });
});
