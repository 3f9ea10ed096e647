import fc from "fast-check";
import { backgroundEquation, powerEquation, saturatingEquation } from "kinetics-core/rate-equation";
import { expect, it } from "vitest";
import { type CandidateRun, type Comparison, compareLaws, fitCandidateOnRates } from "./index";

/** The candidates in a unit of concentration that is `unit` mol L⁻¹: starts and bounds of constants move with it. */
function compared(runs: readonly CandidateRun[], unit = 1): Comparison {
  const typical = () => 0.02 / unit;
  const a = { species: "A", order: 1 } as const;
  const laws = [
    powerEquation(["A"]),
    powerEquation(["A"], [1]),
    backgroundEquation({ main: [a], background: [], typical }),
    saturatingEquation({ saturating: "A", typical }),
  ];
  return compareLaws({ runs, candidates: laws.map((law) => fitCandidateOnRates(law, runs)) });
}

/** Rates of a saturating law that scatter by up to a fifth, levels from a pipette. */
const study = fc
  .record({
    levels: fc.array(fc.integer({ min: 1, max: 60 }), { minLength: 3, maxLength: 10 }),
    errors: fc.array(fc.integer({ min: -200, max: 200 }), { minLength: 10, maxLength: 10 }),
    constant: fc.constantFrom(0.001, 0.02, 0.4, 1000),
    weights: fc.array(fc.integer({ min: 1, max: 5 }), { minLength: 10, maxLength: 10 }),
  })
  .map(({ levels, errors, constant, weights }) =>
    levels.map((level, j): CandidateRun => {
      const concentration = level / 400;
      return {
        label: `R${j + 1}`,
        concentrations: { A: concentration },
        rate: (concentration / (constant + concentration)) * Math.exp((errors[j] ?? 0) / 1000),
        weight: weights[j] ?? 1,
      };
    }),
  );

function everyNumberIsFinite(value: unknown): boolean {
  if (typeof value === "number") return Number.isFinite(value);
  if (value !== null && typeof value === "object")
    // A law may turn into another at infinity, and says so by that number.
    return Object.entries(value).every(([key, one]) => key === "at" || everyNumberIsFinite(one));
  return true;
}

const readingsOf = ({ laws, verdict }: Comparison) => ({
  readings: laws.map((one) => one.reading),
  verdict: verdict.kind,
});

it("lets no NaN out, whatever the runs", () => {
  fc.assert(
    fc.property(study, (runs) => {
      const comparison = compared(runs);
      expect(everyNumberIsFinite(comparison)).toBe(true);
      expect(JSON.stringify(comparison)).not.toContain("NaN");
    }),
    { numRuns: 40, seed: 1 },
  );
});

it("does not depend on the order of the runs", () => {
  fc.assert(
    fc.property(study, (runs) => {
      const one = compared(runs);
      const other = compared([...runs].reverse());
      expect(readingsOf(other)).toEqual(readingsOf(one));
      one.laws.forEach((law, i) => {
        const same = other.laws[i];
        expect(same?.deltaAicc ?? 0).toBeCloseTo(law.deltaAicc ?? 0, 4);
        expect(same?.residualOrder.runsTest?.stretches).toBe(law.residualOrder.runsTest?.stretches);
        expect(same?.residualOrder.durbinWatson?.pValue ?? 1).toBeCloseTo(
          law.residualOrder.durbinWatson?.pValue ?? 1,
          4,
        );
        expect(same?.leaveOneOut?.error ?? 0).toBeCloseTo(law.leaveOneOut?.error ?? 0, 4);
      });
    }),
    { numRuns: 30, seed: 2 },
  );
});

it("reads the same in other units of concentration, time and weight", () => {
  fc.assert(
    fc.property(study, fc.constantFrom(1e-6, 1e-3, 0.133, 55), (runs, unit) => {
      const scaled = runs.map((run) => ({
        ...run,
        concentrations: { A: (run.concentrations.A ?? 0) / unit },
        rate: (run.rate * 60) / unit,
        weight: 7 * run.weight,
      }));
      expect(readingsOf(compared(scaled, unit))).toEqual(readingsOf(compared(runs)));
    }),
    { numRuns: 30, seed: 3 },
  );
});
