import { incompleteBeta } from "kinetics-core/distributions";
import { randomDraws } from "kinetics-core/random";
import { labelOf, type Scenario, simulateRuns } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { fitRateLaw } from "./fit-rate-law";

/**
 * Coverage of 95 % intervals with known truth, fixed seeds. Two limits:
 * - never below the 0.5 % point of a binomial with 92.5 %, the library's own promise;
 * - where the method is exact in theory (equal errors), within the central 99.8 % of a binomial with 95 %.
 * Over-coverage where the stated errors already explain the scatter is the price of f = max(τ̂², mean u²).
 */
const REPLICATES = 300;

const twoSeries = [
  [0.01, 0.02],
  [0.02, 0.02],
  [0.04, 0.02],
  [0.08, 0.02],
  [0.02, 0.01],
  [0.02, 0.04],
  [0.02, 0.08],
  [0.02, 0.02],
] as const;
const base = { species: ["A", "B"], orders: [1, 0.5], rateConstant: 0.3, recipes: twoSeries } as const;
const all = (value: number) => twoSeries.map(() => value);

const cells: readonly { readonly name: string; readonly scenario: Scenario; readonly exact: boolean }[] = [
  {
    name: "scatter of 4 % between runs, no stated error",
    scenario: { ...base, scatter: 0.04, rateErrors: all(0) },
    exact: true,
  },
  {
    name: "a third of the runs poor (10 % against 1 %), scatter 2 %",
    scenario: { ...base, scatter: 0.02, rateErrors: twoSeries.map((_, j) => (j % 3 === 0 ? 0.1 : 0.01)) },
    exact: false,
  },
  {
    name: "stocks of 2 % and a rate scale of 1.5 % shared by all runs, scatter 2 %",
    scenario: {
      ...base,
      scatter: 0.02,
      rateErrors: all(0.01),
      shared: [
        { species: ["A"], relative: 0.02 },
        { species: ["B"], relative: 0.02 },
        { species: [], onRate: true, relative: 0.015 },
      ],
    },
    exact: false,
  },
  {
    name: "pipetting of 3 % in every concentration",
    scenario: { ...base, scatter: 0.005, rateErrors: all(0.01), pipetting: 0.03 },
    exact: false,
  },
  {
    name: "a dilution chain of B, 2 % a step, scatter 1 %",
    scenario: {
      ...base,
      orders: [1, 1],
      scatter: 0.01,
      rateErrors: all(0.005),
      shared: [
        {
          species: ["B"],
          relative: 0.02,
          runs: twoSeries.flatMap((row, j) => (row[1] < 0.08 ? [labelOf(j)] : [])),
        },
        {
          species: ["B"],
          relative: 0.02,
          runs: twoSeries.flatMap((row, j) => (row[1] < 0.04 ? [labelOf(j)] : [])),
        },
        {
          species: ["B"],
          relative: 0.02,
          runs: twoSeries.flatMap((row, j) => (row[1] < 0.02 ? [labelOf(j)] : [])),
        },
      ],
    },
    exact: false,
  },
  {
    name: "three runs too uncertain for a logarithm (35 %), the others 3 %",
    scenario: {
      ...base,
      scatter: 0.02,
      rateErrors: twoSeries.map((_, j) => (j === 0 || j === 4 || j === 7 ? 0.35 : 0.03)),
    },
    exact: false,
  },
];

/** Least n with P(X ≤ n) ≥ p for X binomial(size, chance). */
function binomialQuantile(p: number, size: number, chance: number): number {
  for (let n = 0; n < size; n++) if (incompleteBeta(size - n, n + 1, 1 - chance, chance).lower >= p) return n;
  return size;
}

describe("the limits", () => {
  it("are those of a binomial: of 500 at 95 % between 459 and 489 with 99.8 % (computed with SciPy 1.17)", () => {
    expect(binomialQuantile(0.001, 500, 0.95)).toBe(459);
    expect(binomialQuantile(0.999, 500, 0.95)).toBe(489);
    expect(binomialQuantile(0.005, 500, 0.925)).toBe(447);
  });
});

describe.each(cells.map((cell, index) => ({ ...cell, index })))("$name", ({ scenario, exact, index }) => {
  it("covers orders and ln k as it says", () => {
    const deviate = randomDraws(20_001 + index).normal;
    const covered = { A: 0, B: 0, "ln k": 0 };
    for (let replicate = 0; replicate < REPLICATES; replicate++) {
      const law = fitRateLaw(simulateRuns(scenario, deviate));
      if (law.status !== "fitted") throw new Error(law.message);
      const truths = [
        ["A", law.orders.A, scenario.orders[0] ?? 0],
        ["B", law.orders.B, scenario.orders[1] ?? 0],
        ["ln k", law.logRateConstant, Math.log(scenario.rateConstant)],
      ] as const;
      for (const [name, estimate, truth] of truths) {
        const interval = estimate?.interval ?? null;
        if (interval !== null && interval[0] <= truth && truth <= interval[1]) covered[name] += 1;
      }
    }
    for (const [name, count] of Object.entries(covered)) {
      expect(count, `${name}: too few`).toBeGreaterThanOrEqual(binomialQuantile(0.005, REPLICATES, 0.925));
      if (exact) {
        expect(count, `${name}: too few`).toBeGreaterThanOrEqual(binomialQuantile(0.001, REPLICATES, 0.95));
        expect(count, `${name}: too many`).toBeLessThanOrEqual(binomialQuantile(0.999, REPLICATES, 0.95));
      }
    }
  });
});
