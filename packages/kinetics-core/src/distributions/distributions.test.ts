import { describe, expect, it } from "vitest";
import fixture from "./distributions.fixture.json";
import {
  chiSquaredCdf,
  chiSquaredQuantile,
  chiSquaredSurvival,
  fCdf,
  fQuantile,
  fSurvival,
  incompleteBeta,
  logGamma,
  normalCdf,
  normalQuantile,
  normalSurvival,
  studentTCdf,
  studentTFactor,
  studentTQuantile,
  studentTSurvival,
} from "./index";

interface Distribution {
  readonly cdf: (x: number, ...parameters: number[]) => number;
  readonly survival: (x: number, ...parameters: number[]) => number;
  readonly quantile: (p: number, ...parameters: number[]) => number;
}

const normal: Distribution = { cdf: normalCdf, survival: normalSurvival, quantile: normalQuantile };
const byName: Record<string, Distribution> = {
  normal,
  t: {
    cdf: (x, df = Number.NaN) => studentTCdf(x, df),
    survival: (x, df = Number.NaN) => studentTSurvival(x, df),
    quantile: (p, df = Number.NaN) => studentTQuantile(p, df),
  },
  F: {
    cdf: (x, above = Number.NaN, below = Number.NaN) => fCdf(x, above, below),
    survival: (x, above = Number.NaN, below = Number.NaN) => fSurvival(x, above, below),
    quantile: (p, above = Number.NaN, below = Number.NaN) => fQuantile(p, above, below),
  },
  chi2: {
    cdf: (x, df = Number.NaN) => chiSquaredCdf(x, df),
    survival: (x, df = Number.NaN) => chiSquaredSurvival(x, df),
    quantile: (p, df = Number.NaN) => chiSquaredQuantile(p, df),
  },
};

function relativeError(got: number, wanted: number): number {
  return wanted === 0 ? Math.abs(got) : Math.abs(got / wanted - 1);
}

function named(name: string): Distribution {
  const distribution = byName[name];
  if (!distribution) throw new Error(`the fixture names an unknown distribution ${name}`);
  return distribution;
}

describe(`distributions against ${fixture.source}`, () => {
  it("both tails hold 11 digits, far out as well as in the middle", () => {
    for (const [name, x, parameters, lower, upper] of fixture.tails as [
      string,
      number,
      number[],
      number,
      number,
    ][]) {
      const place = `${name}(${parameters.join(", ")}) at ${x}`;
      expect(relativeError(named(name).cdf(x, ...parameters), lower), `lower tail, ${place}`).toBeLessThan(
        1e-11,
      );
      expect(
        relativeError(named(name).survival(x, ...parameters), upper),
        `upper tail, ${place}`,
      ).toBeLessThan(1e-11);
    }
  });

  it("quantiles hold 11 digits", () => {
    for (const [name, p, parameters, x] of fixture.quantiles as [string, number, number[], number][]) {
      const place = `${name}(${parameters.join(", ")}) at p = ${p}`;
      expect(relativeError(named(name).quantile(p, ...parameters), x), place).toBeLessThan(1e-11);
    }
  });
});

describe("printed tables (any statistics text; here NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.6.7)", () => {
  it.each([
    [1, 12.706],
    [2, 4.303],
    [3, 3.182],
    [5, 2.571],
    [10, 2.228],
    [30, 2.042],
    [100, 1.984],
  ])("two-sided 95 %% factor of t with %i degrees of freedom is %f", (degreesOfFreedom, printed) => {
    expect(studentTFactor(0.95, degreesOfFreedom)).toBeCloseTo(printed, 3);
  });

  it.each([
    [1, 1, 161.448],
    [1, 5, 6.608],
    [3, 10, 3.708],
    [8, 8, 3.438],
  ])("upper 5 %% point of F with %i and %i degrees of freedom is %f", (above, below, printed) => {
    expect(fQuantile(0.95, above, below)).toBeCloseTo(printed, 3);
  });

  it.each([
    [1, 3.841],
    [10, 18.307],
    [100, 124.342],
  ])("upper 5 %% point of chi-squared with %i degrees of freedom is %f", (degreesOfFreedom, printed) => {
    expect(chiSquaredQuantile(0.95, degreesOfFreedom)).toBeCloseTo(printed, 3);
  });
});

describe("edges", () => {
  it("knows exact values", () => {
    expect(logGamma(1)).toBeCloseTo(0, 15);
    expect(logGamma(2)).toBeCloseTo(0, 15);
    expect(logGamma(0.5)).toBeCloseTo(0.5 * Math.log(Math.PI), 14);
    expect(studentTCdf(0, 3)).toBe(0.5);
    expect(studentTQuantile(0.5, 3)).toBe(0);
    expect(studentTQuantile(0.75, 1)).toBeCloseTo(1, 14);
    expect(studentTSurvival(2, Number.POSITIVE_INFINITY)).toBe(normalSurvival(2));
    expect(fSurvival(0, 2, 3)).toBe(1);
    expect(chiSquaredCdf(-1, 2)).toBe(0);
    expect(incompleteBeta(2, 3, 0)).toEqual({ lower: 0, upper: 1 });
    expect(studentTQuantile(0, 4)).toBe(Number.NEGATIVE_INFINITY);
    expect(normalQuantile(1)).toBe(Number.POSITIVE_INFINITY);
  });

  it("refuses what is no probability and what is no number of degrees of freedom", () => {
    expect(() => studentTQuantile(1.2, 3)).toThrow(RangeError);
    expect(() => studentTCdf(1, 0)).toThrow(RangeError);
    expect(() => chiSquaredQuantile(Number.NaN, 3)).toThrow(RangeError);
    expect(() => fSurvival(1, 1, Number.NaN)).toThrow(RangeError);
  });
});
