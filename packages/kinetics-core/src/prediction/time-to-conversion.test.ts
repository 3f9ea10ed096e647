import fc from "fast-check";
import { powerEquation, reversibleEquation } from "kinetics-core/rate-equation";
import { describe, expect, it } from "vitest";
import type { FittedLaw } from "./fitted-law";
import { decayTimes, halfLife, type TimeToConversion, timeToConversion } from "./time-to-conversion";

/** v = k [A]^n, or with further species, without uncertainty unless given. */
function power(
  orders: Readonly<Record<string, number>>,
  rateConstant: number,
  changes: Partial<FittedLaw> = {},
): FittedLaw {
  return {
    equation: powerEquation(Object.keys(orders)),
    logRateConstant: Math.log(rateConstant),
    parameters: Object.values(orders),
    covariance: null,
    degreesOfFreedom: null,
    betweenRunStandardDeviation: null,
    studied: {},
    level: 0.95,
    ...changes,
  };
}

const aLone = (start: number) => ({ concentrations: { A: start }, stoichiometricNumbers: { A: -1 } });

function predicted(result: ReturnType<typeof timeToConversion>): TimeToConversion {
  if (result.status !== "predicted") throw new Error(result.message);
  return result;
}

describe("half-lives in closed form", () => {
  // Orders 0, 1 and 2: OpenStax Chemistry 2e, table 12.2; the others (2^(n−1) − 1)/((n−1) k c0^(n−1)), k = 0.3, c0 = 2.
  it.each([
    [0, 3.333333333],
    [0.5, 2.761423749],
    [1, 2.310490602],
    [1.5, 1.952621459],
    [2, 1.666666667],
    [3, 1.25],
  ])("order %s: %s", (order, expected) => {
    const result = predicted(halfLife(power({ A: order }, 0.3), aLone(2)));
    expect(result.ofTheLaw.estimate).toBeCloseTo(expected, 8);
    expect(result.concentrationExponent).toBeCloseTo(1 - order, 9);
    expect(result.flags.map((flag) => flag.code)).toEqual(order === 1 ? [] : ["depends-on-start"]);
  });

  it("time to any residual fraction f, any order: (f^(1−n) − 1)/((n−1) k c0^(n−1))", () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1, max: 3.5, noNaN: true }).filter((n) => Math.abs(n - 1) > 1e-3),
        fc.double({ min: 0.001, max: 0.999, noNaN: true }),
        fc.double({ min: 1e-6, max: 10, noNaN: true }),
        (n, conversion, start) => {
          const result = predicted(timeToConversion(power({ A: n }, 0.02), aLone(start), conversion));
          const expected = ((1 - conversion) ** (1 - n) - 1) / ((n - 1) * 0.02 * start ** (n - 1));
          expect(Number(result.ofTheLaw.estimate) / expected).toBeCloseTo(1, 8);
        },
      ),
      { numRuns: 100 },
    );
  });

  it("mixed second order, A and B unequal", () => {
    const mixture = {
      concentrations: { A: 0.01, B: 0.025 },
      stoichiometricNumbers: { A: -1, B: -1 },
    };
    const result = predicted(timeToConversion(power({ A: 1, B: 1 }, 2.5), mixture, 0.9));
    const expected = Math.log((0.016 * 0.01) / (0.001 * 0.025)) / (0.015 * 2.5);
    expect(Number(result.ofTheLaw.estimate) / expected).toBeCloseTo(1, 9);
  });

  it("a stoichiometric number of 2 halves the time; DT90 of first order is 3.32 half-lives", () => {
    const twice = { concentrations: { A: 2 }, stoichiometricNumbers: { A: -2 } };
    expect(predicted(halfLife(power({ A: 1 }, 0.3), twice)).ofTheLaw.estimate).toBeCloseTo(1.155245301, 8);
    const { dt50, dt90 } = decayTimes(power({ A: 1 }, 0.3), aLone(2));
    expect(Number(predicted(dt90).ofTheLaw.estimate) / Number(predicted(dt50).ofTheLaw.estimate)).toBeCloseTo(
      Math.log2(10),
      9,
    );
  });

  it("zero order in the reactant that runs out: propanone, acid and iodine", () => {
    const mixture = {
      concentrations: { propanone: 1, acid: 0.1, iodine: 0.001 },
      stoichiometricNumbers: { propanone: -1, iodine: -1, acid: 1 },
    };
    const law = power({ propanone: 1, acid: 1 }, 3e-5);
    const result = predicted(timeToConversion(law, mixture, 0.5));
    expect(result.species).toBe("iodine");
    // Nearly constant rate 3e-6 mol/(L s).
    expect(Number(result.ofTheLaw.estimate)).toBeGreaterThan((0.0005 / 3e-6) * 0.99);
    expect(Number(result.ofTheLaw.estimate)).toBeLessThan(0.0005 / 3e-6);
    expect(timeToConversion(law, mixture, 0.5, "propanone")).toMatchObject({
      status: "not-reached",
      message: expect.stringContaining("at 0.10 % iodine is used up"),
    });
  });

  it("reversible first order: half-way to equilibrium after ln 2/(k (1 + 1/K)), and no further than it", () => {
    const law: FittedLaw = {
      ...power({}, 0.02),
      equation: reversibleEquation({
        forward: [{ species: "A", order: 1 }],
        reverse: [{ species: "P", order: 1 }],
        equilibriumConstant: 3,
      }),
      parameters: [],
    };
    const mixture = { concentrations: { A: 0.4, P: 0 }, stoichiometricNumbers: { A: -1, P: 1 } };
    const result = predicted(halfLife(law, mixture));
    expect(Number(result.ofTheLaw.estimate)).toBeCloseTo(Math.LN2 / (0.02 * (4 / 3)), 8);
    expect(result.conversion).toBeCloseTo(0.375, 12);
    expect(timeToConversion(law, mixture, 0.76)).toMatchObject({
      status: "not-reached",
      message: expect.stringContaining("at 75 % the reaction comes to its equilibrium"),
    });
    expect(timeToConversion(law, { ...mixture, concentrations: { A: 0, P: 1 } }, 0.5).status).not.toBe(
      "predicted",
    );
  });
});

