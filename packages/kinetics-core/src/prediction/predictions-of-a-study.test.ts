import { randomDraws } from "kinetics-core/random";
import { fitRateLaw, type RateLawFit } from "kinetics-core/rate-law";
import { nineRecipes, type Scenario, simulateRuns } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { judgeConfirmation, sealPrediction } from "./confirmation";
import { type FittedLaw, lawOfRates } from "./fitted-law";
import { predictRate } from "./predict-rate";
import { timeToConversion } from "./time-to-conversion";
import { unknownConcentration } from "./unknown-concentration";

/** Studies with a known law, from runs to predictions: what an interval at 95 % covers. Fixed seeds. */
const TRUTH = { A: 1, B: 2 } as const;
const K = 11.8;
const SCATTER = 0.05;

const scenario: Scenario = {
  species: ["A", "B"],
  orders: [TRUTH.A, TRUTH.B],
  rateConstant: K,
  recipes: nineRecipes,
  scatter: SCATTER,
  rateErrors: nineRecipes.map(() => 0),
};

function study(seed: number, changes: Partial<Scenario> = {}): RateLawFit {
  const fit = fitRateLaw(simulateRuns({ ...scenario, ...changes }, randomDraws(seed).normal));
  if (fit.status !== "fitted") throw new Error(fit.message);
  return fit;
}

function lawOf(fit: RateLawFit, orders: "free" | "simple" = "free"): FittedLaw {
  const found = lawOfRates(fit, orders);
  if (found.status !== "law") throw new Error(found.message);
  return found.law;
}

const trueRate = (a: number, b: number) => K * a ** TRUTH.A * b ** TRUTH.B;
const REPLICATES = 300;
/** 0.5 % point of a binomial with 92.5 % in 300. */
const FEWEST = 265;

describe("the law of a fit to rates", () => {
  it("carries ln k, orders, their covariance, τ and the studied range", () => {
    const fit = study(1);
    const law = lawOf(fit);
    expect(law.logRateConstant).toBe(fit.logRateConstant.estimate);
    expect(law.parameters).toEqual([fit.orders.A?.estimate, fit.orders.B?.estimate]);
    expect(law.covariance).toEqual(fit.covariance);
    expect(law.studied.A).toEqual([0.01, 0.08]);
    expect(law.betweenRunStandardDeviation).toBe(fit.betweenRunStandardDeviation);
  });

  it("holds simple orders exactly, and held ones where they were held", () => {
    const simple = lawOf(study(1), "simple");
    expect(simple.equation.law).toBe("v = k [A] [B]^2");
    expect(simple.covariance).toHaveLength(1);
    const input = simulateRuns(scenario, randomDraws(2).normal);
    const fit = fitRateLaw({ ...input, orders: { B: 2 } });
    if (fit.status !== "fitted") throw new Error(fit.message);
    expect(lawOf(fit).equation.law).toBe("v = k [A]^n_A [B]^2");
    expect(lawOf(fit).covariance).toHaveLength(2);
  });

  it("is no law where an order is undetermined", () => {
    const fit = study(1, { recipes: nineRecipes.map(([a]) => [a, 0.02]) });
    expect(lawOfRates(fit)).toMatchObject({
      status: "not-determined",
      message: expect.stringContaining("order in B"),
    });
  });

  it("gives at the centre of the design the rate that the fit reports there", () => {
    const fit = study(3);
    const prediction = predictRate(lawOf(fit), fit.centre.concentrations);
    if (prediction.status !== "predicted") throw new Error(prediction.message);
    expect(Number(prediction.ofTheLaw.estimate) / Number(fit.centre.rate.estimate)).toBeCloseTo(1, 10);
    expect(Number(prediction.ofTheLaw.standardError) / Number(fit.centre.rate.standardError)).toBeCloseTo(
      1,
      8,
    );
  });
});

