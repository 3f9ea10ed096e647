import { levenbergMarquardt } from "ml-levenberg-marquardt";
import type { NonlinearProblem, NonlinearSolution } from "./nonlinear-problem";
import { standardErrorsOf } from "./solution-uncertainty";

/** What an optimiser of other hands says about a solution. */
export type SecondOpinion =
  | (Arrival & { readonly status: "agrees" })
  /** Its sum of squares is smaller: the solution is not the least. */
  | (Arrival & { readonly status: "better" })
  | { readonly status: "not-arrived"; readonly message: string };

interface Arrival {
  /** Decimal digits in which all parameters agree, each in relation to its value or, if larger, its standard error. */
  readonly digits: number;
  readonly parameters: Float64Array;
  readonly residualSquares: number;
  readonly message: string;
}

export interface SecondOpinionOptions {
  /** Where the other optimiser starts; default one standard error from the solution in every parameter. */
  readonly start?: ArrayLike<number>;
  readonly shouldStop?: () => boolean;
}

/**
 * Solves the problem again by `ml-levenberg-marquardt`, an implementation that shares no line with ours: normal
 * equations by Cholesky, damping by a plain unit matrix, its own bookkeeping. Such damping and its absolute stopping
 * rule work where everything is near one, so parameters are divided by their size and residuals by their standard
 * deviation; its weights stay at 1 and its derivatives are the problem's own. It judges by sums of squares alone, which
 * settles half of the digits: agreement to 6 to 9 digits is agreement.
 *
 * @param solution of `problem`, converged.
 */
export function secondOpinion(
  problem: NonlinearProblem,
  solution: NonlinearSolution,
  options: SecondOpinionOptions = {},
): SecondOpinion {
  const peer = newPeer(problem, solution);
  const start = Float64Array.from(options.start ?? displaced(peer));
  if (start.length !== problem.parameters)
    return notArrived(
      `The start has ${start.length} values; the problem has ${problem.parameters} parameters.`,
    );
  if (problem.residuals < 2 || peer.adjustable.length === 0)
    return notArrived("A second optimiser needs two points and a parameter at least.");
  start.forEach((_, j) => {
    if (!peer.adjustable.includes(j)) start[j] = solution.parameters[j] ?? 0;
  });
  if (!Number.isFinite(squaresAt(peer, start)))
    return notArrived("The model has no finite value at the start of the second optimiser.");
  return settle(peer, start, options.shouldStop);
}

function settle(peer: Peer, start: Float64Array, shouldStop?: () => boolean): SecondOpinion {
  let theta = start;
  let level = 0;
  for (let round = 0; round < MOST_ROUNDS; round++) {
    if (shouldStop?.()) return notArrived("The second optimiser was stopped.");
    const next = nextRound(peer, theta, DAMPINGS[level] ?? 1);
    if (typeof next === "string") return notArrived(`The second optimiser failed: ${next}.`);
    const moved = largestMove(peer, theta, next);
    theta = next;
    if (moved > SETTLED) continue;
    const verdict = verdictOn(peer, theta);
    level++;
    if (verdict.status !== "not-arrived" || level === DAMPINGS.length) return verdict;
  }
  return notArrived("The second optimiser was still moving when its rounds were used up.");
}

const MOST_ROUNDS = 60;
const ITERATIONS_A_ROUND = 12;
/** The package goes on from a step that failed, so a first step too long gets lost: then the next one is tried. */
const DAMPINGS = [1e-3, 1, 1e3, 1e6];
/** Of a parameter's size. */
const SETTLED = 1e-10;
/** Sums of squares that differ by less than this part are the same minimum. */
const SAME_MINIMUM = 1e-6;
/** Digits of a double. */
const MOST_DIGITS = 15;

interface Peer {
  readonly problem: NonlinearProblem;
  readonly solution: NonlinearSolution;
  /**
   * Indices of the parameters that the solution does not hold at a bound. The others are held here too: the package
   * cuts a step off at a bound after it was shared among all parameters, and so settles beside the answer.
   */
  readonly adjustable: readonly number[];
  /** Size of each parameter. */
  readonly unit: Float64Array;
  /** What residuals are divided by. */
  readonly scatter: number;
  readonly residuals: Float64Array;
  readonly jacobian: readonly Float64Array[];
}

function newPeer(problem: NonlinearProblem, solution: NonlinearSolution): Peer {
  const { parameters: n, residuals: m } = problem;
  const errors = standardErrorsOf(solution);
  const jacobian = Array.from({ length: n }, () => new Float64Array(m));
  const residuals = new Float64Array(m);
  const unit = Float64Array.from(
    solution.parameters,
    (value, j) => Math.max(Math.abs(value), errors?.[j] ?? 0) || 1,
  );
  const adjustable = Array.from(unit.keys()).filter((j) => !solution.held[j]);
  problem.evaluate(solution.parameters, residuals, jacobian);
  const scatter = solution.residualStandardDeviation || scatterFromSlopes(jacobian, unit, adjustable);
  return { problem, solution, adjustable, unit, scatter, residuals, jacobian };
}

