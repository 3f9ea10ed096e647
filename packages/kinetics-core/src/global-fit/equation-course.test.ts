import { randomDraws } from "kinetics-core/random";
import { expressionEquation, reversibleEquation, saturatingEquation } from "kinetics-core/rate-equation";
import { describe, expect, it } from "vitest";
import { fitGlobal } from "./fit-global";
import type { GlobalFit, GlobalFitInput, GlobalFitLaw } from "./global-fit";

const LEVELS = [1, 2, 4, 3, 1.5, 2.5].map((level) => level * 1e-3);
const NOISE = 1e-3;

/** Traces of A → P from a function that gives the time at which an extent is reached, or the extent at a time. */
function study(
  law: GlobalFitLaw,
  end: (A: number) => number,
  extentAt: (A: number, time: number) => number,
): GlobalFitInput {
  const draws = randomDraws(11);
  return {
    species: [
      { name: "A", stoichiometricNumber: -1 },
      { name: "P", stoichiometricNumber: 1 },
    ],
    followed: "A",
    signalPerConcentration: { value: 300, standardUncertainty: 0 },
    runs: LEVELS.map((A, j) => {
      const time = Array.from({ length: 80 }, (_, i) => (end(A) * (i + 1)) / 80);
      const signal = time.map((t) => 0.02 + 300 * (A - extentAt(A, t)) + NOISE * draws.normal());
      return { label: `R${j + 1}`, concentrations: { A, P: 0 }, time, signal };
    }),
    law,
  };
}

function fitted(input: GlobalFitInput): GlobalFit {
  const fit = fitGlobal(input);
  if (fit.status !== "fitted") throw new Error(`${fit.status}: ${fit.message}`);
  return fit;
}

const farFrom = (truth: number, one?: { estimate: number | null; standardError: number | null }) =>
  Math.abs((one?.estimate ?? Number.NaN) - truth) / (one?.standardError ?? 0);

/** v = k ([A] − [P]/K): ξ = ξ_e (1 − exp(−k (1 + 1/K) t)), ξ_e = A/(1 + 1/K). */
const toEquilibrium = (k: number, inverse: number) => (A: number, t: number) =>
  (A / (1 + inverse)) * -Math.expm1(-k * (1 + inverse) * t);

describe("a rate equation along a course", () => {
  const reversible: GlobalFitLaw = {
    equation: reversibleEquation({
      forward: [{ species: "A", order: 1 }],
      reverse: [{ species: "P", order: 1 }],
      equilibriumConstant: "free",
    }),
  };

  it.each([3, 40])("comes to equilibrium, after %d time constants too", (constants) => {
    const input = study(reversible, () => constants / 0.02, toEquilibrium(0.02, 1 / 3));
    const fit = fitted(input);
    expect(farFrom(1 / 3, fit.parameters["1/K"])).toBeLessThan(4);
    expect(farFrom(Math.log(0.02), fit.logRateConstant)).toBeLessThan(4);
    expect(fit.residualStandardDeviation).toBeCloseTo(NOISE, 4);
  });

  it("needs no reverse reaction where there is none", () => {
    const fit = fitted(study(reversible, () => 150, toEquilibrium(0.02, 0)));
    expect(fit.parameters["1/K"]?.estimate).toBeLessThan(0.02);
    expect(farFrom(Math.log(0.02), fit.logRateConstant)).toBeLessThan(4);
  });

  it("levels off at high concentration, and says the same for the law as a user writes it", () => {
    // k t = ξ + K ln(A/(A − ξ)), solved for ξ by bisection.
    const k = 1e-5;
    const K = 2e-3;
    const extentAt = (A: number, t: number) => {
      let [low, high] = [0, A];
      for (let i = 0; i < 60; i++) {
        const x = (low + high) / 2;
        if (x + K * Math.log(A / (A - x)) < k * t) low = x;
        else high = x;
      }
      return low;
    };
    const end = (A: number) => (0.8 * A + K * Math.log(5)) / k;
    const built = fitted(study({ equation: saturatingEquation({ saturating: "A" }) }, end, extentAt));
    expect(farFrom(K, built.parameters.K)).toBeLessThan(4);
    expect(built.rateConstant.unit).toBe("mol L^-1 s^-1");
    const written = expressionEquation("k [A]/(K + [A])", { species: ["A"] });
    if (written.status !== "equation") throw new Error(written.message);
    const own = fitted(study({ equation: written.equation }, end, extentAt));
    expect((own.parameters.K?.estimate ?? 0) / (built.parameters.K?.estimate ?? 1)).toBeCloseTo(1, 3);
  });

  it("holds a parameter that is given", () => {
    const held = { ...reversible, held: { "1/K": 0 } };
    const fit = fitted(study(held, () => 150, toEquilibrium(0.02, 0)));
    expect(fit.parameterNames).toEqual(["ln k"]);
    expect(farFrom(Math.log(0.02), fit.logRateConstant)).toBeLessThan(4);
  });
});
