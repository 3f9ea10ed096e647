import { describe, expect, it } from "vitest";
import {
  correlatedLeastSquares,
  entry,
  leastSquares,
  type Matrix,
  matrixFromColumns,
  restrictedFit,
} from "./index";

/** The textbook formulas with V written out and inverted by Gauss-Jordan: an independent way to the same numbers. */
function inverseAndLogDeterminant(a: readonly (readonly number[])[]): {
  inverse: number[][];
  logDeterminant: number;
} {
  const n = a.length;
  const work = a.map((row, i) => [...row, ...row.map((_, j) => (i === j ? 1 : 0))]);
  let logDeterminant = 0;
  for (let k = 0; k < n; k++) {
    const pivot = work[k] ?? [];
    const lead = pivot[k] ?? 0;
    logDeterminant += Math.log(lead);
    work[k] = pivot.map((value) => value / lead);
    for (let i = 0; i < n; i++) {
      if (i === k) continue;
      const factor = work[i]?.[k] ?? 0;
      work[i] = (work[i] ?? []).map((value, j) => value - factor * (work[k]?.[j] ?? 0));
    }
  }
  return { inverse: work.map((row) => row.slice(n)), logDeterminant };
}

const product = (a: readonly (readonly number[])[], b: readonly (readonly number[])[]) =>
  a.map((row) =>
    (b[0] ?? []).map((_, j) => row.reduce((sum, value, k) => sum + value * (b[k]?.[j] ?? 0), 0)),
  );
const transpose = (a: readonly (readonly number[])[]) =>
  (a[0] ?? []).map((_, j) => a.map((row) => row[j] ?? 0));
const rowsOf = (matrix: Matrix) =>
  Array.from({ length: matrix.rows }, (_, i) =>
    Array.from({ length: matrix.columns }, (_u, j) => entry(matrix, i, j)),
  );

const x = matrixFromColumns([
  [1, 1, 1, 1, 1, 1, 1],
  [-1.2, -0.5, 0.1, 0.4, 0.9, 1.3, -0.8],
  [0.3, 0.3, -0.6, 0.8, -0.2, 0.5, -1.1],
]);
const y = [0.1, 0.4, 1.2, 0.9, 2.2, 2.1, -0.3];
const variances = [0.04, 0.01, 0.09, 0.02, 0.05, 0.03, 0.01];
const shared = [
  [0.2, 0.2, 0.2, 0, 0, 0, 0],
  [0, 0, 0.1, 0.1, 0.3, 0, -0.2],
];

describe("generalised least squares with shared errors", () => {
  const v = variances.map((own, i) =>
    variances.map(
      (_, j) => (i === j ? own : 0) + shared.reduce((sum, u) => sum + (u[i] ?? 0) * (u[j] ?? 0), 0),
    ),
  );
  const { inverse, logDeterminant } = inverseAndLogDeterminant(v);
  const design = rowsOf(x);
  const information = product(product(transpose(design), inverse), design);
  const { inverse: covariance, logDeterminant: logInformation } = inverseAndLogDeterminant(information);
  const gain = product(product(covariance, transpose(design)), inverse);
  const beta = product(
    gain,
    y.map((value) => [value]),
  ).map((row) => row[0] ?? 0);
  const residuals = y.map(
    (value, i) => value - (design[i] ?? []).reduce((sum, term, k) => sum + term * (beta[k] ?? 0), 0),
  );
  // P = V⁻¹ − V⁻¹ X · gain.
  const explained = product(product(inverse, design), gain);
  const projection = inverse.map((row, i) => row.map((value, j) => value - (explained[i]?.[j] ?? 0)));
  const projected = product(
    projection,
    y.map((value) => [value]),
  ).map((row) => row[0] ?? 0);
  const quadratic = residuals.reduce(
    (sum, r, i) => sum + r * (inverse[i] ?? []).reduce((inner, w, j) => inner + w * (residuals[j] ?? 0), 0),
    0,
  );
  const fit = correlatedLeastSquares(x, y, variances, shared);

  it("gives the estimates and covariance of the brute-force formula", () => {
    beta.forEach((value, i) => {
      expect(fit.coefficients[i]).toBeCloseTo(value, 12);
    });
    covariance.forEach((row, i) => {
      row.forEach((value, j) => {
        expect(entry(fit.inverseInformation, i, j)).toBeCloseTo(value, 12);
      });
    });
    gain.forEach((row, i) => {
      row.forEach((value, j) => {
        expect(entry(fit.gain, i, j)).toBeCloseTo(value, 12);
      });
    });
  });

  it("gives the residual form, the restricted deviance and the projection of the brute-force formula", () => {
    expect(fit.weightedSumOfSquares).toBeCloseTo(quadratic, 11);
    expect(fit.restrictedDeviance).toBeCloseTo(logDeterminant + logInformation + quadratic, 11);
    projection.forEach((row, i) => {
      expect(fit.projectionDiagonal[i]).toBeCloseTo(row[i] ?? Number.NaN, 10);
      expect(fit.projected[i]).toBeCloseTo(projected[i] ?? Number.NaN, 10);
    });
    const lean = restrictedFit(x, y, variances, shared);
    expect(lean.restrictedDeviance).toBeCloseTo(fit.restrictedDeviance, 10);
  });

  it("leaving a row out by its projection is leaving it out in earnest", () => {
    const kept = [0, 1, 2, 4, 5, 6];
    const without = correlatedLeastSquares(
      matrixFromColumns([0, 1, 2].map((k) => kept.map((i) => entry(x, i, k)))),
      kept.map((i) => y[i] ?? 0),
      kept.map((i) => variances[i] ?? 0),
      shared.map((u) => kept.map((i) => u[i] ?? 0)),
    );
    const move = (fit.projected[3] ?? 0) / (fit.projectionDiagonal[3] ?? 1);
    for (const k of [0, 1, 2])
      expect((fit.coefficients[k] ?? 0) - entry(fit.gain, k, 3) * move).toBeCloseTo(
        without.coefficients[k] ?? 0,
        12,
      );
  });
});

it("with equal variances and nothing shared it is ordinary least squares", () => {
  const plain = leastSquares(x, y);
  const fit = correlatedLeastSquares(
    x,
    y,
    variances.map(() => 0.25),
    [],
  );
  plain.coefficients.forEach((value, i) => {
    expect(fit.coefficients[i]).toBeCloseTo(value, 13);
    expect(fit.leverage[i]).toBeCloseTo(plain.leverage[i] ?? Number.NaN, 13);
  });
});

it("refuses a variance of zero: a run known without error would carry the law alone", () => {
  expect(() => correlatedLeastSquares(x, y, [0, ...variances.slice(1)], [])).toThrow(RangeError);
});
