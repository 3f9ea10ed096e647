import fc from "fast-check";
import { GAS_CONSTANT } from "kinetics-core/quantities";
import { describe, expect, it } from "vitest";
import { fitTemperature } from "./fit-temperature";
import type { TemperatureFit, TemperatureInput } from "./temperature";

function fitted(input: TemperatureInput): TemperatureFit {
  const fit = fitTemperature(input);
  if (fit.status !== "fitted") throw new Error(`expected a fit, got ${fit.status}: ${fit.message}`);
  return fit;
}

function numbersIn(value: unknown): readonly number[] {
  if (typeof value === "number") return [value];
  return typeof value === "object" && value !== null ? Object.values(value).flatMap(numbersIn) : [];
}

const ENERGY = 52e3;
const LOG_A = 21;

function arrheniusPoints(kelvins: readonly number[], errors: readonly number[] = []) {
  return kelvins.map((temperatureKelvin, j) => ({
    temperatureKelvin,
    rateConstant: Math.exp(LOG_A - ENERGY / (GAS_CONSTANT * temperatureKelvin) + (errors[j] ?? 0)),
  }));
}

const FIVE = [288, 298, 308, 318, 328];
const ERRORS = [0.02, -0.03, 0.01, 0.015, -0.02];
const codes = (fit: TemperatureFit) => fit.flags.map((flag) => flag.code);

describe("activation parameters", () => {
  it("are recovered from an exact line, and E_a − ΔH‡ is R T at the centre", () => {
    const fit = fitted({ points: arrheniusPoints(FIVE) });
    expect(fit.activationEnergy.estimate).toBeCloseTo(ENERGY, 6);
    expect(fit.logPreExponential.estimate).toBeCloseTo(LOG_A, 10);
    const difference = Number(fit.activationEnergy.estimate) - Number(fit.enthalpyOfActivation.estimate);
    expect(difference / (GAS_CONSTANT / fit.arrhenius.centre)).toBeCloseTo(1, 2);
    expect(codes(fit)).toEqual([]);
  });

  it("scale with the unit of k alone: E_a and ΔH‡ stay, ln A moves by the logarithm of the factor", () => {
    fc.assert(
      fc.property(
        fc.double({ min: -30, max: 30, noNaN: true }),
        fc.array(fc.double({ min: -0.1, max: 0.1, noNaN: true }), { minLength: 5, maxLength: 5 }),
        (shift, errors) => {
          const points = arrheniusPoints(FIVE, errors);
          const one = fitted({ points });
          const other = fitted({
            points: points.map((point) => ({
              ...point,
              rateConstant: point.rateConstant * Math.exp(shift),
            })),
          });
          expect(other.activationEnergy.estimate).toBeCloseTo(Number(one.activationEnergy.estimate), 4);
          expect(other.enthalpyOfActivation.estimate).toBeCloseTo(
            Number(one.enthalpyOfActivation.estimate),
            4,
          );
          expect(other.logPreExponential.estimate).toBeCloseTo(
            Number(one.logPreExponential.estimate) + shift,
            7,
          );
        },
      ),
      { numRuns: 50 },
    );
  });

  it("do not depend on the order of the points", () => {
    const points = arrheniusPoints(FIVE, ERRORS).map((point, j) => ({
      ...point,
      rateConstantUncertainty: point.rateConstant * (0.01 + 0.01 * j),
    }));
    const one = fitted({ points });
    const other = fitted({ points: [...points].reverse() });
    expect(other.activationEnergy.estimate).toBeCloseTo(Number(one.activationEnergy.estimate), 5);
    expect(other.activationEnergy.standardError).toBeCloseTo(Number(one.activationEnergy.standardError), 6);
  });

  it("hold no NaN and no made-up zero, whatever the figures", () => {
    const point = fc.record({
      temperatureKelvin: fc.double({ min: 1, max: 5000, noNaN: true }),
      rateConstant: fc.double({ min: 1e-20, max: 1e20, noNaN: true }),
      rateConstantUncertainty: fc.double({ min: 0, max: 1e10, noNaN: true }),
      temperatureUncertaintyKelvin: fc.double({ min: 0, max: 50, noNaN: true }),
    });
    fc.assert(
      fc.property(fc.array(point, { maxLength: 8 }), (points) => {
        const fit = fitTemperature({ points, shared: [{ source: "thermometer", temperatureKelvin: 0.2 }] });
        expect(numbersIn(fit).filter((value) => !Number.isFinite(value))).toEqual([]);
        if (fit.status !== "fitted") expect(fit.message).toMatch(/\w/);
      }),
      { numRuns: 300 },
    );
  });
});

