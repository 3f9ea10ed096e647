import { fillStep } from "./damped-step";
import { applyReflectors } from "./linearisation";
import type { NonlinearSearch } from "./nonlinear-search";

/** Length of the probe along the step, in steps. */
const PROBE = 0.1;
/** A bend that is larger than this part of the step is no correction any more. */
const LARGEST_BEND = 0.375;

/**
 * Bends the proposed step along the curved valley that it starts in: with r'' the second derivative of the residuals
 * along the step δ, by one probe,
 *
 *   r'' = 2/h·((r(θ + hδ) − r)/h − J δ),   a = −V diag(1/(s² + λ)) Wᵀ Qᵀr'',   θ⁺ = θ + δ + a/2
 *
 * (geodesic acceleration; Transtrum and Sethna, arXiv:1201.5885). It cuts long creeping descents several times, but on
 * short ones it costs an evaluation a step and can lead elsewhere, so it waits until a descent has proved long.
 */
export function accelerate(search: NonlinearSearch, damping: number): void {
  const { problem, linear, current, trial, step, rest, low, high, projected } = search;
  const { parameters: n, points: m, scale, work, rotated } = linear;
  for (let j = 0; j < n; j++) {
    const probed = (current.theta[j] ?? 0) + (PROBE * (step[j] ?? 0)) / (scale[j] ?? 1);
    rest[j] = trial.theta[j] ?? 0;
    trial.theta[j] = probed;
  }
  search.evaluations++;
  const isDefined = problem.evaluate(trial.theta, trial.residuals, null);
  trial.theta.set(rest);
  if (!isDefined) return;
  for (let i = 0; i < m; i++) work[i] = ((trial.residuals[i] ?? 0) - (current.residuals[i] ?? 0)) / PROBE;
  for (let j = 0; j < n; j++) {
    const move = (step[j] ?? 0) / (scale[j] ?? 1);
    const column = current.jacobian[j];
    if (column !== undefined) for (let i = 0; i < m; i++) work[i] = (work[i] ?? 0) - move * (column[i] ?? 0);
  }
  for (let i = 0; i < m; i++) work[i] = (2 / PROBE) * (work[i] ?? 0);
  applyReflectors(linear);
  for (let k = 0; k < n; k++) {
    let slope = 0;
    for (let i = 0; i < n; i++) slope += (rotated[k * n + i] ?? 0) * (work[i] ?? 0);
    projected[k] = slope;
  }
  fillStep(linear, projected, damping, rest);
  bend(search, low, high);
}

function bend(
  { linear, current, trial, step, rest }: NonlinearSearch,
  low: Float64Array,
  high: Float64Array,
): void {
  let along = 0;
  let across = 0;
  for (let j = 0; j < step.length; j++) {
    along += (step[j] ?? 0) ** 2;
    across += ((rest[j] ?? 0) / 2) ** 2;
  }
  // NaN, from a probe that overflowed, bends nothing.
  if (!(across <= LARGEST_BEND ** 2 * along)) return;
  for (let j = 0; j < step.length; j++) {
    const end = (trial.theta[j] ?? 0) + (rest[j] ?? 0) / 2 / (linear.scale[j] ?? 1);
    const inside = end >= (low[j] ?? 0) && end <= (high[j] ?? 0);
    if (inside && end !== current.theta[j]) trial.theta[j] = end;
  }
}
