import type { FittedLaw } from "kinetics-core/prediction";
import { powerEquation } from "kinetics-core/rate-equation";
import { describe, expect, it } from "vitest";
import { runsToTarget, type TargetRequest } from "./runs-to-target";

const law: FittedLaw = {
  equation: powerEquation(["A"]),
  logRateConstant: 0,
  parameters: [1],
  covariance: null,
  degreesOfFreedom: null,
  betweenRunStandardDeviation: null,
  studied: {},
  level: 0.95,
};
const request: TargetRequest = {
  law,
  made: [{ A: 0.5 }, { A: 1 }, { A: 2 }],
  feasible: { ranges: { A: [0.25, 4] }, stocks: {} },
  scatter: 0.05,
  targets: { n_A: 0.1 },
};

describe("runs still to make", () => {
  it("begins from the half-width that the runs made give: t(0.975; 1) s/√Σ(ln c − mean)²", () => {
    const result = runsToTarget(request);
    const first = "steps" in result ? result.steps[0] : undefined;
    expect(first?.precision.n_A).toBeCloseTo((12.706205 * 0.05) / Math.sqrt(2 * Math.LN2 ** 2), 5);
  });

  it("counts the runs at the ends of the range until the target is met, then stops", () => {
    const result = runsToTarget(request);
    expect(result).toMatchObject({ status: "within-reach", decision: "continue" });
    if (result.status !== "within-reach") return;
    const last = result.steps.at(-1);
    expect(last?.more).toBe(result.more);
    expect(last?.precision.n_A).toBeLessThanOrEqual(0.1);
    expect(result.steps.at(-2)?.precision.n_A).toBeGreaterThan(0.1);
    const made = [
      ...request.made,
      ...result.steps.flatMap(({ recipe }) => (recipe === null ? [] : [recipe])),
    ];
    expect(runsToTarget({ ...request, made })).toMatchObject({
      status: "reached",
      decision: "stop",
      more: 0,
    });
  });

  it("needs more for a narrower target", () => {
    const more = (target: number) => {
      const result = runsToTarget({ ...request, targets: { n_A: target } });
      return result.status === "within-reach" ? result.more : Number.NaN;
    };
    expect(more(0.05)).toBeGreaterThan(more(0.1));
  });

  it("says that it goes beyond what was studied", () => {
    const studied = { ...law, studied: { A: [0.5, 2] as const } };
    const result = runsToTarget({ ...request, law: studied });
    expect("flags" in result && result.flags.map((flag) => flag.code)).toEqual(["plan-beyond-studied"]);
  });

  it("meets all targets together", () => {
    const result = runsToTarget({ ...request, targets: { n_A: 0.08, "ln k": 0.04 } });
    if (result.status !== "within-reach") throw new Error(result.status);
    const widths = result.steps.at(-1)?.precision;
    expect(widths?.n_A).toBeLessThanOrEqual(0.08);
    expect(widths?.["ln k"]).toBeLessThanOrEqual(0.04);
  });

  it("counts standard uncertainties where these are wanted: s/√Σ(ln c − mean)² from the first", () => {
    const result = runsToTarget({ ...request, measure: "standard-uncertainty", targets: { n_A: 0.03 } });
    if (result.status !== "within-reach") throw new Error(result.status);
    expect(result.steps[0]?.precision.n_A).toBeCloseTo(0.05 / Math.sqrt(2 * Math.LN2 ** 2), 7);
    expect(result.steps.at(-1)?.precision.n_A).toBeLessThanOrEqual(0.03);
  });

  it("says when no number of runs can reach it, and why", () => {
    expect(runsToTarget({ ...request, targets: { "ln k": 0.05 }, sharedRelative: 0.03 })).toMatchObject({
      status: "out-of-reach",
      more: null,
      message: expect.stringContaining("no number of runs reaches"),
    });
    expect(runsToTarget({ ...request, targets: { n_A: 1e-4 }, most: 10 })).toMatchObject({
      status: "out-of-reach",
      message: expect.stringContaining("Not even 10 more runs"),
    });
  });

  it.each([
    [{ targets: { n_X: 0.1 } }, "targets.n_X"],
    [{ targets: {} }, "targets"],
    [{ targets: { n_A: 0 } }, "targets.n_A"],
    [{ scatter: -1 }, "scatter"],
    [{ feasible: { ranges: {}, stocks: {} } }, "feasible.ranges.A"],
    [{ made: [{ B: 1 }] }, "made.0"],
  ])("refuses %j and names the place", (changes, place) => {
    expect(runsToTarget({ ...request, ...changes })).toMatchObject({
      status: "bad-input",
      place,
      message: expect.stringMatching(/\w/),
    });
  });
});
