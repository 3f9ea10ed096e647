import {
  type InferenceFailure,
  type PriorInformation,
  type RandomRateInference,
  type RunInformation,
  randomRateInference,
} from "kinetics-core/inference";
import {
  FIRST_HALVED,
  FIRST_HELD,
  LARGEST_LOG_STEP,
  LARGEST_OWN_STEP,
  MOST_LINEARISATIONS,
  OUTER_SETTLED,
} from "./constants";
import { leftToRuns } from "./left-to-runs";
import { scalePlace } from "./prepared-study";
import { updateNuisances } from "./project-run";
import { type ReadingNoise, readingNoise } from "./reading-noise";
import type { RunLinearisation } from "./run-linearisation";
import type { StudyPass } from "./study-pass";

/**
 * The fit with run-to-run scatter in ln k: ln k_j = ln k + b_j, b_j ~ N(0, τ²). The courses are not linear in b_j, and
 * a few per cent of scatter are many standard errors of a run of a thousand points, so the model is linearised where
 * each run stands (Lindstrom and Bates 1990, Biometrics 46, 673):
 *
 *   1. a pass at θ with each run at its own ln k + b_j gives r, J;
 *   2. r̃ = r + J e b_j is the residual that the linear model has at b_j = 0: g̃ = g + G e b_j,
 *      r̃ᵀr̃ = rᵀr + 2 b_j eᵀg + b_j² eᵀG e, with which `randomRateInference` gives the step in θ, τ² and the new b_j;
 *   3. until no parameter moves by more than a tenth of its standard error; that step is taken too.
 *
 * The loop is Gauss and Newton's: its error after a step is of the second order in b_j's own error, so two or three
 * passes settle it. Where a reactant is used up with a kink in the course (order 0), the linear model changes as a
 * reading passes the kink and the loop may turn about its end; after a few passes it goes half the way. Where τ² is 0
 * at one linearisation and not at the next, it is held at the greater of the last two after some more.
 * A fixed point is the least of the penalised sum of squares at its own τ², whatever the way there.
 */
export interface RandomRateSettings {
  readonly tolerance: number;
  readonly level: number;
  readonly shouldStop: () => boolean;
}

export type RandomRateOutcome =
  | {
      readonly status: "linearised";
      readonly settled: boolean;
      readonly inference: RandomRateInference;
      readonly information: readonly RunInformation[];
      readonly noise: readonly ReadingNoise[];
      readonly priors: readonly PriorInformation[];
      /** θ of the last linearisation, from which `inference.step` has been taken. */
      readonly linearisedAt: Float64Array;
      /** r of `randomRateInference`. */
      readonly undetermined: number;
    }
  | { readonly status: "failed"; readonly inference: InferenceFailure }
  | { readonly status: "no-course" }
  | { readonly status: "stopped" };

/** `theta` comes from the pooled fit and is left at the answer; so are the runs' deviations in `pass`. */
export function randomRateSearch(
  pass: StudyPass,
  theta: Float64Array,
  bounds: readonly (readonly [number, number])[],
  logRate: Float64Array,
  settings: RandomRateSettings,
): RandomRateOutcome {
  const linearisedAt = theta.slice();
  let undetermined = 1;
  let variance = 0;
  for (let linearisations = 1; ; linearisations++) {
    if (settings.shouldStop()) return { status: "stopped" };
    if (!pass.at(theta, settings.tolerance)) return { status: "no-course" };
    linearisedAt.set(theta);
    const noise = readingNoise(pass.runs, pass.parameters - 1);
    const information = pass.runs.map((run, j) =>
      informationOf(run, pass.study.runs[j]?.label ?? "", noise[j]),
    );
    const priors = scalePrior(pass, theta);
    const inference = randomRateInference(information, priors, {
      undetermined,
      level: settings.level,
      ...(linearisations === 1 ? { betweenRunVariance: spreadOfOwn(information) } : {}),
      ...(linearisations >= FIRST_HELD ? { betweenRunVariance: variance } : {}),
    });
    if (inference.status !== "determined") return { status: "failed", inference };
    if (linearisations < FIRST_HELD)
      variance =
        linearisations === FIRST_HELD - 1
          ? Math.max(variance, inference.betweenRunVariance)
          : inference.betweenRunVariance;
    if (linearisations === 1)
      undetermined = leftToRuns(information, priors, inference, pass.study.law.free.length);
    const turn = linearisations < FIRST_HALVED ? 1 : 0.5;
    take(pass, theta, bounds, inference, turn * partOfStep(inference.step, logRate), turn);
    const settled = linearisations > 1 && isSettled(inference, linearisedAt, theta);
    if (settled || linearisations === MOST_LINEARISATIONS)
      return {
        status: "linearised",
        settled,
        inference,
        information,
        noise,
        priors,
        linearisedAt,
        undetermined,
      };
  }
}

