import { releaseFree } from "./bounded-step";
import { compensatedDot } from "./compensated-dot";
import { fillStep } from "./damped-step";
import { factorise, wholePromise } from "./linearisation";
import {
  evaluateAt,
  moveOn,
  type NonlinearSearch,
  outOfEvaluations,
  residualVariance,
} from "./nonlinear-search";
import { rescale } from "./rescale";

/**
 * Undamped steps from the end of a descent while they shrink. The sum of squares is flat there: it has lost half of the
 * digits, the gradient has not. So the step is made from Jᵀr in compensated arithmetic,
 *
 *   p = −V S⁻² Vᵀ D⁻¹ Jᵀr
 *
 * (the corrected seminormal equations; Björck, Linear Algebra Appl. 88/89 (1987) 31-48): each round mends the rounding of
 * the one before as long as s_n/s_1 is far above ε. Where residuals are large the steps shrink by a constant factor a
 * round, and many rounds are needed for the last digits; should they grow, a part of each is taken.
 */
export function polish(search: NonlinearSearch): void {
  // A descent that ended in the noise of its model may rise by what it could not see.
  const unseen = wholePromise(search.linear);
  const last = Float64Array.from(search.current.theta);
  let before = Number.POSITIVE_INFINITY;
  let share = 1;
  for (let round = 0; round < MOST_ROUNDS; round++) {
    if (outOfEvaluations(search) || search.options.shouldStop?.()) return;
    const length = proposePolish(search, share);
    if (length > before && before > NOTICEABLE * Math.sqrt(residualVariance(search))) {
      share /= 2;
      if (share < LEAST_SHARE || !goBack(search, last)) return;
      before = Number.POSITIVE_INFINITY;
      continue;
    }
    if (!(length < SHRINKING * before) || isInvisible(search)) return;
    const limit = (1 + TOLERATED_RISE) * search.current.squares + unseen;
    if (!evaluateAt(search, search.trial) || search.trial.squares > limit) return;
    last.set(search.current.theta);
    moveOn(search);
    if (length <= INVISIBLE * Math.sqrt(residualVariance(search))) return;
    before = length;
  }
}

/** To the point before the last step; false where the model does not let. */
function goBack(search: NonlinearSearch, theta: Float64Array): boolean {
  search.trial.theta.set(theta);
  const isDefined = evaluateAt(search, search.trial);
  if (isDefined) moveOn(search);
  return isDefined;
}

const MOST_ROUNDS = 100;
/** Part of a standard error; steps below may grow by rounding. */
const NOTICEABLE = 1e-8;
/** Steps that grow overshoot; half of them, or a quarter, closes in. */
const LEAST_SHARE = 0.25;
const SHRINKING = 0.95;
/** Part of a standard error below which a step is of no interest to anybody. */
const INVISIBLE = 1e-12;
const TOLERATED_RISE = 1e-9;

/** Writes the next point into `search.trial`; the length of the step to it. */
function proposePolish(search: NonlinearSearch, share: number): number {
  const { linear, current, trial, step, free, low, high } = search;
  rescale(search);
  factorise(current.jacobian, current.residuals, linear);
  releaseFree(search);
  const { parameters: n, singular, directions, slopes, scale } = linear;
  for (let j = 0; j < n; j++) {
    const column = current.jacobian[j];
    search.rest[j] =
      free[j] && column !== undefined ? compensatedDot(column, current.residuals) / (scale[j] ?? 1) : 0;
  }
  for (let k = 0; k < n; k++) {
    let slope = 0;
    for (let j = 0; j < n; j++) slope += (directions[k * n + j] ?? 0) * (search.rest[j] ?? 0);
    slopes[k] = (singular[k] ?? 0) > 0 ? slope : 0;
  }
  fillStep(linear, slopes, 0, step);
  let squares = 0;
  for (let j = 0; j < n; j++) {
    step[j] = share * (step[j] ?? 0);
    const end = (current.theta[j] ?? 0) + (step[j] ?? 0) / (scale[j] ?? 1);
    trial.theta[j] = Math.min(Math.max(end, low[j] ?? 0), high[j] ?? 0);
    squares += (step[j] ?? 0) ** 2;
  }
  return Math.sqrt(squares);
}

/** Whether the step is lost in the rounding of the parameters themselves. */
function isInvisible({ current, trial }: NonlinearSearch): boolean {
  for (let j = 0; j < current.theta.length; j++) {
    const here = current.theta[j] ?? 0;
    const there = trial.theta[j] ?? 0;
    if (Math.abs(there - here) > Number.EPSILON * Math.abs(here)) return false;
  }
  return true;
}
