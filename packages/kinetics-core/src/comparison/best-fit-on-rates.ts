import { fitNonlinear, type NonlinearSolution } from "kinetics-core/least-squares";
import type { RateEquation } from "kinetics-core/rate-equation";
import { EXACT_RELATIVE } from "./constants";
import { type CandidateRun, rateProblem } from "./rate-problem";

/** Multiples of a constant's start that are tried: its sum of squares may have a second minimum decades away. */
const STARTS_OF_A_CONSTANT = [1, 0.01, 100] as const;

export interface RateFit {
  readonly solution: NonlinearSolution;
  /** Σ w r², not below what rounding of a computed table leaves. */
  readonly runSquares: number;
}

/** The best of several starts, or a sentence why there is none. `from`: (ln k, θ) to begin with instead. */
export function bestFitOnRates(
  equation: RateEquation,
  runs: readonly CandidateRun[],
  from: ArrayLike<number> | null = null,
): RateFit | { readonly message: string } {
  const problem = rateProblem(equation, runs);
  const starts = from === null ? startsOf(equation, runs) : [Array.from(from)];
  let best: NonlinearSolution | null = null;
  let message = "";
  for (const start of starts) {
    const fit = fitNonlinear(problem, start);
    if (fit.status !== "converged") message = fit.message;
    else if (best === null || fit.residualSquares < best.residualSquares) best = fit;
  }
  if (best === null) return { message };
  return { solution: best, runSquares: Math.max(best.residualSquares, exactSquares(runs)) };
}

/** Σ w r² below which a table is exact and closer agreement means nothing. */
export function exactSquares(runs: readonly CandidateRun[]): number {
  return EXACT_RELATIVE ** 2 * runs.reduce((sum, run) => sum + run.weight, 0);
}

/** ln k of each start is the mean that its θ leaves. */
function startsOf(equation: RateEquation, runs: readonly CandidateRun[]): readonly (readonly number[])[] {
  const hasConstant = equation.parameters.some(({ kind }) => kind === "constant");
  const multiples = hasConstant ? STARTS_OF_A_CONSTANT : [1];
  const problem = rateProblem(equation, runs);
  const residuals = new Float64Array(runs.length);
  return multiples.map((multiple) => {
    const theta = equation.parameters.map(({ kind, start, bounds: [low, high] }) =>
      Math.min(Math.max(kind === "constant" ? start * multiple : start, low), high),
    );
    const hasValue = problem.evaluate(Float64Array.from([0, ...theta]), residuals, null);
    const weights = runs.reduce((sum, run) => sum + run.weight, 0);
    const level =
      runs.reduce((sum, run, j) => sum - Math.sqrt(run.weight) * (residuals[j] ?? 0), 0) / weights;
    return [hasValue ? level : 0, ...theta];
  });
}
