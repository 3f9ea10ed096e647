import { dampingWithin, fillStep } from "./damped-step";
import { decompose } from "./linearisation";
import type { NonlinearSearch } from "./nonlinear-search";

/** What a proposed step is expected to do; the step itself is in `search.step`, its end in `search.trial.theta`. */
export interface Proposal {
  /** Fall of the sum of squares by the linear model. */
  readonly promise: number;
  /** |p|. */
  readonly length: number;
  readonly damping: number;
  /** Whether a bound cut the step short. */
  readonly crossed: boolean;
}

/**
 * Marks the parameters that may move: not those that their bounds fix, nor those that rest on a bound and would be
 * pushed outwards by the gradient D⁻¹Jᵀr = Rᵀ(Qᵀr). Decomposes the linear problem for them.
 */
export function releaseFree(search: NonlinearSearch): void {
  const { linear, low, high, current, free } = search;
  const { parameters: n, triangle, projected } = linear;
  for (let j = 0; j < n; j++) {
    const value = current.theta[j] ?? 0;
    const least = low[j] ?? 0;
    const most = high[j] ?? 0;
    free[j] = least < most ? 1 : 0;
    if (value > least && value < most) continue;
    let gradient = 0;
    for (let i = 0; i <= j; i++) gradient += (triangle[j * n + i] ?? 0) * (projected[i] ?? 0);
    if ((value <= least && gradient > 0) || (value >= most && gradient < 0)) free[j] = 0;
  }
  decompose(linear, free, projected);
}

/**
 * The damped step within the trust radius and the bounds. A parameter that would cross a bound is set on it and held
 * for this step, and the others are solved anew for what is left of the residual: |R p + Qᵀr| with its part fixed.
 * Needs the decomposition of `releaseFree`; where a bound was met it leaves another one, which `crossed` tells.
 */
export function proposeStep(search: NonlinearSearch, radius: number): Proposal {
  const { linear, step, free, projected, trial, current } = search;
  const damping = dampingWithin(linear, radius);
  fillStep(linear, linear.slopes, damping, step);
  trial.theta.set(current.theta);
  projected.set(linear.projected);
  let crossed = false;
  while (holdCrossing(search)) {
    crossed = true;
    decompose(linear, free, projected);
    fillStep(linear, linear.slopes, dampingWithin(linear, radius), search.rest);
    for (let j = 0; j < step.length; j++) if (free[j]) step[j] = search.rest[j] ?? 0;
  }
  let squares = 0;
  for (let j = 0; j < step.length; j++) {
    if (free[j]) trial.theta[j] = endOf(search, j);
    squares += (step[j] ?? 0) ** 2;
  }
  return { promise: promiseOf(search), length: Math.sqrt(squares), damping, crossed };
}

function endOf({ current, step, linear }: NonlinearSearch, j: number): number {
  return (current.theta[j] ?? 0) + (step[j] ?? 0) / (linear.scale[j] ?? 1);
}

/** Part of a value that its own step may leave by rounding. */
const ROUNDING = 8 * Number.EPSILON;

/**
 * Holds every free parameter whose step ends outside at its bound; false where none does. A step as long as the way to
 * the bound may end next to it by rounding, where no further step would be worth its name: it ends on it.
 */
function holdCrossing(search: NonlinearSearch): boolean {
  const { linear, low, high, current, step, free, projected, trial } = search;
  const { parameters: n, triangle, scale } = linear;
  let found = false;
  for (let j = 0; j < n; j++) {
    if (!free[j]) continue;
    const end = endOf(search, j);
    const slack = ROUNDING * Math.abs(current.theta[j] ?? 0);
    const downwards = (step[j] ?? 0) < 0;
    const bound = downwards ? low[j] : high[j];
    if (bound === undefined || (downwards ? end > bound + slack : end < bound - slack)) continue;
    found = true;
    free[j] = 0;
    const move = (bound - (current.theta[j] ?? 0)) * (scale[j] ?? 1);
    step[j] = move;
    trial.theta[j] = bound;
    for (let i = 0; i <= j; i++) projected[i] = (projected[i] ?? 0) + (triangle[j * n + i] ?? 0) * move;
  }
  return found;
}

/** |Qᵀr|² − |R p + Qᵀr|² = −(R p)·(2 Qᵀr + R p), without the difference of two large squares. */
function promiseOf({ linear, step }: NonlinearSearch): number {
  const { parameters: n, triangle, projected } = linear;
  let promise = 0;
  for (let i = 0; i < n; i++) {
    let moved = 0;
    for (let j = i; j < n; j++) moved += (triangle[j * n + i] ?? 0) * (step[j] ?? 0);
    promise -= moved * (2 * (projected[i] ?? 0) + moved);
  }
  return promise;
}