/** Without a scatter of the data: a hundredth of what the least effective parameter does to all points. */
function scatterFromSlopes(
  jacobian: readonly Float64Array[],
  unit: Float64Array,
  adjustable: readonly number[],
): number {
  const effects = adjustable.map(
    (j) => (unit[j] ?? 1) * Math.sqrt((jacobian[j] ?? unit).reduce((sum, value) => sum + value * value, 0)),
  );
  return Math.min(...effects.filter((effect) => effect > 0)) / 100 || 1;
}

function boundsOf({ problem }: Peer, j: number): readonly [number, number] {
  return problem.bounds?.[j] ?? [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
}

/** One standard error up or down in turn, a thousandth where there is none; within the bounds. */
function displaced(peer: Peer): Float64Array {
  const { solution, unit, adjustable } = peer;
  const errors = standardErrorsOf(solution);
  const start = Float64Array.from(solution.parameters);
  adjustable.forEach((j, k) => {
    const [low, high] = boundsOf(peer, j);
    const move = errors?.[j] || (unit[j] ?? 1) / 1000;
    start[j] = Math.min(Math.max((start[j] ?? 0) + (k % 2 === 0 ? move : -move), low), high);
  });
  return start;
}

function squaresAt({ problem, residuals, jacobian }: Peer, theta: Float64Array): number {
  if (!problem.evaluate(theta, residuals, jacobian)) return Number.NaN;
  return residuals.reduce((sum, residual) => sum + residual * residual, 0);
}

/** Some iterations of the package; what it threw as a sentence. */
function nextRound(peer: Peer, theta: Float64Array, damping: number): Float64Array | string {
  const { problem, adjustable, unit, scatter, residuals, jacobian } = peer;
  const places = Float64Array.from(residuals.keys());
  const full = (scaled: readonly number[]): Float64Array => {
    const next = Float64Array.from(theta);
    adjustable.forEach((j, k) => {
      next[j] = (scaled[k] ?? 0) * (unit[j] ?? 1);
    });
    return next;
  };
  const isDefined = (scaled: readonly number[]) => problem.evaluate(full(scaled), residuals, jacobian);
  try {
    const { parameterValues } = levenbergMarquardt(
      { x: places, y: new Float64Array(problem.residuals) },
      (scaled) => {
        const defined = isDefined(scaled);
        return (i) => (defined ? (residuals[i] ?? 0) / scatter : Number.NaN);
      },
      {
        initialValues: adjustable.map((j) => (theta[j] ?? 0) / (unit[j] ?? 1)),
        minValues: adjustable.map((j) => boundsOf(peer, j)[0] / (unit[j] ?? 1)),
        maxValues: adjustable.map((j) => boundsOf(peer, j)[1] / (unit[j] ?? 1)),
        damping,
        maxIterations: ITERATIONS_A_ROUND,
        // Absolute, and also what an improvement must exceed to be kept.
        errorTolerance: 0,
        jacobianFunction: (scaled) => {
          isDefined(scaled);
          return (i) => adjustable.map((j) => ((jacobian[j]?.[i] ?? 0) * (unit[j] ?? 1)) / scatter);
        },
      },
    );
    return full(parameterValues);
  } catch (error) {
    return error instanceof Error ? error.message : String(error);
  }
}

function largestMove({ adjustable, unit }: Peer, from: Float64Array, to: Float64Array): number {
  return Math.max(...adjustable.map((j) => Math.abs((to[j] ?? 0) - (from[j] ?? 0)) / (unit[j] ?? 1)));
}

function verdictOn(peer: Peer, parameters: Float64Array): SecondOpinion {
  const { solution, scatter } = peer;
  const residualSquares = squaresAt(peer, parameters);
  // Where the data are met exactly both sums are rounding; there the scale is that of the residuals.
  const tolerance = SAME_MINIMUM * Math.max(solution.residualSquares, scatter * scatter);
  if (!(residualSquares <= solution.residualSquares + tolerance))
    return notArrived("The second optimiser settled where the sum of squares is larger.");
  const apart = largestMove(peer, solution.parameters, parameters);
  const digits = Math.min(MOST_DIGITS, Math.max(0, -Math.log10(apart || 1e-16)));
  if (residualSquares < solution.residualSquares - tolerance)
    return {
      status: "better",
      digits,
      parameters,
      residualSquares,
      message:
        "A second optimiser found a smaller sum of squares: this fit is not the best one. Start elsewhere.",
    };
  const message = `Two optimisers agree to ${Math.floor(digits)} digits.`;
  return { status: "agrees", digits, parameters, residualSquares, message };
}

function notArrived(message: string): SecondOpinion {
  return { status: "not-arrived", message };
}
