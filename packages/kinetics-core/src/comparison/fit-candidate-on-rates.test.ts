import { randomDraws } from "kinetics-core/random";
import { backgroundEquation, powerEquation, saturatingEquation } from "kinetics-core/rate-equation";
import { fitRateLaw } from "kinetics-core/rate-law";
import { nineRuns, simulateRuns } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import type { Candidate, FittedCandidate } from "./candidate";
import { fitCandidateOnRates } from "./fit-candidate-on-rates";
import type { CandidateRun } from "./rate-problem";

function fitted(candidate: Candidate): FittedCandidate {
  if (candidate.status !== "fitted") throw new Error(candidate.message);
  return candidate;
}

/** Levels of A over a factor of 64, B and P there but idle. */
const levels = [0.0025, 0.005, 0.01, 0.02, 0.04, 0.08, 0.16, 0.02];
function runsWith(rateOf: (a: number) => number, scatter: number, seed: number): readonly CandidateRun[] {
  const draws = randomDraws(seed);
  return levels.map((a, j) => ({
    label: `R${j + 1}`,
    concentrations: { A: a, B: 0.02, P: 0 },
    rate: rateOf(a) * Math.exp(scatter * draws.normal()),
    weight: 1,
  }));
}

describe("a candidate on rates", () => {
  it("the law of powers is the one of the rate-law section, weights, orders and errors alike", () => {
    const input = simulateRuns(nineRuns, randomDraws(4).normal);
    const law = fitRateLaw({ ...input, shared: [] });
    if (law.status !== "fitted") throw new Error(law.message);
    const runs = law.residuals.map((row, j): CandidateRun => {
      const run = input.runs[j];
      return {
        label: row.label,
        concentrations: run?.concentrations ?? {},
        rate: run?.rate ?? 0,
        weight: row.weight,
      };
    });
    const candidate = fitted(fitCandidateOnRates(powerEquation(["A", "B"]), runs));
    const [logConstant, a, b] = candidate.estimates;
    expect(a?.value.estimate).toBeCloseTo(law.orders.A?.estimate ?? Number.NaN, 8);
    expect(b?.value.estimate).toBeCloseTo(law.orders.B?.estimate ?? Number.NaN, 8);
    expect(a?.value.standardError).toBeCloseTo(law.orders.A?.standardError ?? Number.NaN, 8);
    expect(b?.value.interval?.[1]).toBeCloseTo(law.orders.B?.interval?.[1] ?? Number.NaN, 7);
    expect(logConstant?.value.estimate).toBeCloseTo(law.logRateConstant.estimate ?? Number.NaN, 7);
    expect(candidate.lackOfFit?.pValue).toBeCloseTo(law.lackOfFit?.pValue ?? Number.NaN, 6);
    law.residuals.forEach((row, j) => {
      expect(candidate.onRates?.residuals[j]).toBeCloseTo(row.residual, 8);
    });
  });

  it("finds limiting rate and K of a saturating law, with a profile interval that holds the truth", () => {
    const runs = runsWith((a) => (3e-4 * a) / (0.03 + a), 0.02, 7);
    const candidate = fitted(fitCandidateOnRates(saturatingEquation({ saturating: "A" }), runs));
    const constant = candidate.estimates[1];
    expect(constant?.name).toBe("K");
    const [low, high] = constant?.value.interval ?? [0, 0];
    expect(low).toBeLessThan(0.03);
    expect(high).toBeGreaterThan(0.03);
    expect(high - (constant?.value.estimate ?? 0)).toBeGreaterThan((constant?.value.estimate ?? 0) - low);
    expect(candidate.extensions.map((one) => [one.at, one.coversNull])).toEqual([
      [0, false],
      [Number.POSITIVE_INFINITY, false],
    ]);
  });

  it("says of a saturation that the runs do not show what K they exclude", () => {
    const runs = runsWith((a) => 0.01 * a, 0.02, 8);
    const candidate = fitted(fitCandidateOnRates(saturatingEquation({ saturating: "A" }), runs));
    const [toZero, toOne] = candidate.extensions;
    expect([toZero?.coversNull, toOne?.coversNull]).toEqual([false, true]);
    expect(toOne?.excludes).toMatch(/^K below .* mol L⁻¹$/);
    expect(candidate.estimates[1]?.value.interval).toBeNull();
  });

  it("leaves each run out in earnest: residual over 1 − leverage where the law is linear in its parameters", () => {
    const runs = runsWith((a) => 0.01 * a ** 1.2, 0.05, 9);
    const candidate = fitted(fitCandidateOnRates(powerEquation(["A"]), runs));
    const logs = levels.map(Math.log);
    const mean = logs.reduce((sum, x) => sum + x, 0) / logs.length;
    const spread = logs.reduce((sum, x) => sum + (x - mean) ** 2, 0);
    candidate.onRates?.leaveOneOut.forEach((error, j) => {
      const leverage = 1 / logs.length + ((logs[j] ?? 0) - mean) ** 2 / spread;
      expect(error).toBeCloseTo((candidate.onRates?.residuals[j] ?? 0) / (1 - leverage), 7);
    });
  });

  it("finds a background that would have to be less than nothing impossible", () => {
    const runs = runsWith((a) => 0.01 * (a - 0.001), 0.02, 10);
    const equation = backgroundEquation({ main: [{ species: "A", order: 1 }], background: [] });
    const beta = fitted(fitCandidateOnRates(equation, runs)).estimates[1];
    expect(beta?.atBound).toBe(true);
    expect(beta?.impossible).toBe(true);
    const fine = fitted(
      fitCandidateOnRates(
        equation,
        runsWith((a) => 0.01 * (a + 0.004), 0.02, 11),
      ),
    );
    expect(fine.estimates[1]?.impossible).toBe(false);
  });

  it("an exact table gives the law to nine digits and no lack of fit from rounding", () => {
    const runs = runsWith((a) => 0.01 * a ** 1.5, 0, 1);
    const candidate = fitted(fitCandidateOnRates(powerEquation(["A"]), runs));
    expect(candidate.estimates[1]?.value.estimate).toBeCloseTo(1.5, 9);
    expect(candidate.lackOfFit).toBeNull();
    expect(candidate.runSquares).toBeGreaterThan(0);
  });

  it.each([
    ["no rate", { rate: 0 }, "has no logarithm"],
    ["a species that is not stated", { concentrations: { B: 1 } }, "no concentration of A"],
    ["a weight of nothing", { weight: 0 }, "above 0 is needed"],
  ] as const)("%s is refused by name", (_, change, words) => {
    const runs = runsWith((a) => a, 0, 1).map((run, j) => (j === 2 ? { ...run, ...change } : run));
    const candidate = fitCandidateOnRates(powerEquation(["A"]), runs);
    expect(candidate.status === "failed" ? candidate.message : "").toContain(words);
    expect(candidate.status === "failed" ? candidate.message : "").toContain("R3");
  });

  it("a law that gives a run no rate says so instead of a number", () => {
    const candidate = fitCandidateOnRates(
      powerEquation(["P"]),
      runsWith((a) => a, 0.01, 1),
    );
    expect(candidate.status).toBe("failed");
  });
});
