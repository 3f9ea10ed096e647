import { describe, expect, it } from "vitest";
import {
  concentrationToMolar,
  estimateOf,
  exponentialOf,
  molarTo,
  printNumber,
  printUncertain,
  rateConstantUnit,
  rateUnit,
  secondsTo,
  timeToSeconds,
} from "./index";

describe("units", () => {
  it("converts at the door and back without losing the typed digits", () => {
    expect(concentrationToMolar(2.3, "mmol/L")).toBe(0.0023);
    expect(concentrationToMolar(50, "umol/L")).toBe(0.00005);
    expect(molarTo(0.0023, "mmol/L")).toBe(2.3);
    expect(timeToSeconds(1.5, "min")).toBe(90);
    expect(secondsTo(7200, "h")).toBe(2);
  });

  it.each([
    [0, "mol L^-1 s^-1"],
    [0.5, "mol^0.5 L^-0.5 s^-1"],
    [1, "s^-1"],
    [1.5, "L^0.5 mol^-0.5 s^-1"],
    [2, "L mol^-1 s^-1"],
    [3, "L^2 mol^-2 s^-1"],
    [4, "L^3 mol^-3 s^-1"],
    [-1, "mol^2 L^-2 s^-1"],
    [2.013, "(mol L^-1)^-1.013 s^-1"],
  ])("k of overall order %d has the unit %s", (order, unit) => {
    expect(rateConstantUnit(order, "mol/L", "s")).toBe(unit);
  });

  it("names the units that were asked for", () => {
    expect(rateConstantUnit(2, "mmol/L", "min")).toBe("L mmol^-1 min^-1");
    expect(rateConstantUnit(1, "umol/L", "h")).toBe("h^-1");
    expect(rateConstantUnit(2, "mmHg", "s")).toBe("mmHg^-1 s^-1");
    expect(rateConstantUnit(0, "mmHg", "min")).toBe("mmHg min^-1");
    expect(rateUnit("umol/L", "s")).toBe("umol L^-1 s^-1");
  });
});

describe("printed numbers", () => {
  it("rounds the uncertainty first and lets the value follow", () => {
    expect(printUncertain(11.7893, 0.2312)).toEqual({ value: "11.79", uncertainty: "0.23", power: 0 });
    expect(printUncertain(11.7893, 0.2312, { digits: 1 })).toEqual({
      value: "11.8",
      uncertainty: "0.2",
      power: 0,
    });
    expect(printUncertain(11.7893, 0.1312, { digits: 1 })).toEqual({
      value: "11.79",
      uncertainty: "0.13",
      power: 0,
    });
    expect(printUncertain(0.965, 0.0499)).toEqual({ value: "0.965", uncertainty: "0.050", power: 0 });
  });

  it("moves the place when rounding carries, and keeps two digits where one would be a 1", () => {
    expect(printUncertain(5.123, 0.0996)).toEqual({ value: "5.12", uncertainty: "0.10", power: 0 });
    expect(printUncertain(5.123, 0.96, { digits: 1 })).toEqual({
      value: "5.12",
      uncertainty: "0.96",
      power: 0,
    });
  });

  it("takes out a power of ten where the number would start or end in empty zeros", () => {
    expect(printUncertain(2.864e-5, 7.1e-7)).toEqual({ value: "2.864", uncertainty: "0.071", power: -5 });
    expect(printUncertain(2.2e7, 3e5)).toEqual({ value: "2.200", uncertainty: "0.030", power: 7 });
    expect(printUncertain(2.864e-5, 7.1e-7, { power: -6 })).toEqual({
      value: "28.64",
      uncertainty: "0.71",
      power: -6,
    });
  });

  it("groups from five digits and uses the true minus", () => {
    expect(printUncertain(17934, 121)).toEqual({ value: "17\u202f930", uncertainty: "120", power: 0 });
    expect(printUncertain(-1793.4, 12.1)).toEqual({ value: "\u22121793", uncertainty: "12", power: 0 });
    expect(printUncertain(-0.0001, 0.5)).toEqual({ value: "0.00", uncertainty: "0.50", power: 0 });
  });

  it("prints a value without uncertainty as it stands, and says that there is none", () => {
    expect(printUncertain(0.0115, null)).toEqual({ value: "0.0115", uncertainty: null, power: 0 });
    expect(printUncertain(1.1e-7, 0)).toEqual({ value: "1.1", uncertainty: null, power: -7 });
  });

  it("prints single numbers to so many significant digits", () => {
    expect(printNumber(0.012, 3)).toBe("0.0120");
    expect(printNumber(17934, 3)).toBe("17\u202f900");
    expect(printNumber(-2.86e-5, 3)).toBe("\u22122.86 × 10⁻⁵");
    expect(printNumber(99999.7, 3)).toBe("1.00 × 10⁵");
    expect(printNumber(0, 3)).toBe("0.00");
  });

  it("refuses what is not a number", () => {
    expect(() => printNumber(Number.NaN, 3)).toThrow(RangeError);
    expect(() => printUncertain(1, -1)).toThrow(RangeError);
  });
});

describe("estimates", () => {
  it("an interval is t standard errors to either side", () => {
    const { interval } = estimateOf(1, 0.1, 4);
    expect(interval?.[0]).toBeCloseTo(1 - 0.27764, 5);
    expect(interval?.[1]).toBeCloseTo(1 + 0.27764, 5);
  });

  it("without freedom there is no uncertainty, and none is made up", () => {
    expect(estimateOf(1, null, 0)).toEqual({ estimate: 1, standardError: null, interval: null, level: 0.95 });
    expect(estimateOf(Number.NaN, 0.1, 3).estimate).toBeNull();
  });

  it("the interval of a back-transformed logarithm is asymmetric", () => {
    const k = exponentialOf({ estimate: 0, standardError: 0.1, interval: [-0.2, 0.2], level: 0.95 });
    expect(k.estimate).toBe(1);
    expect(k.interval?.[0]).toBeCloseTo(0.8187, 4);
    expect(k.interval?.[1]).toBeCloseTo(1.2214, 4);
    expect(
      exponentialOf({ estimate: 800, standardError: 1, interval: null, level: 0.95 }).estimate,
    ).toBeNull();
  });
});
