import { type FittedLaw, lawOfRates } from "kinetics-core/prediction";
import { randomDraws } from "kinetics-core/random";
import { powerEquation, saturatingEquation } from "kinetics-core/rate-equation";
import { fitRateLaw } from "kinetics-core/rate-law";
import { nineRecipes, nineRuns, simulateRuns } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { nextRuns, type PlannedRun } from "./next-run";

const law: FittedLaw = {
  equation: powerEquation(["A", "B"]),
  logRateConstant: 1,
  parameters: [1, 2],
  covariance: null,
  degreesOfFreedom: null,
  betweenRunStandardDeviation: null,
  studied: { A: [0.01, 0.04], B: [0.02, 0.02] },
  level: 0.95,
};
const feasible = {
  ranges: { A: [0.005, 0.08], B: [0.005, 0.08] },
  stocks: {},
} as const;
const base = { law, feasible, scatter: 0.03 };

function planned(changes: Partial<Parameters<typeof nextRuns>[0]>): readonly PlannedRun[] {
  const result = nextRuns({ ...base, made: [], ...changes });
  if (result.status !== "planned") throw new Error(result.message);
  return result.runs;
}

const series = [
  { A: 0.01, B: 0.02 },
  { A: 0.02, B: 0.02 },
  { A: 0.04, B: 0.02 },
];

describe("standard errors of a design", () => {
  it("are s/(√m s_(i|others)) for each order", () => {
    const made = [
      { A: 0.01, B: 0.02 },
      { A: 0.02, B: 0.03 },
      { A: 0.04, B: 0.02 },
      { A: 0.03, B: 0.07 },
      { A: 0.01, B: 0.05 },
    ];
    const [run] = planned({ made });
    const a = made.map((one) => Math.log(one.A));
    const b = made.map((one) => Math.log(one.B));
    const mean = (x: readonly number[]) => x.reduce((sum, value) => sum + value, 0) / x.length;
    const centred = (x: readonly number[]) => x.map((value) => value - mean(x));
    const [x, y] = [centred(a), centred(b)];
    const dot = (p: readonly number[], q: readonly number[]) =>
      p.reduce((sum, value, i) => sum + value * (q[i] ?? 0), 0);
    const residual = x.map((value, i) => value - ((y[i] ?? 0) * dot(x, y)) / dot(y, y));
    const spread = Math.sqrt(dot(residual, residual) / 5);
    expect(run?.standardErrorsBefore.n_A).toBeCloseTo(0.03 / (Math.sqrt(5) * spread), 7);
  });
});

describe("the law of a fit", () => {
  it("gives the standard errors that the fit itself reports", () => {
    const fit = fitRateLaw(
      simulateRuns({ ...nineRuns, rateErrors: [], pipetting: 0 }, randomDraws(8).normal),
    );
    if (fit.status !== "fitted") throw new Error(fit.message);
    const found = lawOfRates(fit);
    if (found.status !== "law") throw new Error(found.message);
    const made = nineRecipes.map(([A, B]) => ({ A, B }));
    const scatter = Number(fit.betweenRunStandardDeviation);
    const [run] = planned({ law: found.law, made, scatter });
    expect(Number(run?.standardErrorsBefore.n_B) / Number(fit.orders.B?.standardError)).toBeCloseTo(1, 6);
    const ofConstant = Number(run?.standardErrorsBefore["ln k"]);
    expect(ofConstant / Number(fit.logRateConstant.standardError)).toBeCloseTo(1, 6);
  });
});

