import { fitNonlinear } from "kinetics-core/least-squares";
import type { RateEquation } from "kinetics-core/rate-equation";
import { EXACT_RELATIVE } from "./constants";
import { type CandidateRun, type RateProblem, rateProblem } from "./rate-problem";

/** Multiples of a constant's start that are tried: its sum of squares may have a second minimum decades away. */
const STARTS_OF_A_CONSTANT = [1, 0.01, 100] as const;

export interface RateFit {
  readonly logConstant: number;
  readonly theta: Float64Array;
  /** √w (ln v̂ − ln v). */
  readonly residuals: Float64Array;
  readonly residualSquares: number;
  /** Σ w r², not below what rounding of a computed table leaves. */
  readonly runSquares: number;
  /** (JᵀJ)⁻¹ of (ln k, θ); null where the runs leave a combination open. */
  readonly unscaledCovariance: readonly (readonly number[])[] | null;
  /** Whether each of θ rests on a bound. */
  readonly held: readonly boolean[];
}

export type RateFitResult = RateFit | { readonly message: string };

/** The best of several starts, or a sentence why there is none. `from`: θ to begin with instead. */
export function bestFitOnRates(
  equation: RateEquation,
  runs: readonly CandidateRun[],
  from: ArrayLike<number> | null = null,
): RateFitResult {
  const p = equation.parameters.length;
  if (runs.length <= p)
    return {
      message: `${runs.length} runs cannot carry the ${p + 1} parameters of ${equation.law}. Add runs, or hold parameters.`,
    };
  const problem = rateProblem(equation, runs);
  let best: RateFitResult = { message: "" };
  for (const start of from === null ? startsOf(equation) : [from]) {
    const fit = fitFrom(problem, start, runs);
    if ("message" in best && ("residuals" in fit || best.message === "")) best = fit;
    else if ("residuals" in fit && "residuals" in best && fit.residualSquares < best.residualSquares)
      best = fit;
  }
  return best;
}

/** Σ w r² below which a table is exact and closer agreement means nothing. */
export function exactSquares(runs: readonly CandidateRun[]): number {
  return EXACT_RELATIVE ** 2 * runs.reduce((sum, run) => sum + run.weight, 0);
}

function startsOf(equation: RateEquation): readonly (readonly number[])[] {
  const hasConstant = equation.parameters.some(({ kind }) => kind === "constant");
  return (hasConstant ? STARTS_OF_A_CONSTANT : [1]).map((multiple) =>
    equation.parameters.map(({ kind, start, bounds: [low, high] }) =>
      Math.min(Math.max(kind === "constant" ? start * multiple : start, low), high),
    ),
  );
}

function fitFrom(
  problem: RateProblem,
  start: ArrayLike<number>,
  runs: readonly CandidateRun[],
): RateFitResult {
  if (problem.parameters > 0 && isFlat(problem, start))
    return {
      message:
        "The runs do not differ in what its parameters depend on, so nothing can be fitted. Vary a concentration, or hold the parameters.",
    };
  const fit = problem.parameters === 0 ? withoutParameters(problem) : fitNonlinear(problem, start);
  if (fit.status !== "converged") return { message: fit.message };
  const level = problem.level(fit.parameters);
  if (level === null) return { message: "The law has no value where its fit ended." };
  const weight = runs.reduce((sum, run) => sum + run.weight, 0);
  return {
    logConstant: level.logConstant,
    theta: fit.parameters,
    residuals: fit.residuals,
    residualSquares: fit.residualSquares,
    runSquares: Math.max(fit.residualSquares, exactSquares(runs)),
    unscaledCovariance: withLogConstant(fit.unscaledCovariance, level.slopes, weight),
    held: fit.held,
  };
}

/** No parameter moves any run, as where all recipes are one. */
function isFlat(problem: RateProblem, start: ArrayLike<number>): boolean {
  const columns = Array.from({ length: problem.parameters }, () => new Float64Array(problem.residuals));
  const hasValue = problem.evaluate(Float64Array.from(start), new Float64Array(problem.residuals), columns);
  return hasValue && columns.every((column) => column.every((value) => value === 0));
}

/** Nothing to search for: ln k is a mean. */
function withoutParameters(problem: RateProblem) {
  const residuals = new Float64Array(problem.residuals);
  const none = new Float64Array(0);
  if (!problem.evaluate(none, residuals, null))
    return { status: "no-value-at-start", message: "The law gives some run no rate." } as const;
  return {
    status: "converged",
    parameters: none,
    residuals,
    residualSquares: residuals.reduce((sum, value) => sum + value ** 2, 0),
    unscaledCovariance: [],
    held: [],
  } as const;
}

/** ln k = mean(ln v − ln f): its variance is 1/Σw + gᵀC g, its covariance with θ −C g, g the mean of ∂ln f/∂θ. */
function withLogConstant(
  covariance: readonly (readonly number[])[] | null,
  slopes: Float64Array,
  weight: number,
): readonly (readonly number[])[] | null {
  if (covariance === null) return null;
  const shared = covariance.map((row) => -row.reduce((sum, value, k) => sum + value * (slopes[k] ?? 0), 0));
  const own = shared.reduce((sum, value, k) => sum - value * (slopes[k] ?? 0), 1 / weight);
  return [[own, ...shared], ...covariance.map((row, k) => [shared[k] ?? 0, ...row])];
}
