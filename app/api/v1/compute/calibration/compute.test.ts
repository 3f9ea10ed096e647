import { describe, expect, it } from "vitest";
import { calibrationComputation, runComputation } from "../registry";
import { calibrationResponse } from "./schema";

/** Massart et al., Handbook of Chemometrics and Qualimetrics A (1997), chapter 8, example 1. */
const MASSART = {
  concentrations: [0, 10, 20, 30, 40, 50],
  signals: [4, 21.2, 44.6, 61.8, 78, 105.2],
  readings: [[15], [90], [90, 90, 90, 90, 90]],
};

const compute = (body: unknown) => runComputation(calibrationComputation, body);

function answerTo(body: unknown) {
  const computed = compute(body);
  if (!computed.ok) throw new Error(JSON.stringify(computed.errors));
  return computed.answer;
}

describe("calibration", () => {
  it("answers in its own described shape, without loss on the way through JSON", () => {
    const answer = answerTo(MASSART);
    expect(calibrationResponse.parse(answer)).toEqual(answer);
    expect(JSON.parse(JSON.stringify(answer))).toEqual(answer);
  });

  it("finds the published line and readings", () => {
    const answer = answerTo(MASSART);
    expect(answer.slope.estimate).toBeCloseTo(1.98171429, 7);
    expect(answer.intercept.estimate).toBeCloseTo(2.92380952, 7);
    expect(answer.correlation).toBeCloseTo(-0.825723, 5);
    expect(answer.readings.map((one) => Number(one.standardError?.toFixed(6)))).toEqual([
      1.767278, 1.767747, 1.141204,
    ]);
    expect(answer.readings[0]?.interval?.[0]).toBeCloseTo(0.9668725, 6);
    expect(answer.limitOfDetection).toBeCloseTo((3.3 * 2.9911616) / 1.98171429, 5);
    expect(answer.limitOfQuantitation).toBeCloseTo((10 * 2.9911616) / 1.98171429, 5);
    expect(answer.degreesOfFreedom).toBe(4);
  });

  it("takes weights of standards and of readings", () => {
    const answer = answerTo({
      concentrations: [0, 10, 20, 30, 40, 50],
      signals: [4, 21.2, 44.6, 61.8, 78, 105.2],
      weights: [1.984, 1.417, 1.262, 0.372, 0.199, 0.109],
      readings: [[15], [90]],
      readingWeights: [1.67, 0.145],
    });
    expect(answer.readings.map((one) => Number(one.standardError?.toFixed(6)))).toEqual([0.892611, 2.829162]);
  });

  it("through the origin has no correlation, and curvature null with too few levels", () => {
    const answer = answerTo({ concentrations: [1, 2], signals: [2, 4.1], intercept: "none" });
    expect(answer).toMatchObject({
      covariance: null,
      correlation: null,
      lackOfFit: null,
      curvature: { fStatistic: null, pValue: null, quadratic: null },
      intercept: { estimate: 0, standardError: null, interval: null },
    });
  });

  it("says null, not zero, where two standards leave no uncertainty", () => {
    const answer = answerTo({ concentrations: [1, 2], signals: [2, 4], readings: [[3]] });
    expect(answer).toMatchObject({
      slope: { standardError: null, interval: null },
      residualStandardDeviation: null,
      limitOfDetection: null,
      linearRange: null,
      readings: [{ standardError: null, interval: null }],
    });
  });

  it("gives intervals at the level asked for", () => {
    const half = (level: number) => {
      const [low, high] = answerTo({ ...MASSART, level }).slope.interval ?? [0, 0];
      return high - low;
    };
    // t(0.995, 4)/t(0.975, 4) = 4.604095/2.776445.
    expect(half(0.99) / half(0.95)).toBeCloseTo(4.604095 / 2.776445, 5);
  });

  it("names readings outside the standards and what the standards do not show", () => {
    const codes = answerTo({ ...MASSART, readings: [[500]] }).flags.map((flag) => flag.code);
    expect(codes).toEqual(expect.arrayContaining(["reading-outside-standards", "straightness-not-shown"]));
  });

  it.each([
    ["no standards", { concentrations: [], signals: [] }, "concentrations"],
    ["fewer signals than concentrations", { concentrations: [1, 2], signals: [1] }, "signals"],
    ["a word among the signals", { concentrations: [1, 2], signals: [1, "two"] }, "signals.1"],
    ["a weight of zero", { ...MASSART, weights: [1, 1, 1, 0, 1, 1] }, "weights.3"],
    ["weights for some standards only", { ...MASSART, weights: [1] }, "weights"],
    ["an unknown without signals", { ...MASSART, readings: [[1], []] }, "readings.1"],
    ["weights for some readings only", { ...MASSART, readingWeights: [1] }, "readingWeights"],
    ["one concentration only", { concentrations: [1, 1], signals: [1, 2] }, "concentrations"],
    ["an intercept in words", { ...MASSART, intercept: "maybe" }, "intercept"],
  ])("refuses %s and names the place", (_, body, place) => {
    const computed = compute(body);
    expect(computed.ok).toBe(false);
    expect(computed.ok || computed.errors[0]?.path).toBe(place);
    expect(computed.ok || computed.errors[0]?.message).toMatch(/\w/);
  });
});
