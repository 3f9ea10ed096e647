import { describe, expect, it } from "vitest";
import { runComputation, saturationComputation } from "../registry";
import { saturationResponse } from "./schema";

/** Puromycin, treated (Treloar 1974; Bates and Watts 1988, A1.3): 212.68370711 and 0.06412123 with R's nls. */
const PUROMYCIN = {
  concentrations: [0.02, 0.02, 0.06, 0.06, 0.11, 0.11, 0.22, 0.22, 0.56, 0.56, 1.1, 1.1],
  rates: [76, 47, 97, 107, 123, 139, 159, 152, 191, 201, 207, 200],
};

const compute = (body: unknown) => runComputation(saturationComputation, body);

function answerTo(body: unknown) {
  const computed = compute(body);
  if (!computed.ok) throw new Error(JSON.stringify(computed.errors));
  return computed.answer;
}

describe("saturation", () => {
  it("answers in its own described shape, without loss on the way through JSON", () => {
    const answer = answerTo(PUROMYCIN);
    expect(saturationResponse.parse(answer)).toEqual(answer);
    expect(JSON.parse(JSON.stringify(answer))).toEqual(answer);
  });

  it("finds the published estimates and profile intervals", () => {
    const { limitingRate, halfSaturation, residualStandardDeviation, flags } = answerTo(PUROMYCIN);
    expect(limitingRate.estimate).toBeCloseTo(212.6837, 3);
    expect(halfSaturation.estimate).toBeCloseTo(0.0641212, 6);
    expect(limitingRate.standardError).toBeCloseTo(6.947, 3);
    expect(limitingRate.interval?.[0]).toBeCloseTo(197.302, 3);
    expect(limitingRate.interval?.[1]).toBeCloseTo(229.29, 2);
    expect(residualStandardDeviation).toBeCloseTo(10.93, 2);
    expect(flags).toEqual([]);
  });

  it("narrows its intervals with the level", () => {
    const [wide, narrow] = [answerTo(PUROMYCIN), answerTo({ ...PUROMYCIN, level: 0.8 })];
    expect(narrow.limitingRate.level).toBe(0.8);
    expect(narrow.limitingRate.interval?.[0]).toBeGreaterThan(wide.limitingRate.interval?.[0] ?? 0);
  });

  it("says null and flags it where nothing levels off", () => {
    const answer = answerTo({ concentrations: [1, 2, 3, 4], rates: [1, 2.1, 3.3, 4.6] });
    expect(answer.limitingRate).toEqual({ estimate: null, standardError: null, interval: null, level: 0.95 });
    expect(answer).toMatchObject({ covariance: null, correlation: null });
    expect(answer.flags).toContainEqual(
      expect.objectContaining({ code: "no-curvature", severity: "blocks" }),
    );
  });

  it.each([
    [{ concentrations: [1e-20, 1e20, 1], rates: [1e-20, 1e20, -1e20] }],
    [{ concentrations: [1e20, 1e20, 2e19], rates: [1e-20, 3e-20, 2e-20] }],
    [{ concentrations: [1e-20, 3e-20, 2e-20], rates: [1e20, 2e19, 3e19] }],
    [{ concentrations: [0, 0, 1, 2], rates: [5, -5, 0, 0] }],
  ])("answers without NaN at the ends of what it accepts: %j", (body) => {
    const answer = answerTo(body);
    expect(JSON.parse(JSON.stringify(answer))).toEqual(answer);
  });

  it("is quick at the most points that it takes", () => {
    const concentrations = Array.from({ length: 1000 }, (_, i) => 0.01 + i / 300);
    const rates = concentrations.map((c, i) => c / (1 + c) + 0.05 * Math.sin(i * i));
    const before = performance.now();
    answerTo({ concentrations, rates });
    expect(performance.now() - before).toBeLessThan(1000);
  });

  it.each([
    ["no rates", { concentrations: [1, 2, 3] }, "rates"],
    ["a rate in words", { concentrations: [1, 2], rates: [1, "two"] }, "rates.1"],
    ["a negative concentration", { concentrations: [1, -2], rates: [1, 2] }, "concentrations.1"],
    ["a rate too few", { concentrations: [1, 2, 3], rates: [1, 2] }, "rates"],
    ["one concentration", { concentrations: [1, 1], rates: [1, 2] }, "concentrations"],
    ["a level of 1", { ...PUROMYCIN, level: 1 }, "level"],
  ])("refuses %s and names the place", (_, body, place) => {
    const computed = compute(body);
    expect(computed.ok).toBe(false);
    expect(computed.ok || computed.errors[0]?.path).toBe(place);
    expect(computed.ok || computed.errors[0]?.message).toMatch(/\w/);
  });
});
