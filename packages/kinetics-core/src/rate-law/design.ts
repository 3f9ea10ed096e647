import {
  columnOf,
  leastSquares,
  type Matrix,
  matrixFromColumns,
  rankOf,
  singularValues,
  zeroMatrix,
} from "kinetics-core/linear-algebra";
import { mean, sum, sumOfSquares } from "kinetics-core/summation";
import { reducedRows } from "./reduced-rows";
import type { UsableRun } from "./usable-runs";

/**
 * The design of a set of runs: what their concentrations alone can tell, whatever the rates.
 *
 * With μ the mean of ln c over the runs, the law is ln v = η + Σ n_i (ln c_i − μ_i) + (held orders), η = ln v at the
 * centre, ln k = η − Σ n_i μ_i. Where the centred columns are linearly dependent, the orders are written
 * n = B γ with B an orthonormal basis of what the runs determine; a linear functional of the orders is determined
 * exactly where it is orthogonal to every null direction.
 */
export interface Design {
  /** Index of every free species. */
  readonly free: readonly number[];
  /** Held order of each species, null where free. */
  readonly held: readonly (number | null)[];
  /** Mean of ln c of each species; 0 where a logarithm does not exist (its order is then held at 0). */
  readonly means: readonly number[];
  /** m by 1 + rank: a column of ones, then the centred log-concentrations times B. */
  readonly terms: Matrix;
  /** free by rank. */
  readonly basis: Matrix;
  readonly rank: number;
  /** Null directions over the free species in reduced form, each led by a 1. */
  readonly nullDirections: readonly (readonly number[])[];
}

/**
 * Root-mean-square variation of ln c below which a direction counts as not varied at all: far below what a pipette
 * does, far above rounding.
 */
const NO_VARIATION = 1e-7;

export function designOf(runs: readonly UsableRun[], held: readonly (number | null)[]): Design {
  const means = held.map((_, i) => mean(logConcentrations(runs, i)));
  const free = held.flatMap((order, i) => (order === null ? [i] : []));
  const centred = centredLogarithms(runs, free);
  const scale = Math.sqrt(Math.max(runs.length, 1));
  const decomposition = singularValues(centred);
  const rank = rankOf(decomposition, NO_VARIATION * scale);
  const full = rank === free.length;
  const basis = full ? identity(rank) : leading(decomposition.v, rank);
  const terms = zeroMatrix(runs.length, 1 + rank);
  columnOf(terms, 0).fill(1);
  for (let j = 0; j < rank; j++) {
    // In a deficient design A V is the centred matrix times the basis already.
    columnOf(terms, 1 + j).set(columnOf(full ? centred : decomposition.scaled, j));
  }
  const nullVectors = Array.from({ length: free.length - rank }, (_, j) =>
    Array.from(columnOf(decomposition.v, rank + j)),
  );
  return { free, held, means, terms, basis, rank, nullDirections: reducedRows(nullVectors) };
}

/** ln c of one species, run by run; 0 where c is not above zero. */
export function logConcentrations(runs: readonly UsableRun[], species: number): readonly number[] {
  return runs.map((run) => {
    const concentration = run.concentrations[species] ?? 0;
    return concentration > 0 ? Math.log(concentration) : 0;
  });
}

/** m by (number of species asked for), each column about its mean. */
export function centredLogarithms(runs: readonly UsableRun[], species: readonly number[]): Matrix {
  return matrixFromColumns(
    species.map((i) => {
      const values = logConcentrations(runs, i);
      const centre = mean(values);
      return values.map((value) => value - centre);
    }),
    runs.length,
  );
}

/** True where Σ weight·order over the free species is the same for every law that fits the runs equally well. */
export function isDetermined(design: Design, weights: readonly number[]): boolean {
  const size = Math.sqrt(weights.reduce((sum, weight) => sum + weight ** 2, 0));
  return design.nullDirections.every((direction) => {
    const length = Math.sqrt(direction.reduce((sum, value) => sum + value ** 2, 0));
    const overlap = direction.reduce((sum, value, i) => sum + value * (weights[i] ?? 0), 0);
    return Math.abs(overlap) <= 1e-7 * size * length;
  });
}

/**
 * Residual of one column on the others and how it was made up: column ≈ Σ coefficient · other. Works where the others
 * are themselves dependent, by way of their singular vectors.
 */
export function regressOnOthers(
  columns: Matrix,
  which: number,
): { readonly residual: Float64Array; readonly coefficients: readonly number[] } {
  const others = Array.from({ length: columns.columns }, (_, j) => j).filter((j) => j !== which);
  const target = columnOf(columns, which);
  const matrix = matrixFromColumns(
    others.map((j) => columnOf(columns, j)),
    columns.rows,
  );
  const decomposition = singularValues(matrix);
  const rank = rankOf(decomposition, NO_VARIATION * Math.sqrt(Math.max(columns.rows, 1)));
  if (rank === 0) return { residual: target.slice(), coefficients: others.map(() => 0) };
  const { coefficients, residuals } = leastSquares(leading(decomposition.scaled, rank), target);
  const back = others.map((_, i) =>
    sum(
      Array.from(
        { length: rank },
        (_unused, j) => (columnOf(decomposition.v, j)[i] ?? 0) * (coefficients[j] ?? 0),
      ),
    ),
  );
  return { residual: residuals, coefficients: back };
}

export function rootMeanSquare(values: ArrayLike<number>): number {
  return values.length === 0 ? 0 : Math.sqrt(sumOfSquares(values) / values.length);
}

function identity(n: number): Matrix {
  const matrix = zeroMatrix(n, n);
  for (let i = 0; i < n; i++) matrix.values[i * n + i] = 1;
  return matrix;
}

function leading(matrix: Matrix, columns: number): Matrix {
  return { rows: matrix.rows, columns, values: matrix.values.slice(0, matrix.rows * columns) };
}