describe("weights", () => {
  const uneven = arrheniusPoints(FIVE, [0, 0, 0, 0, 0.4]).map((point, j) => ({
    ...point,
    rateConstantUncertainty: point.rateConstant * (j === 4 ? 0.3 : 0.01),
  }));

  it("pull a poor point's influence down, but never as far as its statement alone would", () => {
    const bias = (input: TemperatureInput) => {
      const estimate = fitted(input).activationEnergy.estimate;
      return Math.abs(Number(estimate) - ENERGY);
    };
    const equal = bias({
      points: uneven.map(({ temperatureKelvin, rateConstant }) => ({ temperatureKelvin, rateConstant })),
    });
    const scatter = bias({ points: uneven });
    const stated = bias({ points: uneven, weighting: "stated" });
    expect(scatter).toBeLessThan(0.9 * equal);
    expect(stated).toBeLessThan(scatter);
  });

  it("are equal where one point states nothing, which is said", () => {
    const [first, ...rest] = uneven;
    const { temperatureKelvin = 0, rateConstant = 0 } = first ?? {};
    const fit = fitted({ points: [{ temperatureKelvin, rateConstant }, ...rest] });
    expect(fit.residuals.map((one) => one.weight)).toEqual([1, 1, 1, 1, 1]);
    expect(codes(fit)).toContain("uncertainty-missing");
    expect(codes(fit)).toContain("rate-constant-poorly-known");
  });

  it("are doubted where degrees Celsius may stand for kelvins", () => {
    const celsius = [15, 25, 35, 45].map((temperatureKelvin, j) => ({
      temperatureKelvin,
      rateConstant: 2 ** j,
    }));
    expect(codes(fitted({ points: celsius }))).toContain("very-cold");
    expect(codes(fitted({ points: uneven }))).not.toContain("very-cold");
  });

  it("of all points that are poorly known are named", () => {
    const points = uneven.map((point, j) => ({
      ...point,
      rateConstantUncertainty: j < 2 ? point.rateConstant : 0.01 * point.rateConstant,
    }));
    const poor = fitted({ points }).flags.find(({ code }) => code === "rate-constant-poorly-known");
    expect(poor?.message).toContain("The rate constants of points 1 and 2 are known to worse than 20 %");
  });

  it("count a bath that was held badly: u(ln k) = E_a u(T)/(R T²)", () => {
    const points = arrheniusPoints(FIVE, ERRORS).map((point, j) => ({
      ...point,
      rateConstantUncertainty: 1e-6 * point.rateConstant,
      temperatureUncertaintyKelvin: j === 2 ? 1 : 0,
    }));
    const fit = fitted({ points, weighting: "stated" });
    const slope = Number(fit.activationEnergy.estimate) / GAS_CONSTANT;
    const own = (slope / 308 ** 2) ** 2 + 1e-12;
    expect(fit.residuals[2]?.weight).toBeCloseTo(1e-12 / own, 12);
  });
});

describe("points that lie on a line by luck", () => {
  const stated = (relative: number) =>
    fitted({
      points: arrheniusPoints([298, 308, 318]).map((point) => ({
        ...point,
        rateConstantUncertainty: relative * point.rateConstant,
      })),
    });

  it("keep the uncertainty that they state, propagated to E_a with z and not with t of one degree", () => {
    const fit = stated(0.02);
    const reciprocals = [298, 308, 318].map((t) => 1 / t);
    const centre = reciprocals.reduce((sum, x) => sum + x, 0) / 3;
    const spread = Math.sqrt(reciprocals.reduce((sum, x) => sum + (x - centre) ** 2, 0));
    const expected = (GAS_CONSTANT * 0.02) / spread;
    const { standardError, interval } = fit.activationEnergy;
    expect(Number(standardError) / expected).toBeCloseTo(1, 9);
    const [low = 0, high = 0] = interval ?? [];
    expect((high - low) / 2 / expected).toBeCloseTo(1.959964, 5);
    expect(fit.covariance.arrhenius?.[0][0]).toBeCloseTo(expected ** 2, 2);
    expect(fit.newPointStandardDeviation).toBeCloseTo(0.02, 12);
  });

  it("have nothing to keep where they state nothing", () => {
    const bare = fitted({ points: arrheniusPoints([298, 308, 318]) });
    expect(Number(bare.activationEnergy.standardError)).toBeLessThan(1e-6);
  });
});