/**
 * A run as `kinetics-core/inference` reads it: about the shared ln k, though linearised at its own. Its arrays are those
 * of the run and hold until the next pass.
 */
export function informationOf(
  run: RunLinearisation,
  label: string,
  noise: ReadingNoise = { autocorrelation: 0, freedom: run.points - 2 },
): RunInformation {
  const { gram, gradient, shifted, deviation, points, residualSquares } = run;
  const p = gradient.length;
  for (let i = 0; i < p; i++) shifted[i] = (gradient[i] ?? 0) + deviation * (gram[i * p] ?? 0);
  return {
    label,
    gram,
    gradient: shifted,
    residualSquares: Math.max(
      0,
      residualSquares + 2 * deviation * (gradient[0] ?? 0) + deviation * deviation * (gram[0] ?? 0),
    ),
    points,
    // Of which the inference takes one for the run's ln k, that is spent here already.
    degreesOfFreedom: Math.min(points, noise.freedom + 1),
    autocorrelation: noise.autocorrelation,
  };
}

export function scalePrior(pass: StudyPass, theta: Float64Array): readonly PriorInformation[] {
  const place = scalePlace(pass.study);
  if (place < 0) return [];
  return [
    {
      parameter: place,
      deviation: 1 - (theta[place] ?? 1),
      standardUncertainty: Math.sqrt(pass.study.scaleVariance),
    },
  ];
}

/** The part of a step that keeps the logarithm of the rate within its cap. */
export function partOfStep(step: Float64Array, logRate: Float64Array): number {
  let inLogRate = 0;
  for (let i = 0; i < step.length; i++) inLogRate += (logRate[i] ?? 0) * (step[i] ?? 0);
  return Math.min(1, LARGEST_LOG_STEP / Math.abs(inLogRate));
}

/**
 * τ² for the first step: the spread of the runs' own ln k about their mean, in closed form. The pooled θ is off by
 * about as much as the runs scatter, so a search for the best τ² there would be wasted.
 */
function spreadOfOwn(information: readonly RunInformation[]): number {
  let count = 0;
  let sum = 0;
  let squares = 0;
  for (const { gram, gradient } of information) {
    if (!((gram[0] ?? 0) > 0)) continue;
    const own = (gradient[0] ?? 0) / (gram[0] ?? 1);
    count++;
    sum += own;
    squares += own * own;
  }
  return count > 1 ? Math.max(0, squares - (sum * sum) / count) / (count - 1) : 0;
}

/** By the step that was taken: one that a bound has held back is none. */
export function isSettled(
  { covariance }: RandomRateInference,
  from: Float64Array,
  to: Float64Array,
): boolean {
  for (let i = 0; i < to.length; i++) {
    const step = Math.abs((to[i] ?? 0) - (from[i] ?? 0));
    if (step > OUTER_SETTLED * Math.sqrt(covariance[i]?.[i] ?? 0)) return false;
  }
  return true;
}

function take(
  pass: StudyPass,
  theta: Float64Array,
  bounds: readonly (readonly [number, number])[],
  inference: RandomRateInference,
  part: number,
  turn: number,
): void {
  const step = takeStep(theta, bounds, inference.step, part);
  pass.runs.forEach((run, j) => {
    moveRun(pass, run, inference, j, step, turn);
  });
}

/** Moves θ by a part of the step, no farther than its bounds; returns what it moved by. */
export function takeStep(
  theta: Float64Array,
  bounds: readonly (readonly [number, number])[],
  wanted: Float64Array,
  part: number,
): Float64Array {
  return wanted.map((change, i) => {
    const [low, high] = bounds[i] ?? [0, 0];
    const from = theta[i] ?? 0;
    theta[i] = Math.min(high, Math.max(low, from + part * change));
    return (theta[i] ?? 0) - from;
  });
}

/** Moves a run by a part of the way to the ln k that the model predicts for it; `place`: of the run in the inference. */
export function moveRun(
  pass: StudyPass,
  run: RunLinearisation,
  inference: RandomRateInference,
  place: number,
  step: Float64Array,
  part: number,
): void {
  const predicted = (inference.runs[place]?.logRateConstant.estimate ?? 0) - (inference.step[0] ?? 0);
  const wanted = part * (predicted - run.deviation);
  const change = Math.max(-LARGEST_OWN_STEP, Math.min(LARGEST_OWN_STEP, wanted));
  run.deviation += change;
  run.noise = inference.noiseVariances[place] ?? run.noise;
  if (run.eliminated.length > 0) updateNuisances(pass.study, run, step, change);
}
