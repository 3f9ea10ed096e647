import { describe, expect, it } from "vitest";
import { durbinWatson } from "./durbin-watson";
import fixture from "./durbin-watson.fixture.json";

describe("Durbin-Watson", () => {
  it.each(fixture.cases)("has the exact p-value, by integral or by beta (statistic $statistic)", (one) => {
    const test = durbinWatson(one.residuals, one.columns);
    const exact = one.residuals.length - one.columns.length <= 30;
    expect(test?.statistic).toBeCloseTo(one.statistic, 12);
    expect(test?.method).toBe(exact ? "exact" : "beta with exact moments");
    expect(Math.abs((test?.pValue ?? 1) - one.exactPValue)).toBeLessThan(exact ? 1e-7 : 2e-4);
  });

  it("is small for a wave and near 1 for a zigzag", () => {
    const ones = [Array.from({ length: 12 }, () => 1)];
    const wave = Array.from({ length: 12 }, (_, i) => Math.cos((2 * Math.PI * (i + 0.5)) / 12));
    const zigzag = Array.from({ length: 12 }, (_, i) => (i % 2 === 0 ? 1 : -1));
    expect(durbinWatson(wave, ones)?.pValue).toBeLessThan(0.001);
    expect(durbinWatson(zigzag, ones)?.pValue).toBeGreaterThan(0.999);
  });

  it("says nothing with one degree of freedom, without residuals or with dependent columns", () => {
    expect(durbinWatson([1, -1], [[1, 1]])).toBeNull();
    expect(durbinWatson([0, 0, 0, 0], [[1, 1, 1, 1]])).toBeNull();
    const twice = [1, 1, 1, 1, 1];
    expect(durbinWatson([1, -1, 1, -1, 0], [twice, twice])).toBeNull();
  });
});