describe("the next run", () => {
  it("is one of the caller's candidates where the grid has nothing better, and never one that does not fit", () => {
    const only = { A: 0.03, B: 0.07 };
    const request = {
      made: series,
      feasible: { ranges: { A: [0.03, 0.03], B: [0.02, 0.07] }, stocks: {} },
    } as const;
    const [run] = planned({ ...request, candidates: [only, { A: 0.03, B: 5 }] });
    expect(run?.recipe).toEqual(only);
  });

  it("separates what the runs left open: B was never varied, so it goes to an end of B", () => {
    const [run] = planned({ made: series });
    expect(run?.standardErrorsBefore.n_B).toBeNull();
    expect(run?.standardErrorsBefore.n_A).toBeCloseTo(0.03 / Math.sqrt(2 * Math.LN2 ** 2), 7);
    expect([0.005, 0.08].some((end) => Math.abs(Number(run?.recipe.B) - end) < 1e-9)).toBe(true);
    expect(run?.standardErrorsAfter.n_B).not.toBeNull();
  });

  it("is no worse than any recipe of a fine grid", () => {
    const made = [...series, { A: 0.02, B: 0.06 }, { A: 0.05, B: 0.04 }];
    const [best] = planned({ made });
    for (let i = 0; i <= 20; i++) {
      for (let j = 0; j <= 20; j++) {
        const recipe = { A: 0.005 * 16 ** (i / 20), B: 0.005 * 16 ** (j / 20) };
        const [alone] = planned({
          made,
          feasible: { ranges: { A: [recipe.A, recipe.A], B: [recipe.B, recipe.B] }, stocks: {} },
        });
        expect(Number(alone?.regionFactor)).toBeLessThanOrEqual(Number(best?.regionFactor) * (1 + 1e-9));
      }
    }
  });

  it("finds the D-optimal design of a power law in two species: the corners, each in turn", () => {
    const runs = planned({ count: 12 });
    const atEnd = (value = Number.NaN) => [0.005, 0.08].some((end) => Math.abs(value / end - 1) < 1e-6);
    expect(runs.every(({ recipe }) => atEnd(recipe.A) && atEnd(recipe.B))).toBe(true);
    const corners = new Map<string, number>();
    for (const { recipe } of runs) {
      const corner = `${Number(recipe.A).toPrecision(3)} ${Number(recipe.B).toPrecision(3)}`;
      corners.set(corner, (corners.get(corner) ?? 0) + 1);
    }
    expect([...corners.values()].sort()).toEqual([3, 3, 3, 3]);
  });

  it("for one order differs from that for all, and brings that order's error down most", () => {
    const made = [...series, { A: 0.02, B: 0.03 }];
    const after = (aim: "all" | { readonly parameter: string }) =>
      Number(planned({ made, aim })[0]?.standardErrorsAfter.n_A);
    expect(after({ parameter: "n_A" })).toBeLessThanOrEqual(after("all") * (1 + 1e-9));
  });

  it("for a saturating law puts runs at the two ends, where 1/(K + c) differs most, in equal number", () => {
    // The gradient of ln v is (1, −1/(K + c)): a straight line in 1/(K + c).
    const saturating: FittedLaw = {
      ...law,
      equation: saturatingEquation({ saturating: "A" }),
      parameters: [0.02],
      studied: {},
    };
    const runs = planned({
      law: saturating,
      feasible: { ranges: { A: [0.001, 0.2] }, stocks: {} },
      count: 4,
    });
    const levels = runs.map(({ recipe }) => Number(Number(recipe.A).toPrecision(3))).sort((a, b) => a - b);
    expect(levels).toEqual([0.001, 0.001, 0.2, 0.2]);
  });

  it("says that it leaves the studied range", () => {
    const result = nextRuns({ ...base, made: series });
    expect(result.status === "planned" && result.flags[0]).toMatchObject({ code: "plan-beyond-studied" });
  });

  it.each([
    [{ aim: { parameter: "n_X" } }, "bad-input", "aim"],
    [{ scatter: 0 }, "bad-input", "scatter"],
    [{ count: 0 }, "bad-input", "count"],
    [{ feasible: { ranges: { A: [1, 2] as const }, stocks: {} } }, "bad-input", "feasible.ranges.B"],
    [
      { feasible: { ranges: { A: [1, 1] as const, B: [1, 1] as const }, stocks: { A: 0.5 } } },
      "nothing-feasible",
      "feasible",
    ],
  ])("refuses %j and names the place", (changes, status, place) => {
    expect(nextRuns({ ...base, made: series, ...changes })).toMatchObject({
      status,
      place,
      message: expect.stringMatching(/\w/),
    });
  });
});
