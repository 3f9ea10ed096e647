import { powerEquation } from "kinetics-core/rate-equation";
import { describe, expect, it } from "vitest";
import type { FittedLaw } from "./fitted-law";
import { bothEstimates, degreesWithScatter, logPrediction } from "./log-prediction";

const law: FittedLaw = {
  equation: powerEquation(["A"], [1]),
  logRateConstant: 0,
  parameters: [],
  covariance: [[0.0025]],
  degreesOfFreedom: 5,
  betweenRunStandardDeviation: 0.1,
  studied: {},
  level: 0.95,
};

describe("degrees of freedom of a new run", () => {
  it("are the runs' own where nothing but scatter is in the law", () => {
    expect(degreesWithScatter(law, 0.0025, 0.01)).toBeCloseTo(5, 12);
  });

  it("stay few where τ rules, however well known a stated error makes the law's variance", () => {
    const stated = { ...law, degreesOfFreedom: 5e4, runDegreesOfFreedom: 5 };
    expect(degreesWithScatter(stated, 0.0025, 1)).toBeCloseTo(5, 1);
    expect(degreesWithScatter(stated, 1, 0)).toBeCloseTo(5e4, 4);
    // Half and half: 5 (0.02)²/(0.01·0.01 + 0.01)².
    expect(degreesWithScatter(stated, 0.01, 0.01)).toBeCloseTo((5 * 0.0004) / (0.01 * 1.01) ** 2, 10);
  });

  it("are none where the runs leave none", () => {
    expect(degreesWithScatter({ ...law, runDegreesOfFreedom: null }, 0.01, 0.01)).toBeNull();
  });
});

describe("a predicted logarithm", () => {
  it("has the law's interval by t(5) = 2.570582 and a new run's by √(0.0025 + 0.01)", () => {
    const { ofTheLaw, newRun } = bothEstimates(law, logPrediction(law, Math.log(3), [1]));
    expect(Math.log(Number(ofTheLaw.interval?.[1]) / 3) / 0.05).toBeCloseTo(2.570582, 5);
    expect(Math.log(Number(newRun.interval?.[1]) / 3) / Math.sqrt(0.0125)).toBeCloseTo(2.570582, 5);
  });
});
