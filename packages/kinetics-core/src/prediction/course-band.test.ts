import { powerEquation, reversibleEquation } from "kinetics-core/rate-equation";
import { describe, expect, it } from "vitest";
import { courseBand } from "./course-band";
import type { FittedLaw } from "./fitted-law";
import { timeToConversion } from "./time-to-conversion";

function law(order: number, changes: Partial<FittedLaw> = {}): FittedLaw {
  return {
    equation: powerEquation(["A"]),
    logRateConstant: Math.log(0.05),
    parameters: [order],
    covariance: [
      [0.004, 0.0006],
      [0.0006, 0.0009],
    ],
    degreesOfFreedom: 8,
    betweenRunStandardDeviation: 0.05,
    studied: {},
    level: 0.95,
    ...changes,
  };
}

const mixture = { concentrations: { A: 0.5, P: 0 }, stoichiometricNumbers: { A: -1, P: 1 } };
const times = [0, 1, 3, 10, 30, 100, 300, 1000];

function banded(fitted: FittedLaw, at = times) {
  const result = courseBand(fitted, mixture, at);
  if (result.status !== "predicted") throw new Error(result.message);
  return result.points;
}

describe("a course with its band", () => {
  it.each([0, 0.5, 1, 1.5, 2])("order %s follows its closed form", (order) => {
    for (const { time, concentrations } of banded(law(order))) {
      const power = 0.5 ** (1 - order) - (1 - order) * 0.05 * time;
      const expected =
        order === 1
          ? 0.5 * Math.exp(-0.05 * time)
          : order < 1
            ? Math.max(0, power) ** (1 / (1 - order))
            : power ** (1 / (1 - order));
      expect(concentrations.A?.value).toBeCloseTo(expected, 9);
      expect(concentrations.P?.value).toBeCloseTo(0.5 - expected, 9);
    }
  });

  it.each([0, 0.5, 1, 1.7])("order %s stays between nothing and all, wider for a new run", (order) => {
    for (const { extent, concentrations } of banded(law(order))) {
      const [low = -1, high = -1] = extent.ofTheLaw ?? [];
      const [lower = -1, higher = -1] = extent.newRun ?? [];
      expect(lower).toBeGreaterThanOrEqual(0);
      expect(lower).toBeLessThanOrEqual(low);
      expect(low).toBeLessThanOrEqual(extent.value);
      expect(extent.value).toBeLessThanOrEqual(high);
      expect(high).toBeLessThanOrEqual(higher);
      expect(higher).toBeLessThanOrEqual(0.5);
      expect(concentrations.A?.newRun?.[0]).toBeCloseTo(0.5 - higher, 12);
    }
  });

  it("agrees with the time to a conversion, read sideways", () => {
    const time = timeToConversion(law(1.5), mixture, 0.6);
    if (time.status !== "predicted") throw new Error(time.message);
    const [low = 0, high = 0] = time.newRun.interval ?? [];
    const [atLow, atHigh] = banded(law(1.5), [low, high]);
    expect(atLow?.extent.newRun?.[1]).toBeCloseTo(0.3, 9);
    expect(atHigh?.extent.newRun?.[0]).toBeCloseTo(0.3, 9);
  });

  it("comes to its equilibrium, whose place has an interval too", () => {
    const equation = reversibleEquation({
      forward: [{ species: "A", order: 1 }],
      reverse: [{ species: "P", order: 1 }],
      equilibriumConstant: "free",
    });
    const reversible = law(0, {
      equation,
      parameters: [1 / 3],
      covariance: [
        [0.004, 0],
        [0, 0.0004],
      ],
    });
    const [early, late] = banded(reversible, [5, 2000]);
    expect(early?.concentrations.A?.value).toBeCloseTo(0.125 + 0.375 * Math.exp(-0.05 * (4 / 3) * 5), 8);
    expect(late?.extent.value).toBeCloseTo(0.375, 6);
    // ξ_end = c0/(1 + 1/K): dξ/d(1/K) = −c0/(1 + 1/K)² = −0.28125, times 0.02 and t(8) = 2.306.
    const [low = 0, high = 0] = late?.extent.ofTheLaw ?? [];
    expect((high - low) / 2).toBeCloseTo(0.28125 * 0.02 * 2.306, 4);
  });

  it("has no band without a covariance, and refuses a time before mixing", () => {
    const bare = law(1, { covariance: null, degreesOfFreedom: null, betweenRunStandardDeviation: null });
    expect(banded(bare)[3]?.extent).toMatchObject({ ofTheLaw: null, newRun: null });
    expect(courseBand(bare, mixture, [1, -1])).toMatchObject({ status: "bad-mixture", place: "times.1" });
  });
});
