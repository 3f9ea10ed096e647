import { randomDraws } from "kinetics-core/random";
import { informationOf, type LinearStudy, simulateLinearRuns } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { pooledInference, type RandomRateInference, randomRateInference } from "./index";
import fixture from "./random-rate.fixture.json";
import type { PriorInformation, RunInformation } from "./run-information";

const runs = fixture.derivatives.map((derivatives, j) =>
  informationOf(
    { label: `R${j + 1}`, derivatives, residuals: fixture.residuals[j] ?? [] },
    fixture.autocorrelations[j] ?? 0,
  ),
);
const priors = [fixture.prior];

function determined(...given: Parameters<typeof randomRateInference>): RandomRateInference {
  const result = randomRateInference(...given);
  if (result.status !== "determined") throw new Error(result.message);
  return result;
}

function expectClose(value: number | undefined | null, expected: number, digits: number): void {
  expect(Math.abs((value ?? Number.NaN) - expected)).toBeLessThan(10 ** -digits * Math.abs(expected));
}

describe("run scatter in ln k, against V written out and inverted (NumPy, SciPy)", () => {
  const result = determined(runs, priors, { undetermined: 2 });

  it("finds the noise of each run from its own fit, autocorrelation counted in", () => {
    result.noiseVariances.forEach((variance, j) => {
      expectClose(variance, fixture.noiseVariances[j] ?? 0, 11);
    });
  });

  it("finds the restricted maximum of τ² that SciPy finds, as closely as a flat top lets a search by values", () => {
    expectClose(result.betweenRunVariance, fixture.betweenRunVariance, 6);
    expectClose(result.restrictedDeviance, fixture.restrictedDeviance, 12);
  });

  it.each(Object.entries(fixture.restrictedDevianceAt))(
    "has its restricted deviance at τ² = %s",
    (at, deviance) => {
      const held = determined(runs, priors, { undetermined: 2, betweenRunVariance: Number(at) });
      expectClose(held.restrictedDeviance, deviance, 10);
    },
  );

  it("has its estimates, covariance and predictions of each run's ln k", () => {
    const at = determined(runs, priors, { undetermined: 2, betweenRunVariance: fixture.betweenRunVariance });
    expectClose(at.quadratic, fixture.quadratic, 10);
    expectClose(at.marginalDeviance, fixture.marginalDeviance, 10);
    fixture.step.forEach((value, i) => {
      expectClose(at.step[i], value, 9);
    });
    fixture.covariance.flat().forEach((value, i) => {
      expectClose(at.covariance.flat()[i], value, 9);
    });
    fixture.predictions.forEach((prediction, j) => {
      expectClose(at.runs[j]?.logRateConstant.estimate, prediction.estimate, 9);
      expectClose(at.runs[j]?.logRateConstant.standardError, prediction.standardError, 9);
    });
  });

  it("weighs uneven runs by f and lets them vary by v as it says, the matrices written out", () => {
    const { floored } = fixture;
    const uneven = determined(runs, priors, { undetermined: 2, noiseVariances: floored.noiseVariances });
    expectClose(uneven.betweenRunVariance, floored.betweenRunVariance, 5);
    expectClose(uneven.weightVariance, floored.weightVariance, 11);
    expect(uneven.weightVariance).toBeGreaterThan(2 * uneven.betweenRunVariance);
    expectClose(uneven.runScale, floored.runScale, 9);
    floored.step.forEach((value, i) => {
      expectClose(uneven.step[i], value, 9);
    });
    floored.covariance.flat().forEach((value, i) => {
      expectClose(uneven.covariance.flat()[i], value, 6);
    });
  });

  it("has its pooled estimates, which are several times too sure", () => {
    const pooled = pooledInference(runs, priors);
    if (pooled.status !== "determined") throw new Error(pooled.message);
    fixture.pooled.step.forEach((value, i) => {
      expectClose(pooled.step[i], value, 9);
    });
    fixture.pooled.covariance.flat().forEach((value, i) => {
      expectClose(pooled.covariance.flat()[i], value, 9);
    });
    expect(Math.sqrt(result.covariance[0]?.[0] ?? 0)).toBeGreaterThan(
      2 * Math.sqrt(pooled.covariance[0]?.[0] ?? 1),
    );
  });

  it("has intervals with m − r degrees of freedom", () => {
    expect(result.degreesOfFreedom).toBe(5);
    const { estimate, interval, standardError } = result.runs[0]?.logRateConstant ?? {};
    // t for 95 % and 5 degrees of freedom, from any table.
    expect(((interval?.[1] ?? 0) - (estimate ?? 0)) / (standardError ?? 1)).toBeCloseTo(2.5706, 4);
  });
});

const linear: LinearStudy = {
  logConcentrations: [-1, -0.5, 0, 0, 0.5, 1, 0.3, -0.7],
  points: 40,
  shape: 0,
  scatter: 0.04,
  noise: 0.01,
  autocorrelation: 0,
  truth: [0.05, -0.03, 0],
};
const scale = { parameter: 2, deviation: 0, standardUncertainty: 0.01 };

