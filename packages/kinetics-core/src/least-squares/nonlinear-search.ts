import { type Linearisation, linearisationSize, newLinearisation, type Take } from "./linearisation";
import type { NonlinearOptions, NonlinearProblem } from "./nonlinear-problem";

/** A point of the search with everything that the problem says there. */
export interface SearchPoint {
  readonly theta: Float64Array;
  readonly residuals: Float64Array;
  readonly jacobian: readonly Float64Array[];
  /** Σ r². */
  squares: number;
}

/** The state of one fit: two points that change places, one linearisation, and scratch of their size. */
export interface NonlinearSearch {
  readonly problem: NonlinearProblem;
  readonly options: NonlinearOptions;
  readonly low: Float64Array;
  readonly high: Float64Array;
  /** Parameters that bounds do not fix. */
  readonly adjustable: number;
  readonly degreesOfFreedom: number;
  current: SearchPoint;
  trial: SearchPoint;
  readonly linear: Linearisation;
  /** Scaled step p = D δ. */
  readonly step: Float64Array;
  /** The part of a step that is solved anew after others met a bound. */
  readonly rest: Float64Array;
  readonly free: Uint8Array;
  readonly projected: Float64Array;
  steps: number;
  evaluations: number;
}

const DEFAULT_EVALUATIONS = 2000;

export function newSearch(
  problem: NonlinearProblem,
  start: ArrayLike<number>,
  options: NonlinearOptions,
): NonlinearSearch {
  const { residuals: m, parameters: n } = problem;
  const store = new Float64Array(linearisationSize(m, n) + 2 * pointSize(m, n) + 5 * n);
  let taken = 0;
  const take: Take = (length) => {
    taken += length;
    return store.subarray(taken - length, taken);
  };
  const [low, high] = [take(n), take(n)];
  for (let j = 0; j < n; j++) {
    low[j] = problem.bounds?.[j]?.[0] ?? Number.NEGATIVE_INFINITY;
    high[j] = problem.bounds?.[j]?.[1] ?? Number.POSITIVE_INFINITY;
  }
  const current = newPoint(m, n, take);
  current.theta.set(start);
  const adjustable = adjustableIn(problem);
  return {
    problem,
    options,
    low,
    high,
    adjustable,
    degreesOfFreedom: m - adjustable,
    current,
    trial: newPoint(m, n, take),
    linear: newLinearisation(m, n, take),
    step: take(n),
    rest: take(n),
    free: new Uint8Array(n),
    projected: take(n),
    steps: 0,
    evaluations: 0,
  };
}

function pointSize(points: number, parameters: number): number {
  return points * (parameters + 1) + parameters;
}

function newPoint(points: number, parameters: number, take: Take): SearchPoint {
  const jacobian: Float64Array[] = [];
  for (let j = 0; j < parameters; j++) jacobian.push(take(points));
  return { theta: take(parameters), residuals: take(points), jacobian, squares: Number.POSITIVE_INFINITY };
}

/** Parameters whose bounds leave them a choice. */
export function adjustableIn({ parameters, bounds }: NonlinearProblem): number {
  let adjustable = parameters;
  for (const [low, high] of bounds ?? []) if (low === high) adjustable--;
  return adjustable;
}

/** Evaluates the model at a point; false where it, or its sum of squares, is not finite. */
export function evaluateAt(search: NonlinearSearch, point: SearchPoint): boolean {
  search.evaluations++;
  if (!search.problem.evaluate(point.theta, point.residuals, point.jacobian)) return false;
  let squares = 0;
  for (let i = 0; i < point.residuals.length; i++) squares += (point.residuals[i] ?? Number.NaN) ** 2;
  if (!Number.isFinite(squares)) return false;
  for (const column of point.jacobian) {
    let size = 0;
    for (let i = 0; i < column.length; i++) size += (column[i] ?? Number.NaN) ** 2;
    if (!Number.isFinite(size)) return false;
  }
  point.squares = squares;
  return true;
}

export function outOfEvaluations({ evaluations, options }: NonlinearSearch): boolean {
  return evaluations >= (options.mostEvaluations ?? DEFAULT_EVALUATIONS);
}

/** The trial becomes the current point. */
export function moveOn(search: NonlinearSearch): void {
  const { current } = search;
  search.current = search.trial;
  search.trial = current;
  search.steps++;
}

/** Variance of one residual as the current point sees it; of their mean square where no degree of freedom is left. */
export function residualVariance({ current, degreesOfFreedom }: NonlinearSearch): number {
  return current.squares / Math.max(degreesOfFreedom, 1);
}

/**
 * Whether the residuals are no more than the rounding of the model: the sum of squares cannot be judged below some
 * (ε Σ_j |θ_j ∂r_i/∂θ_j|)², the part of a model value that its parameters make.
 */
export function isWithinRounding({ current }: NonlinearSearch): boolean {
  const { theta, jacobian, squares } = current;
  let size = 0;
  for (let i = 0; i < current.residuals.length; i++) {
    let value = 0;
    for (let j = 0; j < theta.length; j++) value += Math.abs((theta[j] ?? 0) * (jacobian[j]?.[i] ?? 0));
    size += value * value;
  }
  return squares <= (ROUNDING_OF_A_MODEL * Number.EPSILON) ** 2 * size;
}

const ROUNDING_OF_A_MODEL = 16;
