import { exponentialOf } from "kinetics-core/quantities";
import { randomDraws } from "kinetics-core/random";
import { powerEquation } from "kinetics-core/rate-equation";
import { describe, expect, it } from "vitest";
import { fitGlobal } from "./fit-global";
import type { GlobalFit, GlobalFitInput, GlobalFitOptions } from "./global-fit";
import peer from "./pooled-peer.fixture.json";
import { robustBeside } from "./robust-beside";
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
const noisy = { ...clean, runs: 9, betweenRuns: 0.03, noise: 0.003, seed: 5 };

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

  it("pools to the estimates of another implementation", () => {
    const fit = fitted({
      species: [
        { name: "A", stoichiometricNumber: -1 },
        { name: "B", stoichiometricNumber: -1 },
      ],
      followed: "A",
      signalPerConcentration: { value: peer.signalPerConcentration, standardUncertainty: 0 },
      runs: peer.runs,
      law: { orders: { A: "free", B: "free" } },
    });
    const { logRateConstant, orders } = fit.pooled;
    for (const [found, [estimate = 0, standardError = 0]] of [
      [logRateConstant, peer.logRateConstant],
      [orders.A, peer.orderOfA],
      [orders.B, peer.orderOfB],
    ] as const) {
      expect(Math.abs((found?.estimate ?? 0) - estimate)).toBeLessThan(0.01 * standardError);
      expect((found?.standardError ?? 0) / standardError).toBeCloseTo(1, 2);
    }
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

  it("takes ε·l from its statement where the traces hardly tell it", () => {
    const fit = fitted(simulateStudy({ ...noisy, duration: 0.1, law: { orders: { A: 1, B: 0.5 } } }));
    expect(fit.signalPerConcentration.standardError).toBeGreaterThan(1);
    expect(fit.signalPerConcentration.standardError).toBeLessThan(2.6);
    expect(Math.abs((fit.signalPerConcentration.estimate ?? 0) - 250)).toBeLessThan(5);
  });

  it("finds scales and times zero of the runs where it is told how far they may stray", () => {
    const input = simulateStudy({ ...clean, points: 200, noise: 0.001, seed: 3 });
    const runs = input.runs.map((run, j) => {
      const late = 0.02 * (j % 3) * (run.time[run.time.length - 1] ?? 0);
      const factor = 1 + 0.02 * ((j % 2) - 0.5);
      return {
        ...run,
        time: Array.from(run.time, (t) => t + late),
        signal: Array.from(run.signal, (y) => factor * y),
        timeZero: { value: 0, standardUncertainty: late + 1 },
      };
    });
    const told = fitted({ ...input, runs, scaleDeviation: 0.02 });
    const untold = fitted({ ...input, runs: runs.map(({ timeZero: _, ...run }) => run) });
    expect(told.residualStandardDeviation).toBeCloseTo(0.001, 4);
    expect(untold.residualStandardDeviation).toBeGreaterThan(0.0015);
    expect(told.orders.A?.estimate).toBeCloseTo(1, 1);
  });

  it("does not care in which units or order the runs come", () => {
    const input = simulateStudy(noisy);
    const fit = fitted(input);
    const turned = fitted({ ...input, runs: [...input.runs].reverse() });
    const minutes = fitted({
      ...input,
      timeUnit: "min",
      runs: input.runs.map((run) => ({ ...run, time: Array.from(run.time, (t) => t / 60) })),
    });
    expect(turned.orders.A?.estimate).toBeCloseTo(fit.orders.A?.estimate ?? 0, 7);
    expect(minutes.orders.A?.estimate).toBeCloseTo(fit.orders.A?.estimate ?? 0, 7);
    expect((minutes.rateConstant.estimate ?? 0) / (fit.rateConstant.estimate ?? 1)).toBeCloseTo(60, 4);
    expect(minutes.rateConstant.unit).toContain("min^-1");
  });

  it("gives each run its own ln k about the shared one, and robust intervals beside those of the model", () => {
    const fit = fitted(simulateStudy(noisy));
    const own = fit.runs.map((run) => run.logRateConstant.estimate ?? 0);
    const mean = own.reduce((sum, value) => sum + value, 0) / own.length;
    expect(mean).toBeCloseTo(fit.logRateConstant.estimate ?? 0, 1);
    expect(fit.rateConstant).toMatchObject(exponentialOf(fit.logRateConstant));
    const robust = robustBeside(fit);
    expect(robust.logRateConstant.estimate).toBe(fit.logRateConstant.estimate);
    expect(robust.parameters.A?.standardError).toBeGreaterThan(0);
  });

  it("covers the true order and ln k about as often as it says", () => {
    let orders = 0;
    let constants = 0;
    const studies = 60;
    for (let seed = 1; seed <= studies; seed++) {
      const study = { ...noisy, points: 40, runs: 8, betweenRuns: 0.05, autocorrelation: 0.5, seed };
      const fit = fitted(simulateStudy(study));
      const holds = (interval: readonly [number, number] | null | undefined, truth: number) =>
        interval !== null && interval !== undefined && interval[0] <= truth && truth <= interval[1];
      if (holds(fit.orders.A?.interval, 1)) orders++;
      if (holds(fit.logRateConstant.interval, Math.log(2))) constants++;
    }
    // Of 60 at a true 95 %, fewer than 52 occur once in a hundred times.
    expect(orders).toBeGreaterThanOrEqual(52);
    expect(constants).toBeGreaterThanOrEqual(52);
  });
});

describe("a global fit from a bad start", () => {
  it.each([1e-6, 1e-3, 1e3, 1e6])("finds the same law with k wrong by a factor of %d", (factor) => {
    const input = simulateStudy(noisy);
    const fit = fitted(input);
    const start = { logRateConstant: Math.log(2 * factor), parameters: { A: 1, B: 0.5 } };
    const other = fitted(input, { start });
    const error = fit.orders.A?.standardError ?? 0;
    expect(Math.abs((other.orders.A?.estimate ?? 0) - (fit.orders.A?.estimate ?? 0))).toBeLessThan(
      0.05 * error,
    );
  });

  it("finds the same law from orders anywhere between −2 and 4", () => {
    const input = simulateStudy({ ...noisy, points: 60, orders: { A: 0.5, B: 0 }, rateConstant: 0.05 });
    const fit = fitted(input);
    const draws = randomDraws(7);
    for (let trial = 0; trial < 60; trial++) {
      const parameters = { A: -2 + 6 * draws.uniform(), B: -2 + 6 * draws.uniform() };
      const other = fitted(input, { start: { parameters } });
      const gap = Math.abs((other.orders.A?.estimate ?? 0) - (fit.orders.A?.estimate ?? 0));
      expect(gap).toBeLessThan(0.1 * (fit.orders.A?.standardError ?? 0));
    }
  });

  it.each([
    [0, 1],
    [0.5, 0.5],
    [0.2, 0],
    [0, 0],
    [2, 1],
    [-0.5, 1],
  ])("finds orders %d and %d whether the reactant lasts or is used up early", (A, B) => {
    for (const duration of [0.8, 4]) {
      const fit = fitted(simulateStudy({ ...noisy, rateConstant: 1, orders: { A, B }, duration }));
      const far = (order: keyof typeof fit.orders, truth: number) =>
        Math.abs((fit.orders[order]?.estimate ?? 9) - truth) / (fit.orders[order]?.standardError ?? 1);
      expect(far("A", A)).toBeLessThan(4);
      expect(far("B", B)).toBeLessThan(4);
    }
  });
});