describe("what cannot be known", () => {
  it("τ with no run to spare: a value, no interval, and a flag that says how many runs are wanted", () => {
    const result = determined(runs.slice(0, 2), priors, { undetermined: 2 });
    expect(result.degreesOfFreedom).toBe(0);
    expect(result.betweenRunVariance).toBe(0);
    expect(result.runs[0]?.logRateConstant.interval).toBeNull();
    expect(result.flags.map((flag) => flag.code)).toEqual(["no-run-freedom"]);
  });

  it("a parameter that nothing tells is named", () => {
    const blind = runs.map((run): RunInformation => {
      const gram = run.gram.slice();
      for (let i = 0; i < 3; i++) {
        gram[3 + i] = 0;
        gram[3 * i + 1] = 0;
      }
      return { ...run, gram, gradient: run.gradient.map((value, i) => (i === 1 ? 0 : value)) };
    });
    const result = randomRateInference(blind, priors, { undetermined: 2 });
    expect(result.status === "undetermined" ? result.message : "").toContain("parameter 2 of 3");
  });

  it("no scatter at all between runs is an answer: τ² = 0", () => {
    const draws = randomDraws(5);
    const study = { ...linear, scatter: 0, noise: 0.02 };
    const variances = Array.from({ length: 20 }, () =>
      determined(
        simulateLinearRuns(study, draws).map((run) => informationOf(run, 0)),
        [scale],
        { undetermined: 2 },
      ),
    ).map((one) => one.betweenRunVariance);
    // By symmetry about half of the studies without scatter give 0.
    expect(variances.filter((one) => one === 0).length).toBeGreaterThan(5);
  });

  it("computed traces without noise give the truth and no NaN", () => {
    const study = { ...linear, scatter: 0, noise: 0 };
    const result = determined(
      simulateLinearRuns(study, randomDraws(1)).map((run) => informationOf(run, 0)),
      [scale],
      { undetermined: 2 },
    );
    expect(result.step[0]).toBeCloseTo(linear.truth[0], 9);
    expect(result.step[1]).toBeCloseTo(linear.truth[1], 9);
    expect(result.covariance.flat().every(Number.isFinite)).toBe(true);
  });

  const unusable = runs.map((run) => ({ ...run, gradient: run.gradient.map(() => Number.NaN) }));
  const refused: readonly (readonly [string, readonly RunInformation[], PriorInformation, string, string])[] =
    [
      ["no run", [], fixture.prior, "no-runs", "at least one run"],
      ["a derivative of NaN", unusable, fixture.prior, "bad-information", "R1"],
      [
        "a prior without width",
        runs,
        { ...fixture.prior, standardUncertainty: 0 },
        "bad-information",
        "above 0",
      ],
    ];
  it.each(refused)("%s is refused in a sentence", (_, given, stated, status, words) => {
    const result = randomRateInference(given, [stated], { undetermined: 2 });
    expect(result.status).toBe(status);
    expect(result.status === "determined" ? "" : result.message).toContain(words);
  });
});

describe("coverage of 95 % intervals, fixed seed", () => {
  const REPLICATES = 400;
  // 0.5 % point of a binomial of 400 at 92.5 % (computed with SciPy 1.17).
  const LEAST = 356;

  function coverage(study: LinearStudy, seed: number) {
    const draws = randomDraws(seed);
    const covered = { logRate: 0, order: 0, pooled: 0, orderByVariance: 0 };
    for (let replicate = 0; replicate < REPLICATES; replicate++) {
      const given = simulateLinearRuns(study, draws).map((run) => informationOf(run, study.autocorrelation));
      // The stated scale errs by its own uncertainty.
      const stated = [{ ...scale, deviation: scale.standardUncertainty * draws.normal() }];
      // ln k and the order.
      const options = { undetermined: 2 };
      const random = determined(given, stated, options);
      const { betweenRunVariance } = random;
      const byVariance = determined(given, stated, { ...options, betweenRunVariance });
      const pooled = pooledInference(given, stated);
      const inside = (fit: typeof pooled, parameter: 0 | 1, factor: number) =>
        fit.status === "determined" &&
        Math.abs((fit.step[parameter] ?? 0) - study.truth[parameter]) <=
          factor * Math.sqrt(fit.covariance[parameter]?.[parameter] ?? 0);
      const factor = { 3: 3.1824463, 6: 2.4469119 }[random.degreesOfFreedom] ?? Number.NaN;
      if (inside(random, 0, factor)) covered.logRate += 1;
      if (inside(random, 1, factor)) covered.order += 1;
      if (inside(byVariance, 1, factor)) covered.orderByVariance += 1;
      if (inside(pooled, 0, 1.96)) covered.pooled += 1;
    }
    return covered;
  }

  const fiveRuns = { ...linear, logConcentrations: [-1, 0, 1, 0.4, -0.3] };
  const cells: readonly (readonly [string, LinearStudy, number])[] = [
    ["τ = 4 % against 1 % noise", linear, 11],
    ["AR(1) noise of 0.8, ρ known", { ...linear, autocorrelation: 0.8 }, 12],
    ["five runs", fiveRuns, 13],
    ["runs that tell the order by their shape as well", { ...linear, shape: 0.3 }, 14],
  ];
  it.each(cells)("%s: ln k and order covered, and not by the pooled fit", (_, study, seed) => {
    const covered = coverage(study, seed);
    expect(covered.logRate).toBeGreaterThanOrEqual(LEAST);
    expect(covered.order).toBeGreaterThanOrEqual(LEAST);
    expect(covered.pooled).toBeLessThan(0.9 * REPLICATES);
  });

  it("two of five runs ten times as noisy: covered, where weights by τ̂² alone leave the law to the others", () => {
    const covered = coverage({ ...fiveRuns, noise: 0.03, noiseFactors: [10, 1, 1, 10, 1] }, 15);
    expect(covered.logRate).toBeGreaterThanOrEqual(LEAST);
    expect(covered.order).toBeGreaterThanOrEqual(LEAST);
    expect(covered.orderByVariance).toBeLessThan(LEAST);
  });
});
