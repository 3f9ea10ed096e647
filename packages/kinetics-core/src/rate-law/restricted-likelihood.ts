import { leastDeviance } from "kinetics-core/inference";
import {
  correlatedLeastSquares,
  dot,
  type Matrix,
  type RestrictedFit,
  restrictedFit,
} from "kinetics-core/linear-algebra";
import { sum } from "kinetics-core/summation";

/**
 * Variance between runs (τ²) and between blocks by restricted maximum likelihood: the least of
 *     ln|V| + ln|XᵀV⁻¹X| + rᵀV⁻¹r,   V = diag(u² + τ²) + Σ_shared + σ_b² Z Zᵀ,   τ², σ_b² ≥ 0.
 * Its derivative by τ² is Σ P_jj − |P y|², by σ_b² it is Σ_b zᵀP z − (zᵀP y)² (Searle, Casella and McCulloch 1992,
 * 6.6). The least is located on a logarithmic grid, so that a second minimum is not missed, and refined on the
 * derivative's root.
 */
export interface VarianceComponents {
  readonly betweenRuns: number;
  readonly betweenBlocks: number;
}

export interface VarianceProblem {
  readonly terms: Matrix;
  readonly response: ArrayLike<number>;
  /** u² of each run, ≥ 0. */
  readonly stated: readonly number[];
  readonly shared: readonly ArrayLike<number>[];
  /** Runs of each block; empty where blocks are no part of the model. */
  readonly blocks: readonly (readonly number[])[];
}

/** Needs at least one degree of freedom (more runs than terms). */
export function varianceComponents(problem: VarianceProblem): VarianceComponents {
  const { terms, response, stated } = problem;
  const ones = stated.map(() => 1);
  const plain = correlatedLeastSquares(terms, response, ones, []);
  const scatter = plain.weightedSumOfSquares / (terms.rows - terms.columns);
  if (problem.shared.length === 0 && problem.blocks.length === 0) {
    const first = stated[0] ?? 0;
    // With equal u² the answer is in closed form: what the residual variance exceeds u² by.
    if (stated.every((value) => Math.abs(value - first) <= 1e-12 * first))
      return { betweenRuns: Math.max(0, scatter - first), betweenBlocks: 0 };
  }
  if (!(scatter > 0)) return { betweenRuns: 0, betweenBlocks: 0 };

  // P takes out the terms, so residuals serve as well as the response and leave less to rounding.
  const centred = { ...problem, response: plain.residuals };
  const fitAt = (betweenRuns: number, betweenBlocks: number) =>
    fitWithComponents(centred, betweenRuns, betweenBlocks);
  const runsGiven = (betweenBlocks: number) =>
    leastDeviance(
      (variance) => {
        const fit = fitAt(variance, betweenBlocks);
        return { deviance: fit.restrictedDeviance, slope: slopeByRuns(fit) };
      },
      scatter,
      stated.every((value) => value > 0),
    );
  if (problem.blocks.length === 0) return { betweenRuns: runsGiven(0), betweenBlocks: 0 };
  // At the best τ² for each σ_b² the slope along σ_b² alone is that of the profile.
  const betweenBlocks = leastDeviance(
    (variance) => {
      const fit = fitAt(runsGiven(variance), variance);
      return { deviance: fit.restrictedDeviance, slope: slopeByBlocks(fit, problem.blocks, terms.rows) };
    },
    scatter,
    true,
  );
  return { betweenRuns: runsGiven(betweenBlocks), betweenBlocks };
}

/** Blocks of one run differ from scatter by nothing but their variance on the diagonal. */
export function blockLoadings(blocks: readonly (readonly number[])[], rows: number): readonly Float64Array[] {
  return blocks.map((members) => {
    const column = new Float64Array(rows);
    for (const j of members) column[j] = 1;
    return column;
  });
}

function fitWithComponents(
  { terms, response, stated, shared, blocks }: VarianceProblem,
  betweenRuns: number,
  betweenBlocks: number,
): RestrictedFit {
  const variances = stated.map((value) => value + betweenRuns);
  const deviation = Math.sqrt(betweenBlocks);
  const columns: ArrayLike<number>[] = [...shared];
  if (betweenBlocks > 0) {
    for (const members of blocks) {
      const only = members[0];
      if (members.length === 1 && only !== undefined)
        variances[only] = (variances[only] ?? 0) + betweenBlocks;
      else {
        const column = new Float64Array(terms.rows);
        for (const j of members) column[j] = deviation;
        columns.push(column);
      }
    }
  }
  return restrictedFit(terms, response, variances, columns);
}

function slopeByRuns(fit: RestrictedFit): number {
  return sum(fit.projectionDiagonal) - dot(fit.projected, fit.projected);
}

function slopeByBlocks(fit: RestrictedFit, blocks: readonly (readonly number[])[], rows: number): number {
  return sum(blockLoadings(blocks, rows).map((z) => dot(z, fit.project(z)) - dot(z, fit.projected) ** 2));
}
