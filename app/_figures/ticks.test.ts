import { describe, expect, it } from "vitest";
import { axisPower, linearDomain, linearTicks, logDomain, logTicks } from "./ticks";

describe("linearTicks", () => {
  it("steps by 1, 2 or 5 times a power of ten and prints only the decimals that the step needs", () => {
    expect(linearTicks(0, 65).major.map((tick) => tick.text)).toEqual([
      "0",
      "10",
      "20",
      "30",
      "40",
      "50",
      "60",
    ]);
    expect(linearTicks(0.96, 1.36, 4).major.map((tick) => tick.text)).toEqual(["1.0", "1.1", "1.2", "1.3"]);
  });

  it("prints a true minus and no negative zero", () => {
    expect(linearTicks(-0.25, 0.25, 4).major.map((tick) => tick.text)).toEqual([
      "−0.2",
      "−0.1",
      "0.0",
      "0.1",
      "0.2",
    ]);
  });

  it("keeps every tick inside the domain and no minor on a major", () => {
    for (const [low, high] of [
      [0, 65],
      [-3.2e-7, 8.9e-7],
      [1234.5, 1240.1],
    ] as const) {
      const ticks = linearTicks(low, high);
      const majors = ticks.major.map((tick) => tick.at);
      expect(majors.length).toBeGreaterThanOrEqual(3);
      const step = (majors[1] ?? 0) - (majors[0] ?? 0);
      for (const at of [...majors, ...ticks.minor]) {
        expect(at).toBeGreaterThanOrEqual(low - step * 1e-5);
        expect(at).toBeLessThanOrEqual(high + step * 1e-5);
      }
      for (const minor of ticks.minor) {
        expect(Math.min(...majors.map((major) => Math.abs(major - minor)))).toBeGreaterThan(step * 0.15);
      }
    }
  });

  it("gives nothing for an empty range", () => {
    expect(linearTicks(1, 1)).toEqual({ major: [], minor: [] });
    expect(linearTicks(Number.NaN, 1)).toEqual({ major: [], minor: [] });
  });
});

describe("logTicks", () => {
  it("marks 1, 2 and 5 within two decades, the other whole multiples as minors", () => {
    const ticks = logTicks(0.2, 5);
    expect(ticks.major.map((tick) => tick.text)).toEqual(["0.2", "0.5", "1", "2", "5"]);
    expect(ticks.minor).toEqual([0.3, 0.4, 0.6, 0.7, 0.8, 0.9, 3, 4]);
  });

  it("marks powers of ten only above two decades", () => {
    expect(logTicks(0.01, 100).major.map((tick) => tick.text)).toEqual(["0.01", "0.1", "1", "10", "100"]);
  });

  it("falls back to linear steps where fewer than two such places lie inside", () => {
    const ticks = logTicks(1.1, 1.7);
    expect(ticks.major.length).toBeGreaterThanOrEqual(3);
    for (const tick of ticks.major) expect(Number(tick.text)).toBeCloseTo(tick.at, 9);
  });

  it("gives nothing where a logarithm has no meaning", () => {
    expect(logTicks(0, 5).major).toEqual([]);
  });
});

describe("domains", () => {
  it("start at zero where the data come near it, and leave air above", () => {
    const [low, high] = linearDomain([2, 60]);
    expect(low).toBe(0);
    expect(high).toBeGreaterThan(60);
  });

  it("do not reach below noise about zero", () => {
    expect(linearDomain([-0.4, 60])[0]).toBe(-0.4);
  });

  it("hold every value when all are negative, equal or far from zero", () => {
    for (const values of [[-60, -2], [5, 5], [0], [990, 1010]]) {
      const [low, high] = linearDomain(values);
      expect(low).toBeLessThan(high);
      for (const value of values) {
        expect(value).toBeGreaterThanOrEqual(low);
        expect(value).toBeLessThanOrEqual(high);
      }
    }
  });

  it("are symmetric about the data on a logarithmic axis", () => {
    const [low, high] = logDomain([0.5, 4]);
    expect(low * high).toBeCloseTo(2, 9);
    expect(low).toBeLessThan(0.5);
  });
});

describe("axisPower", () => {
  it("is zero for numbers that print short, else the multiple of three that makes them so", () => {
    expect(axisPower(0, 65)).toBe(0);
    expect(axisPower(0, 4.2e-6)).toBe(-6);
    expect(axisPower(-3e7, 1)).toBe(6);
  });
});
