import { randomDraws } from "kinetics-core/random";
import { nineRuns, simulateRuns } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { fitRateLaw } from "./fit-rate-law";
import type { RateLawFit, RateLawInput, SharedUncertainty } from "./rate-law";
import { effectOf, loadingOf, sharedErrors } from "./shared-errors";
import { usableRuns } from "./usable-runs";

const study = simulateRuns(nineRuns, randomDraws(8).normal);
const labels = study.runs.map((run) => run.label);

function law(shared: readonly SharedUncertainty[]): RateLawFit {
  const result = fitRateLaw({ ...study, shared });
  if (result.status !== "fitted") throw new Error(result.message);
  return result;
}

const everywhere = (factors: Readonly<Record<string, number>>) =>
  Object.fromEntries(labels.map((label) => [label, factors]));

describe("an error that moves concentrations by factors of their own", () => {
  it("is the plain one where every factor is 1", () => {
    const plain = law([{ species: ["A"], relative: 0.02 }]);
    const factored = law([{ species: ["A"], relative: 0.02, factors: everywhere({ A: 1 }) }]);
    expect(factored.logRateConstant.standardError ?? 0).toBeCloseTo(
      plain.logRateConstant.standardError ?? 1,
      9,
    );
    expect(factored.orders.A?.standardError ?? 0).toBeCloseTo(plain.orders.A?.standardError ?? 1, 9);
  });

  it("is half the error where every factor is a half", () => {
    const half = law([{ species: ["A"], relative: 0.01 }]);
    const factored = law([{ species: ["A"], relative: 0.02, factors: everywhere({ A: 0.5 }) }]);
    expect(factored.budget.at(-1)?.relative).toBeCloseTo(half.budget.at(-1)?.relative ?? 1, 9);
  });

  it("moves ln v of each run by −Σ n·factor, and the rate itself by one whole", () => {
    const input: RateLawInput = {
      ...study,
      shared: [
        {
          species: ["A", "B"],
          onRate: true,
          relative: 0.1,
          runs: ["R01", "R02"],
          factors: { R01: { A: 0.25, B: -0.5 } },
        },
      ],
    };
    const { errors } = sharedErrors(input, usableRuns(input).runs);
    const [error] = errors;
    if (error === undefined) throw new Error("no error");
    // Orders 1 and 2: 1 − (0.25 − 1) in the first run, 1 − 3 in the second, whose factors are 1.
    expect([effectOf(error, [1, 2], 0), effectOf(error, [1, 2], 1)]).toEqual([1.75, -2]);
    const loading = loadingOf(error, [1, 2], 3);
    expect(loading[0]).toBeCloseTo(0.175, 14);
    expect(loading[1]).toBeCloseTo(-0.2, 14);
    expect(loading[2]).toBe(0);
  });

  it("reaches an averaged run through any of its readings", () => {
    const runs = study.runs.map((run, j) => (j === 1 || j === 7 ? { ...run, mixture: "M" } : run));
    const input: RateLawInput = {
      ...study,
      runs,
      shared: [{ species: ["A"], relative: 0.1, runs: ["R08"], factors: { R08: { A: 0.5 } } }],
    };
    const { errors } = sharedErrors(input, usableRuns(input).runs);
    expect(errors[0]?.runs).toEqual([1]);
    expect(errors[0]?.factors).toEqual([[0.5]]);
  });
});
