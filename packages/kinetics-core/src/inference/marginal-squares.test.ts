import { informationOf } from "kinetics-core/simulation";
import { expect, it } from "vitest";
import { marginalSquares, randomRateInference } from "./index";
import fixture from "./random-rate.fixture.json";

const runs = fixture.derivatives.map((derivatives, j) =>
  informationOf(
    { label: `R${j + 1}`, derivatives, residuals: fixture.residuals[j] ?? [] },
    fixture.autocorrelations[j] ?? 0,
  ),
);
const { noiseVariances, betweenRunVariance } = fixture;

it("adds up to the quadratic form of the inference once the step is taken", () => {
  const stepped = fixture.derivatives.map((derivatives, j) =>
    informationOf(
      {
        label: `R${j + 1}`,
        derivatives,
        residuals: (fixture.residuals[j] ?? []).map((residual, i) =>
          derivatives.reduce((rest, column, k) => rest - (fixture.step[k] ?? 0) * (column[i] ?? 0), residual),
        ),
      },
      fixture.autocorrelations[j] ?? 0,
    ),
  );
  const prior = {
    ...fixture.prior,
    deviation: fixture.prior.deviation - (fixture.step[fixture.prior.parameter] ?? 0),
  };
  const squares = marginalSquares(stepped, [prior], { noiseVariances, betweenRunVariance });
  if (squares.status !== "determined") throw new Error(squares.message);
  expect((squares.betweenRuns + squares.shape) / fixture.quadratic).toBeCloseTo(1, 9);
  const inference = randomRateInference(stepped, [prior], {
    undetermined: 2,
    noiseVariances,
    betweenRunVariance,
  });
  if (inference.status !== "determined") throw new Error(inference.message);
  inference.step.forEach((value) => {
    expect(Math.abs(value)).toBeLessThan(1e-9);
  });
});

it("gives each run's departure with its weight, and refuses what cannot be used", () => {
  const squares = marginalSquares(runs, [], { noiseVariances, betweenRunVariance });
  if (squares.status !== "determined") throw new Error(squares.message);
  const sum = squares.runs?.reduce((total, { residual, weight }) => total + weight * residual ** 2, 0);
  expect(sum).toBeCloseTo(squares.betweenRuns, 12);
  expect(marginalSquares(runs, [], { noiseVariances: [], betweenRunVariance }).status).toBe(
    "bad-information",
  );
});
