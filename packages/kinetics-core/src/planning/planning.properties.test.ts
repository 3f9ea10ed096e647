import fc from "fast-check";
import type { FittedLaw } from "kinetics-core/prediction";
import { powerEquation, saturatingEquation } from "kinetics-core/rate-equation";
import { describe, expect, it } from "vitest";
import { discriminatingRun } from "./discriminating-run";
import { isFeasible } from "./feasible-set";
import { nextRuns } from "./next-run";
import { runsToTarget } from "./runs-to-target";

const amount = fc.double({ min: 1e-6, max: 5, noNaN: true });
const range = fc.tuple(amount, amount).map(([a, b]) => [Math.min(a, b), Math.max(a, b)] as const);
const feasible = fc.record({
  ranges: fc.record({ A: range, B: range }),
  stocks: fc.constantFrom<Record<string, number>>({}, { A: 20, B: 20 }, { A: 5.5, B: 6 }),
});
const order = fc.double({ min: -1, max: 3, noNaN: true });
const made = fc.array(fc.record({ A: amount, B: amount }), { maxLength: 6 });
const scatter = fc.double({ min: 1e-4, max: 0.5, noNaN: true });

const common = {
  covariance: null,
  degreesOfFreedom: null,
  betweenRunStandardDeviation: null,
  studied: { A: [0.01, 0.1] as const },
  level: 0.95,
};
const powers = fc.tuple(order, order).map(
  (parameters): FittedLaw => ({
    ...common,
    equation: powerEquation(["A", "B"]),
    logRateConstant: 0,
    parameters,
  }),
);
const saturating = amount.map(
  (half): FittedLaw => ({
    ...common,
    equation: saturatingEquation({ saturating: "A", others: [{ species: "B", order: 1 }] }),
    logRateConstant: 0,
    parameters: [half],
  }),
);
const anyLaw = fc.oneof(powers, saturating);

function numbersIn(value: unknown): readonly number[] {
  if (typeof value === "number") return [value];
  return typeof value === "object" && value !== null ? Object.values(value).flatMap(numbersIn) : [];
}

const finiteNumbers = (value: unknown) => numbersIn(value).every((number) => Number.isFinite(number));

describe("plans for any law, runs and stocks", () => {
  it("lie within what can be mixed, never raise a standard error, and hold no number that is not finite", () => {
    fc.assert(
      fc.property(anyLaw, made, feasible, scatter, (law, runs, set, s) => {
        const result = nextRuns({ law, made: runs, feasible: set, scatter: s, count: 2 });
        expect(finiteNumbers(result)).toBe(true);
        if (result.status !== "planned") return;
        for (const { recipe, standardErrorsBefore, standardErrorsAfter, regionFactor } of result.runs) {
          expect(isFeasible(set, recipe)).toBe(true);
          expect(regionFactor).toBeGreaterThanOrEqual(1);
          for (const [name, before] of Object.entries(standardErrorsBefore)) {
            if (before === null) continue;
            expect(standardErrorsAfter[name]).toBeLessThanOrEqual(before * (1 + 1e-6));
          }
        }
      }),
      { numRuns: 60 },
    );
  });

  it("to a target end, and each step is at least as precise as the one before", () => {
    fc.assert(
      fc.property(powers, made, feasible, scatter, (law, runs, set, s) => {
        const result = runsToTarget({
          law,
          made: runs,
          feasible: set,
          scatter: s,
          targets: { n_A: 0.1 },
          measure: "standard-uncertainty",
          most: 10,
        });
        expect(finiteNumbers(result)).toBe(true);
        if (!("steps" in result)) return;
        const known = result.steps.flatMap(({ precision }) => precision.n_A ?? []);
        known.slice(1).forEach((value, i) => {
          expect(value).toBeLessThanOrEqual((known[i] ?? 0) * (1 + 1e-6));
        });
      }),
      { numRuns: 40 },
    );
  });

  it("between two laws lie within what can be mixed, or say why there is none", () => {
    fc.assert(
      fc.property(anyLaw, anyLaw, feasible, scatter, (first, second, set, s) => {
        const result = discriminatingRun({ first, second, feasible: set, scatter: s });
        expect(finiteNumbers(result)).toBe(true);
        if (result.status === "planned") expect(isFeasible(set, result.recipe)).toBe(true);
        else expect(result.message).toMatch(/\w/);
      }),
      { numRuns: 40 },
    );
  });
});