describe("shared errors", () => {
  const points = arrheniusPoints(FIVE, ERRORS);
  const without = fitted({ points });

  it("a relative one moves ln A by itself and leaves E_a alone", () => {
    const fit = fitted({ points, shared: [{ source: "stock", relative: 0.03 }] });
    expect(fit.activationEnergy.standardError).toBeCloseTo(Number(without.activationEnergy.standardError), 8);
    const added =
      Number(fit.logPreExponential.standardError) ** 2 - Number(without.logPreExponential.standardError) ** 2;
    expect(Math.sqrt(added)).toBeCloseTo(0.03, 6);
  });

  it("an offset of the thermometer moves E_a as refitting with shifted temperatures does", () => {
    const offset = 1e-3;
    const fit = fitted({ points, shared: [{ source: "thermometer", temperatureKelvin: offset }] });
    const shifted = fitted({
      points: points.map((point) => ({ ...point, temperatureKelvin: point.temperatureKelvin + offset })),
    });
    const moved = Number(shifted.activationEnergy.estimate) - Number(without.activationEnergy.estimate);
    // With the line's own slope: to first order, and without the residuals' part.
    const added = Number(fit.covariance.arrhenius?.[0][0]) - Number(without.covariance.arrhenius?.[0][0]);
    expect(Math.sqrt(added) / Math.abs(moved)).toBeCloseTo(1, 1);
  });
});

describe("too little to go on", () => {
  it("two temperatures: exact values and no interval, with stated errors propagated", () => {
    const [first, last] = [FIVE[0] ?? 0, FIVE[4] ?? 0];
    const bare = fitted({ points: arrheniusPoints([first, last]) });
    expect(bare.activationEnergy).toMatchObject({ standardError: null, interval: null });
    expect(bare.flags[0]).toMatchObject({ code: "too-few-temperatures", severity: "blocks" });
    const stated = fitted({
      points: arrheniusPoints([first, last]).map((point) => ({
        ...point,
        rateConstantUncertainty: 0.02 * point.rateConstant,
      })),
    });
    const lever = 1 / first - 1 / last;
    expect(stated.activationEnergy.standardError).toBeCloseTo((GAS_CONSTANT * 0.02 * Math.SQRT2) / lever, 6);
    expect(stated.activationEnergy.interval).toBeNull();
  });

  it("repeats at two temperatures are still two temperatures", () => {
    const fit = fitted({ points: arrheniusPoints([298, 298.05, 318, 318], ERRORS) });
    expect(fit.temperatures).toBe(2);
    expect(fit.activationEnergy.interval).toBeNull();
  });

  it("three temperatures and a narrow range weaken", () => {
    const fit = fitted({ points: arrheniusPoints([298, 303, 308], ERRORS) });
    expect(codes(fit)).toEqual(["few-temperatures", "narrow-temperature-range", "curvature-not-tested"]);
    expect(fit.activationEnergy.interval).not.toBeNull();
  });

  it("rate constants of different orders are no one law", () => {
    const points = arrheniusPoints(FIVE, ERRORS).map((point, j) => ({
      ...point,
      orders: { A: 1, B: j === 3 ? 1 : 0 },
    }));
    expect(fitted({ points }).flags[0]).toMatchObject({ code: "different-laws", severity: "blocks" });
  });

  it.each([
    [{ points: [] }, "too-few-temperatures", "points"],
    [{ points: arrheniusPoints([300, 300]) }, "too-few-temperatures", "points"],
    [{ points: [{ temperatureKelvin: -3, rateConstant: 1 }] }, "bad-input", "points.0.temperatureKelvin"],
    [{ points: [{ temperatureKelvin: 300, rateConstant: 0 }] }, "bad-input", "points.0.rateConstant"],
    [
      { points: [{ temperatureKelvin: 300, rateConstant: 1, rateConstantUncertainty: Number.NaN }] },
      "bad-input",
      "points.0.rateConstantUncertainty",
    ],
    [
      { points: arrheniusPoints(FIVE), shared: [{ source: "stock", relative: -1 }] },
      "bad-input",
      "shared.0.relative",
    ],
  ] as const)("a fault is a value that names its place: %j", (input, status, place) => {
    expect(fitTemperature(input)).toMatchObject({ status, place });
  });
});
