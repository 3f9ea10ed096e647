import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { runComputation, temperatureComputation } from "../registry";
import { temperatureResponse } from "./schema";

/** 2 HI → H₂ + I₂, OpenStax Chemistry 2e, example 12.13; least squares of all points gives 185.3 kJ/mol. */
const HYDROGEN_IODIDE = {
  points: [
    { temperature: 555, k: 3.52e-7 },
    { temperature: 575, k: 1.22e-6 },
    { temperature: 645, k: 8.59e-5 },
    { temperature: 700, k: 1.16e-3 },
    { temperature: 781, k: 3.95e-2 },
  ],
};

const compute = (body: unknown) => runComputation(temperatureComputation, body);

function answerTo(body: unknown) {
  const computed = compute(body);
  if (!computed.ok) throw new Error(JSON.stringify(computed.errors));
  return computed.answer;
}

describe("temperature", () => {
  it("answers in its own described shape, without loss on the way through JSON", () => {
    const answer = answerTo({ ...HYDROGEN_IODIDE, at: [600, 900] });
    expect(temperatureResponse.parse(answer)).toEqual(answer);
    expect(JSON.parse(JSON.stringify(answer))).toEqual(answer);
  });

  it("finds the activation parameters of a published table", () => {
    const answer = answerTo(HYDROGEN_IODIDE);
    expect(answer.activationEnergy.estimate).toBeCloseTo(185307.86, 1);
    expect(answer.activationEnergy.standardError).toBeCloseTo(2177.39, 1);
    expect(answer.logPreExponential.estimate).toBeCloseTo(25.203822, 5);
    expect(answer.enthalpyOfActivation.estimate).toBeCloseTo(179894.3, 0);
    expect(answer.entropyOfActivation.estimate).toBeCloseTo(-50.242307, 5);
  });

  it("reads degrees Celsius and gives them back", () => {
    const inCelsius = answerTo({
      points: HYDROGEN_IODIDE.points.map(({ temperature, k }) => ({ temperature: temperature - 273.15, k })),
      temperatureUnit: "degC",
      at: [400],
    });
    const inKelvins = answerTo({ ...HYDROGEN_IODIDE, at: [673.15] });
    expect(inCelsius.activationEnergy.estimate).toBeCloseTo(Number(inKelvins.activationEnergy.estimate), 5);
    expect(inCelsius.range[0]).toBeCloseTo(281.85, 9);
    expect(inCelsius.rateConstants[0]?.temperature).toBe(400);
    expect(
      Number(inCelsius.rateConstants[0]?.rateConstant.estimate) /
        Number(inKelvins.rateConstants[0]?.rateConstant.estimate),
    ).toBeCloseTo(1, 9);
  });

  it("refers the entropy of activation to seconds and mol/L", () => {
    const perMinute = HYDROGEN_IODIDE.points.map((point) => ({ ...point, k: (60 * point.k) / 1000 }));
    const answer = answerTo({
      points: perMinute,
      overallOrder: 2,
      concentrationUnit: "mmol/L",
      timeUnit: "min",
    });
    expect(answer.entropyOfActivation.estimate).toBeCloseTo(-50.242307, 5);
    expect(answer.logPreExponential.estimate).toBeCloseTo(25.203822 + Math.log(60 / 1000), 5);
  });

  it("weights by stated errors alone where that is asked for: ln k of three points by hand", () => {
    const points = [
      { temperature: 300, k: 1, kStandardError: 0.01 },
      { temperature: 310, k: 2.1, kStandardError: 0.021 },
      { temperature: 320, k: 4, kStandardError: 0.4 },
    ];
    const weights = points.map(({ k, kStandardError }) => (k / kStandardError) ** 2);
    const x = points.map(({ temperature }) => 1 / temperature);
    const y = points.map(({ k }) => Math.log(k));
    const mean = (values: readonly number[]) =>
      values.reduce((sum, value, j) => sum + value * (weights[j] ?? 0), 0) /
      weights.reduce((sum, weight) => sum + weight, 0);
    const covered = (a: readonly number[], b: readonly number[]) =>
      a.reduce((sum, value, j) => sum + (weights[j] ?? 0) * (value - mean(a)) * ((b[j] ?? 0) - mean(b)), 0);
    const expected = (-8.31446261815324 * covered(x, y)) / covered(x, x);
    const stated = answerTo({ points, weighting: "stated" });
    expect(Number(stated.activationEnergy.estimate) / expected).toBeCloseTo(1, 9);
    expect(answerTo({ points }).activationEnergy.estimate).not.toBeCloseTo(expected, -1);
  });

  it("says null, not zero, where two temperatures leave no uncertainty, and flags it", () => {
    const answer = answerTo({ points: HYDROGEN_IODIDE.points.slice(0, 2) });
    expect(answer.activationEnergy).toMatchObject({ standardError: null, interval: null });
    expect(answer).toMatchObject({ curvature: null, degreesOfFreedom: 0 });
    expect(answer.flags).toContainEqual(
      expect.objectContaining({ code: "too-few-temperatures", severity: "blocks" }),
    );
  });

  it("flags a temperature outside the studied range", () => {
    const { flags } = answerTo({ ...HYDROGEN_IODIDE, at: [600, 900] });
    expect(flags.filter((flag) => flag.code === "temperature-extrapolated")).toHaveLength(1);
  });

  it.each([
    ["no points", { points: [] }, "points"],
    ["one temperature", { points: [{ temperature: 300, k: 1 }] }, "points"],
    [
      "a rate constant of 0",
      { points: [...HYDROGEN_IODIDE.points, { temperature: 800, k: 0 }] },
      "points.5.k",
    ],
    [
      "a temperature below absolute zero",
      { points: [{ temperature: -5, k: 1 }, ...HYDROGEN_IODIDE.points] },
      "points.0.temperature",
    ],
    [
      "a negative standard error",
      { points: [{ temperature: 300, k: 1, kStandardError: -1 }, ...HYDROGEN_IODIDE.points] },
      "points.0.kStandardError",
    ],
    ["mmol/L without an order", { ...HYDROGEN_IODIDE, concentrationUnit: "mmol/L" }, "overallOrder"],
    ["an unknown unit", { ...HYDROGEN_IODIDE, temperatureUnit: "F" }, "temperatureUnit"],
    ["a wanted temperature of 0 K", { ...HYDROGEN_IODIDE, at: [0] }, "at.0"],
  ])("refuses %s and names the place", (_, body, place) => {
    const computed = compute(body);
    expect(computed.ok).toBe(false);
    expect(computed.ok || computed.errors[0]?.path).toBe(place);
    expect(computed.ok || computed.errors[0]?.message).toMatch(/\w/);
  });
});

describe("any request that the schema lets through", () => {
  const point = fc.record(
    {
      temperature: fc.double({ min: 1e-3, max: 1e5, noNaN: true }),
      k: fc.double({ min: 1e-20, max: 1e20, noNaN: true }),
      kStandardError: fc.double({ min: 1e-20, max: 1e20, noNaN: true }),
      temperatureStandardError: fc.double({ min: 0, max: 100, noNaN: true }),
    },
    { requiredKeys: ["temperature", "k"] },
  );

  it("gets an answer in the described shape or the place at fault", () => {
    fc.assert(
      fc.property(fc.array(point, { minLength: 1, maxLength: 8 }), (points) => {
        const computed = compute({ points, at: [1e-3, 300, 1e5] });
        if (computed.ok) expect(temperatureResponse.safeParse(computed.answer).success).toBe(true);
        else expect(computed.errors[0]?.path).toMatch(/^points/);
      }),
      { numRuns: 200 },
    );
  });
});
