import type { FittedLaw } from "kinetics-core/prediction";
import { powerEquation, saturatingEquation } from "kinetics-core/rate-equation";
import { describe, expect, it } from "vitest";
import { discriminatingRun } from "./discriminating-run";

const common = {
  covariance: null,
  degreesOfFreedom: null,
  betweenRunStandardDeviation: null,
  studied: {},
  level: 0.95,
};
/** k c/(K + c) with K = 0.05, and the first-order law that it is at low concentration. */
const saturating: FittedLaw = {
  ...common,
  equation: saturatingEquation({ saturating: "A" }),
  logRateConstant: Math.log(1e-3),
  parameters: [0.05],
};
const firstOrder: FittedLaw = {
  ...common,
  equation: powerEquation(["A"], [1]),
  logRateConstant: Math.log(1e-3 / 0.05),
  parameters: [],
};
const feasible = { ranges: { A: [0.001, 0.02] }, stocks: {} } as const;
const request = { first: saturating, second: firstOrder, feasible, scatter: 0.03 };

describe("the run that tells two candidates apart", () => {
  it("lies where they differ most: at the highest concentration", () => {
    const result = discriminatingRun(request);
    if (result.status !== "planned") throw new Error(result.message);
    expect(result.recipe.A).toBeCloseTo(0.02, 10);
    // K/(K + c) = 0.05/0.07.
    expect(result.ratio).toBeCloseTo(0.05 / 0.07, 10);
    expect(result.separation).toBeCloseTo(Math.log(1.4) / 0.03, 8);
    expect(result.runsNeeded).toBe(1);
  });

  it("takes (1.960 + 0.842)² s²/Δ² runs, more where the laws themselves are uncertain, and none where these blur it", () => {
    const noisy = discriminatingRun({ ...request, scatter: 0.3 });
    expect(noisy).toMatchObject({ runsNeeded: Math.ceil((7.849 * 0.09) / Math.log(1.4) ** 2) });
    const uncertain = (variance: number) =>
      discriminatingRun({ ...request, scatter: 0.3, second: { ...firstOrder, covariance: [[variance]] } });
    const some = uncertain(0.005);
    expect(some.status === "planned" && some.runsNeeded).toBeGreaterThan(7);
    expect(uncertain(0.02)).toMatchObject({ status: "planned", runsNeeded: null });
  });

  it("goes where neither prediction is too vague, not only where the values differ", () => {
    const vague: FittedLaw = {
      ...common,
      equation: powerEquation(["A"]),
      logRateConstant: Math.log(1e-3 / 0.05),
      parameters: [1],
      // Known at A = 0.002 and badly elsewhere: Var = 1e-4 + 4 (ln c − ln 0.002)².
      covariance: [
        [1e-4 + 4 * Math.log(0.002) ** 2, -4 * Math.log(0.002)],
        [-4 * Math.log(0.002), 4],
      ],
    };
    const shifted = { ...vague, logRateConstant: vague.logRateConstant + 0.2 };
    const result = discriminatingRun({ ...request, second: shifted });
    expect(result.status === "planned" && Math.abs(Number(result.recipe.A) / 0.002 - 1)).toBeLessThan(0.05);
  });

  it("says when the ranges do not tell the laws apart", () => {
    expect(discriminatingRun({ ...request, second: saturating })).toMatchObject({ status: "not-told-apart" });
    const low = discriminatingRun({
      ...request,
      feasible: { ranges: { A: [1e-4, 5e-4] }, stocks: {} },
    });
    expect(low.status === "planned" && low.flags.map((flag) => flag.code)).toEqual(["laws-hardly-differ"]);
  });

  it("refuses a scatter of nothing and ranges without a rate", () => {
    expect(discriminatingRun({ ...request, scatter: 0 }).status).toBe("bad-input");
    expect(discriminatingRun({ ...request, feasible: { ranges: { B: [1, 2] }, stocks: {} } }).status).toBe(
      "nothing-feasible",
    );
  });
});