describe("uncertainty of a time", () => {
  const covariance = [
    [0.0025, 0.0004],
    [0.0004, 0.0002],
  ];
  const law = power({ A: 1.5 }, 0.3, { covariance, degreesOfFreedom: 6, betweenRunStandardDeviation: 0.04 });

  it("has the gradient that finite differences give", () => {
    const at = (logK: number, order: number) =>
      predicted(timeToConversion(power({ A: order }, Math.exp(logK)), aLone(0.2), 0.8)).logTime.logarithm;
    const h = 1e-5;
    const gradient = [
      (at(Math.log(0.3) + h, 1.5) - at(Math.log(0.3) - h, 1.5)) / (2 * h),
      (at(Math.log(0.3), 1.5 + h) - at(Math.log(0.3), 1.5 - h)) / (2 * h),
    ];
    const expected = gradient.reduce(
      (sum, a, i) => sum + gradient.reduce((inner, b, j) => inner + a * b * (covariance[i]?.[j] ?? 0), 0),
      0,
    );
    const { logTime } = predicted(timeToConversion(law, aLone(0.2), 0.8));
    expect(Number(logTime.variance) / expected).toBeCloseTo(1, 7);
    expect(Number(logTime.newRunVariance) - Number(logTime.variance)).toBeCloseTo(0.0016, 12);
  });

  it("makes a back-transformed interval that a new run's exceeds, beside the symmetric one", () => {
    const { ofTheLaw, newRun, symmetricInterval } = predicted(halfLife(law, aLone(0.2)));
    const [low = 0, high = 0] = ofTheLaw.interval ?? [];
    expect(low * high).toBeCloseTo(Number(ofTheLaw.estimate) ** 2, 8);
    expect(newRun.interval?.[0]).toBeLessThan(low);
    expect(newRun.interval?.[1]).toBeGreaterThan(high);
    const [below = 0, above = 0] = symmetricInterval ?? [];
    expect(below + above).toBeCloseTo(2 * Number(ofTheLaw.estimate), 8);
  });

  it("is null without a covariance, and without τ for a new run", () => {
    const bare = predicted(halfLife(power({ A: 1 }, 0.3), aLone(1)));
    expect(bare.ofTheLaw).toMatchObject({ standardError: null, interval: null });
    expect(bare.newRun.estimate).toBeNull();
    expect(bare.symmetricInterval).toBeNull();
  });
});

