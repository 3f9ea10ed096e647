import { accelerate } from "./accelerated-step";
import { type Proposal, proposeStep, releaseFree } from "./bounded-step";
import { factorise, wholePromise } from "./linearisation";
import type { NonlinearFit, NonlinearOptions, NonlinearProblem } from "./nonlinear-problem";
import {
  evaluateAt,
  isWithinRounding,
  moveOn,
  type NonlinearSearch,
  newSearch,
  outOfEvaluations,
  residualVariance,
} from "./nonlinear-search";
import { refusalOf, solutionOf } from "./nonlinear-solution";
import { polish } from "./polish";
import { raiseScale, rescale } from "./rescale";

/**
 * Nonlinear least squares by Levenberg and Marquardt's method in the trust-region form of Moré (Lecture Notes in
 * Mathematics 630 (1978) 105-116): the step minimises |J δ + r| within |D δ| ≤ Δ, D the largest length that each column
 * of J has had, so that neither units nor the sizes of parameters matter. The linear problems are solved by QR and
 * singular values and never by JᵀJ.
 *
 * It stops when the whole linear step promises less than a 10⁻¹⁰ part of the residual variance, that is moves no
 * parameter by 10⁻⁵ of its standard error, and then polishes: undamped steps from a compensated gradient while they
 * shrink. A descent that proves long is helped along its curved valley (accelerated-step.ts). Bounds act by holding: a
 * parameter on a bound stays there while the sum of squares falls outwards.
 *
 * `start`: within the bounds. Nothing throws on data; what could not be fitted is a status with a sentence.
 */
export function fitNonlinear(
  problem: NonlinearProblem,
  start: ArrayLike<number>,
  options: NonlinearOptions = {},
): NonlinearFit {
  const refusal = refusalOf(problem, start);
  if (refusal !== null) return refusal;
  const search = newSearch(problem, start, options);
  if (!evaluateAt(search, search.current)) {
    return {
      status: "no-value-at-start",
      message: `The model has no finite value, sum of squares or derivative at the start (${Array.from(search.current.theta).join(", ")}). Start where it has.`,
    };
  }
  const end = descend(search);
  if (end !== "converged") return solutionOf(search, end);
  polish(search);
  return solutionOf(search, "converged");
}

type DescentEnd = "converged" | "no-descent" | "out-of-evaluations" | "stopped";

/** First trust radius in lengths of the scaled start, |D θ₀|. */
const FIRST_RADIUS = 1;
/** Part of the residual variance that a step must promise to be worth its evaluation. */
const SMALLEST_PROMISE = 1e-10;
/** Evaluations after which a descent counts as a long one and its steps are bent. */
const LONG_DESCENT = 100;
/**
 * Where not even the shortest step keeps its promise, the noise of the model (an integrator's tolerance) ends the
 * descent; it is an answer if the whole promise is below this part, a tenth of a standard error.
 */
const PROMISE_OF_NO_MATTER = 1e-2;
const SMALLEST_RADIUS = 4 * Number.EPSILON;
/** Part of its promise that a step must keep to be accepted. */
const LEAST_KEPT = 1e-4;

function descend(search: NonlinearSearch): DescentEnd {
  rescale(search);
  let radius = FIRST_RADIUS * (scaledSize(search) || Math.sqrt(search.current.squares));
  let first = true;
  for (;;) {
    linearise(search);
    if (isSpent(search)) return "converged";
    const moved = stepWithin(search, radius, first);
    if (typeof moved === "string") return moved;
    radius = moved.radius;
    first = false;
    moveOn(search);
  }
}

function linearise(search: NonlinearSearch): void {
  raiseScale(search);
  factorise(search.current.jacobian, search.current.residuals, search.linear);
  releaseFree(search);
}

/**
 * Whether nothing is left to gain. Directions count as determined by the largest columns that were met on the way;
 * should these have hidden a direction, a second look by the columns as they are now finds it.
 */
function isSpent(search: NonlinearSearch): boolean {
  const limit = SMALLEST_PROMISE * residualVariance(search);
  if (wholePromise(search.linear) > limit) return false;
  rescale(search);
  linearise(search);
  return wholePromise(search.linear) <= limit;
}

/** Tries steps within a shrinking radius until one lowers the sum of squares; the radius for the next. */
function stepWithin(
  search: NonlinearSearch,
  startRadius: number,
  first: boolean,
): { readonly radius: number } | DescentEnd {
  const smallest = SMALLEST_RADIUS * (scaledSize(search) || Math.sqrt(search.current.squares));
  const promiseAtBest = wholePromise(search.linear);
  let radius = startRadius;
  for (let again = false; ; again = true) {
    if (outOfEvaluations(search)) return "out-of-evaluations";
    if (search.options.shouldStop?.()) return "stopped";
    const proposal = proposeStep(search, radius);
    if (first && !again) radius = Math.min(radius, proposal.length);
    if (search.evaluations >= LONG_DESCENT && !proposal.crossed) accelerate(search, proposal.damping);
    const valid = proposal.promise > 0 && evaluateAt(search, search.trial);
    const gain = valid ? gainOf(search) : Number.NaN;
    if (gain >= LEAST_KEPT * proposal.promise) return { radius: nextRadius(radius, gain, proposal) };
    if (valid && isWithinRounding(search)) return "converged";
    radius = reducedRadius(radius, gain, proposal);
    const isLost = valid && proposal.promise <= SMALLEST_PROMISE * residualVariance(search);
    if (isLost || !(radius > smallest)) {
      return promiseAtBest <= PROMISE_OF_NO_MATTER * residualVariance(search) ? "converged" : "no-descent";
    }
    if (proposal.crossed) releaseFree(search);
  }
}

/** Fall of the sum of squares, Σ (r − r⁺)(r + r⁺): right where the two sums agree to most digits. */
function gainOf({ current, trial }: NonlinearSearch): number {
  let gain = 0;
  for (let i = 0; i < current.residuals.length; i++) {
    const before = current.residuals[i] ?? 0;
    const after = trial.residuals[i] ?? 0;
    gain += (before - after) * (before + after);
  }
  return gain;
}

function nextRadius(radius: number, gain: number, { promise, length, damping }: Proposal): number {
  if (gain <= 0.25 * promise) return 0.5 * Math.min(radius, length);
  return damping === 0 || gain >= 0.75 * promise ? Math.max(radius, 2 * length) : radius;
}

/** By the parabola through the slope at the point and the rise that was met; a tenth to a half. */
function reducedRadius(radius: number, gain: number, { promise, length }: Proposal): number {
  const shorter = Math.min(radius, length);
  if (!Number.isFinite(gain) || promise <= 0) return 0.25 * shorter;
  return shorter * Math.min(Math.max((0.5 * promise) / (promise - gain), 0.1), 0.5);
}

function scaledSize({ linear, current }: NonlinearSearch): number {
  let size = 0;
  for (let j = 0; j < linear.parameters; j++) size += ((linear.scale[j] ?? 0) * (current.theta[j] ?? 0)) ** 2;
  return Math.sqrt(size);
}
