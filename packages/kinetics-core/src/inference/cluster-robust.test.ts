import { studentTFactor } from "kinetics-core/distributions";
import { randomDraws } from "kinetics-core/random";
import { informationOf, type LinearStudy, simulateLinearRuns } from "kinetics-core/simulation";
import { expect, it } from "vitest";
import { type ClusterRobust, clusterRobust, type RandomRateInference, randomRateInference } from "./index";
import fixture from "./random-rate.fixture.json";
import type { PriorInformation, RunInformation } from "./run-information";

const names = ["ln k", "n_A", "scale"];

function both(
  runs: readonly RunInformation[],
  priors: readonly PriorInformation[],
  held: { betweenRunVariance?: number } = {},
): { readonly model: RandomRateInference; readonly robust: ClusterRobust } {
  const model = randomRateInference(runs, priors, { undetermined: 2, ...held });
  if (model.status !== "determined") throw new Error(model.message);
  const robust = clusterRobust(runs, priors, model, names);
  if (robust.status !== "determined") throw new Error(robust.message);
  return { model, robust };
}

it("is CR2 with Bell-McCaffrey degrees of freedom of whitened rows written out (NumPy)", () => {
  const runs = fixture.derivatives.map((derivatives, j) =>
    informationOf(
      { label: `R${j + 1}`, derivatives, residuals: fixture.residuals[j] ?? [] },
      fixture.autocorrelations[j] ?? 0,
    ),
  );
  const { robust } = both(runs, [fixture.prior], { betweenRunVariance: fixture.betweenRunVariance });
  fixture.clusterRobust.covariance.flat().forEach((value, i) => {
    expect((robust.covariance.flat()[i] ?? 0) / value).toBeCloseTo(1, 7);
  });
  fixture.clusterRobust.degreesOfFreedom.forEach((value, i) => {
    // The last parameter rests on its prior; runs hardly move it, and its runs' part keeps fewer digits.
    expect((robust.parameters[i]?.degreesOfFreedom ?? 0) / value).toBeCloseTo(1, i < 2 ? 7 : 3);
  });
});

const study: LinearStudy = {
  logConcentrations: [-1, -0.5, 0, 0, 0.5, 1, 0.3, -0.7],
  points: 20,
  shape: 0,
  scatter: 0.04,
  noise: 0.01,
  autocorrelation: 0,
  truth: [0.05, -0.03, 0],
};

it("covers ln k and the order where the model holds, and contradicts the model in a quarter of clean studies of 8 runs, which is why it only notes", () => {
  const REPLICATES = 400;
  const draws = randomDraws(21);
  const covered = [0, 0];
  let flagged = 0;
  for (let replicate = 0; replicate < REPLICATES; replicate++) {
    const runs = simulateLinearRuns(study, draws).map((run) => informationOf(run, 0));
    const stated = { parameter: 2, deviation: 0.01 * draws.normal(), standardUncertainty: 0.01 };
    const { model, robust } = both(runs, [stated]);
    for (const i of [0, 1] as const) {
      const { standardError, degreesOfFreedom } = robust.parameters[i] ?? {};
      const half = (standardError ?? 0) * studentTFactor(0.95, degreesOfFreedom ?? 1);
      if (Math.abs((model.step[i] ?? 0) - study.truth[i]) <= half) covered[i] = (covered[i] ?? 0) + 1;
    }
    if (robust.flags.length > 0) flagged += 1;
  }
  // 0.5 % point of a binomial of 400 at 92.5 %: 356 (computed with SciPy 1.17).
  expect(Math.min(...covered)).toBeGreaterThanOrEqual(356);
  expect(flagged / REPLICATES).toBeLessThan(0.3);
});

it("names the parameter whose runs scatter unevenly: the outermost runs ten times as much", () => {
  let flagged = 0;
  for (let seed = 0; seed < 20; seed++) {
    const draws = randomDraws(100 + seed);
    const runs = simulateLinearRuns(
      { ...study, scatter: 0.005, logConcentrations: [-1, -1, -1, 0, 0, 0, 0, 0, 0, 0, 0, 0, 1, 1, 1] },
      draws,
    ).map((run, j) => {
      if (j > 2 && j < 12) return informationOf(run, 0);
      const departure = 0.3 * draws.normal();
      const residuals = run.residuals.map((value, i) => value + departure * (run.derivatives[0]?.[i] ?? 0));
      return informationOf({ ...run, residuals }, 0);
    });
    const { robust } = both(runs, [{ parameter: 2, deviation: 0, standardUncertainty: 0.01 }]);
    if (robust.flags.some((flag) => flag.message.includes("n_A"))) flagged += 1;
  }
  expect(flagged).toBeGreaterThan(5);
});

it("a run that alone determines a parameter has no residual to speak of: its part is left out, no NaN", () => {
  const runs = simulateLinearRuns(
    { ...study, logConcentrations: [0, 0, 0, 0, 1], shape: 0 },
    randomDraws(3),
  ).map((run) => informationOf(run, 0));
  const { robust } = both(runs, [{ parameter: 2, deviation: 0, standardUncertainty: 0.01 }]);
  expect(robust.covariance.flat().every(Number.isFinite)).toBe(true);
  expect(robust.parameters[0]?.degreesOfFreedom).toBeGreaterThan(1);
});
