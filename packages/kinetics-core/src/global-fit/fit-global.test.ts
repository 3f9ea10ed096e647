import { powerEquation } from "kinetics-core/rate-equation";
import { describe, expect, it } from "vitest";
import { fitGlobal } from "./fit-global";
import type { GlobalFit, GlobalFitInput, GlobalFitOptions } from "./global-fit";
import { simulateStudy } from "./simulated-study";

const clean = {
  runs: 6,
  points: 120,
  orders: { A: 1, B: 0.5 },
  rateConstant: 2,
  betweenRuns: 0,
  noise: 1e-9,
  seed: 1,
};

function fitted(input: GlobalFitInput, options?: GlobalFitOptions): GlobalFit {
  const fit = fitGlobal(input, options);
  if (fit.status !== "fitted") throw new Error(`${fit.status}: ${fit.message}`);
  return fit;
}

describe("global fit", () => {
  it("finds the law behind traces without noise to more digits than a trace could show", () => {
    const fit = fitted(simulateStudy(clean));
    expect(fit.orders.A?.estimate).toBeCloseTo(1, 6);
    expect(fit.orders.B?.estimate).toBeCloseTo(0.5, 6);
    expect(fit.logRateConstant.estimate).toBeCloseTo(Math.log(2), 5);
    expect(fit.signalPerConcentration.estimate).toBeCloseTo(250, 3);
  });

  it("gives ln k an interval that reaches over the scatter between runs, where the pooled one does not", () => {
    const fit = fitted(simulateStudy({ ...clean, runs: 12, betweenRuns: 0.05, noise: 0.002, seed: 4 }));
    expect(fit.betweenRunStandardDeviation).toBeGreaterThan(0.02);
    expect(fit.betweenRunStandardDeviation).toBeLessThan(0.1);
    const wide = fit.orders.A?.standardError ?? 0;
    const narrow = fit.pooled.orders.A?.standardError ?? 0;
    expect(wide).toBeGreaterThan(2 * narrow);
    const interval = fit.orders.A?.interval ?? [0, 0];
    expect(interval[0]).toBeLessThan(1);
    expect(interval[1]).toBeGreaterThan(1);
  });

  it("fits the same law written as an equation to the same numbers", () => {
    const input = simulateStudy({ ...clean, betweenRuns: 0.03, noise: 0.002, seed: 2 });
    const built = fitted(input);
    const general = fitted({ ...input, law: { equation: powerEquation(["A", "B"]) } });
    expect(general.parameters.n_A?.estimate).toBeCloseTo(built.orders.A?.estimate ?? 0, 6);
    expect(general.parameters.n_B?.standardError).toBeCloseTo(built.orders.B?.standardError ?? 0, 6);
    expect(general.degreesOfFreedom).toBe(built.degreesOfFreedom);
    expect(general.rateConstant.unit).toBe(built.rateConstant.unit);
  });
});