describe("coverage of predictions for what is true and for a new run", () => {
  it("rate, time to 80 %, an unknown concentration and a sealed band, with free orders", () => {
    const mixture = {
      concentrations: { A: 0.03, B: 0.05 },
      stoichiometricNumbers: { A: -1, B: -2 },
    };
    // ∫ dξ/(A·B²) to 80 % of B, A = 0.03 − ξ, B = 0.05 − 2ξ, by Simpson's rule with 2000 steps.
    const trueTime = simpson((x) => 1 / trueRate(0.03 - x, 0.05 - 2 * x), 0.02, 2000);
    const hits = { rate: 0, time: 0, newTime: 0, unknown: 0, sealed: 0 };
    const within = (interval: readonly [number, number] | null, value: number) =>
      Number(interval !== null && interval[0] <= value && value <= interval[1]);
    for (let seed = 0; seed < REPLICATES; seed++) {
      const law = lawOf(study(seed));
      const own = Math.exp(SCATTER * randomDraws(50_000 + seed).normal());
      const rate = predictRate(law, mixture.concentrations);
      const time = timeToConversion(law, mixture, 0.8, "B");
      const unknown = unknownConcentration(law, {
        species: "B",
        concentrations: { A: { value: 0.03, relative: 0 } },
        rate: trueRate(0.03, 0.033) * own,
        relative: 0,
      });
      if (rate.status !== "predicted" || time.status !== "predicted" || unknown.status !== "found")
        throw new Error("a prediction failed");
      hits.rate += within(rate.ofTheLaw.interval, trueRate(0.03, 0.05));
      hits.time += within(time.ofTheLaw.interval, trueTime);
      hits.newTime += within(time.newRun.interval, trueTime / own);
      hits.unknown += within(unknown.concentration.interval, 0.033);
      const sealed = sealPrediction({
        quantity: "rate",
        unit: "mol L^-1 s^-1",
        logarithm: rate.logRate.logarithm,
        newRunVariance: rate.logRate.newRunVariance,
        degreesOfFreedom: rate.logRate.newRunDegreesOfFreedom,
      });
      if (sealed.status !== "sealed") throw new Error(sealed.message);
      const judged = judgeConfirmation(sealed.sealed, { value: trueRate(0.03, 0.05) * own, relative: 0 });
      hits.sealed += Number(judged.verdict === "inside");
      expect(judged.verdict === "inside").toBe(judged.pValue >= 0.05);
    }
    for (const count of Object.values(hits)) expect(count).toBeGreaterThanOrEqual(FEWEST);
    // A band that covered always would be no band.
    expect(Math.min(...Object.values(hits))).toBeLessThan(REPLICATES);
  });
});

describe("coverage for a new run where a stated stock error makes up most of the law's variance", () => {
  it("holds with five runs: τ is known from two degrees of freedom, whatever the stock says", () => {
    let hits = 0;
    const replicates = 300;
    for (let seed = 0; seed < replicates; seed++) {
      const fit = study(100 + seed, {
        recipes: nineRecipes.slice(0, 5),
        shared: [{ species: ["A", "B"], relative: 0.02 }],
      });
      const rate = predictRate(lawOf(fit), { A: 0.03, B: 0.018 });
      if (rate.status !== "predicted") throw new Error(rate.message);
      const made = trueRate(0.03, 0.018) * Math.exp(SCATTER * randomDraws(80_000 + seed).normal());
      const [low = 0, high = 0] = rate.newRun.interval ?? [];
      hits += Number(low <= made && made <= high);
    }
    // 0.5 % point of a binomial with 92.5 % in 300.
    expect(hits).toBeGreaterThanOrEqual(265);
  });
});

function simpson(f: (x: number) => number, to: number, steps: number): number {
  const h = to / steps;
  let sum = f(0) + f(to);
  for (let i = 1; i < steps; i++) sum += (i % 2 === 0 ? 2 : 4) * f(i * h);
  return (sum * h) / 3;
}