describe("what cannot be predicted", () => {
  const law = power({ A: 1, B: 1 }, 0.3, { studied: { A: [0.1, 1], B: [0.1, 1] } });
  const mixture = { concentrations: { A: 0.2, B: 0.2 }, stoichiometricNumbers: { A: -1, B: -1 } };

  it.each([
    [{ ...mixture, concentrations: { A: 0.2 } }, 0.5, "bad-mixture", "concentrations.B"],
    [{ ...mixture, concentrations: { A: 0.2, B: -1 } }, 0.5, "bad-mixture", "concentrations.B"],
    [{ ...mixture, concentrations: { A: 0, B: 1 } }, 0.5, "bad-mixture", "stoichiometricNumbers"],
    [{ ...mixture, stoichiometricNumbers: {} }, 0.5, "bad-mixture", "stoichiometricNumbers"],
    [mixture, 1, "bad-mixture", "conversion"],
    [
      { concentrations: { A: 0.2, B: 0 }, stoichiometricNumbers: { A: -1 } },
      0.5,
      "no-rate",
      "concentrations",
    ],
  ])("says which value and why: %#", (given, conversion, status, place) => {
    const result = timeToConversion(law, given, conversion);
    expect(result).toMatchObject({ status, place, message: expect.stringMatching(/\w/) });
  });

  it("a reaction that its own product must start does not start without it", () => {
    const autocatalytic = power({ A: 1, P: 1 }, 0.3);
    const mixtureWith = (P: number) => ({
      concentrations: { A: 0.2, P },
      stoichiometricNumbers: { A: -1, P: 1 },
    });
    expect(timeToConversion(autocatalytic, mixtureWith(0), 0.5).status).toBe("no-rate");
    // k t = ln[(A0 P)/(P0 A)]/(A0 + P0).
    const expected = Math.log((0.2 * 0.101) / (0.001 * 0.1)) / (0.201 * 0.3);
    const found = predicted(timeToConversion(autocatalytic, mixtureWith(0.001), 0.5));
    expect(Number(found.ofTheLaw.estimate) / expected).toBeCloseTo(1, 9);
  });

  it("a product that inhibits by a negative order does not stop the start", () => {
    const inhibited = power({ A: 1, P: -0.5 }, 0.3);
    const result = predicted(
      timeToConversion(
        inhibited,
        { concentrations: { A: 0.2, P: 0 }, stoichiometricNumbers: { A: -1, P: 1 } },
        0.5,
      ),
    );
    // k t = ∫ √x/(0.2 − x) dx = √0.2 (2 artanh √½ − 2 √½).
    const expected = (Math.sqrt(0.2) * (2 * Math.atanh(Math.SQRT1_2) - 2 * Math.SQRT1_2)) / 0.3;
    expect(Number(result.ofTheLaw.estimate) / expected).toBeCloseTo(1, 7);
  });

  it("flags starting concentrations outside the runs", () => {
    const result = predicted(timeToConversion(law, { ...mixture, concentrations: { A: 0.2, B: 3 } }, 0.5));
    expect(result.flags[0]).toMatchObject({
      code: "concentration-extrapolated",
      message: expect.stringContaining("[B] = 3 is 3 times the most that was studied"),
    });
  });
});
