import { randomRateInference } from "kinetics-core/inference";
import { type NonlinearProblem, type SecondOpinion, secondOpinion } from "kinetics-core/least-squares";
import { FINE_TOLERANCE } from "./constants";
import { type FittedStudy, fitStudy } from "./fitted-study";
import type { GlobalFitFailure, GlobalFitInput } from "./global-fit";
import { prepareStudy } from "./prepare-study";
import { scalePlace } from "./prepared-study";
import { informationOf, moveRun, partOfStep, scalePrior, takeStep } from "./random-rate-search";
import { evaluatePoints } from "./run-points";
import { endWeightOf } from "./trace-pass";

/**
 * The second opinion that a standing global fit gets from an optimiser of other hands. With τ² and σ_j² held, θ and the
 * runs' own b_j of the fit are the least of the penalised sum of squares
 *
 *   Σ_j ‖y_j − offset_j − s c(t; θ, b_j)‖²/σ_j² + Σ_j b_j²/τ² + (1 − ratio)²/u²
 *
 * (Lindstrom and Bates 1990), which is an ordinary problem of p + m parameters: residuals and derivatives are formed
 * reading by reading here, so that neither the sums of the fit nor its outer loop are asked. Times zero and scales of
 * the runs' own stay where they are best.
 */
export type GlobalSecondOpinion = SecondOpinion | GlobalFitFailure;

/** Linearisations that settle θ to rounding before it is judged; the fit itself stops at a tenth of an error. */
const POLISHING = 8;

export function secondOpinionOnFit(
  input: GlobalFitInput,
  options: { readonly shouldStop?: () => boolean } = {},
): GlobalSecondOpinion {
  const prepared = prepareStudy(input);
  if (prepared.status === "refused") return prepared.failure;
  const fit = fitStudy(prepared.study, input.level ?? 0.95, options);
  if (fit.status === "refused") return fit.failure;
  const { fitted } = fit;
  polish(fitted);
  const problem = penalisedProblem(fitted);
  const parameters = new Float64Array(problem.parameters);
  parameters.set(fitted.theta);
  if (hasOwn(fitted))
    parameters.set(
      fitted.pass.runs.map((run) => run.deviation),
      fitted.theta.length,
    );
  const residuals = new Float64Array(problem.residuals);
  problem.evaluate(parameters, residuals, null);
  const residualSquares = residuals.reduce((sum, r) => sum + r * r, 0);
  const unused = fitted.study.runs.length;
  const degreesOfFreedom = Math.max(1, problem.residuals - unused - problem.parameters);
  return secondOpinion(
    problem,
    {
      parameters,
      residuals,
      residualSquares,
      degreesOfFreedom,
      residualStandardDeviation: Math.sqrt(residualSquares / degreesOfFreedom),
      unscaledCovariance: null,
      rank: problem.parameters,
      held: Array.from(parameters, () => false),
      steps: 0,
      evaluations: 0,
    },
    options,
  );
}

function hasOwn({ inference }: FittedStudy): boolean {
  return inference.betweenRunVariance > 0;
}

function polish(fitted: FittedStudy): void {
  const { pass, theta, bounds, logRate, inference: whole, study, noise, undetermined } = fitted;
  for (let turn = 0; turn < POLISHING; turn++) {
    if (!pass.at(theta, FINE_TOLERANCE)) return;
    const information = pass.runs.map((run, j) => informationOf(run, study.runs[j]?.label ?? "", noise[j]));
    const inference = randomRateInference(information, scalePrior(pass, theta), {
      undetermined,
      betweenRunVariance: whole.betweenRunVariance,
      noiseVariances: whole.noiseVariances,
    });
    if (inference.status !== "determined") return;
    const step = takeStep(theta, bounds, inference.step, partOfStep(inference.step, logRate));
    pass.runs.forEach((run, j) => {
      moveRun(pass, run, inference, j, step, 1);
    });
  }
}

function penalisedProblem(fitted: FittedStudy): NonlinearProblem {
  const { study, inference, theta, bounds } = fitted;
  const p = theta.length;
  const own = hasOwn(fitted);
  const runs = study.runs.length;
  const parameters = p + (own ? runs : 0);
  const ratioPlace = scalePlace(study);
  // An end reading has a row of its own, empty where there is none.
  const readings = study.runs.reduce((sum, run) => sum + run.time.length + 1, 0);
  const residuals = readings + (own ? runs : 0) + (ratioPlace >= 0 ? 1 : 0);
  const perDeviation = 1 / Math.sqrt(inference.betweenRunVariance);
  const perRatio = 1 / Math.sqrt(study.scaleVariance);
  return {
    residuals,
    parameters,
    bounds: Array.from({ length: parameters }, (_, i) => bounds[i] ?? [-10, 10]),
    evaluate(at, into, jacobian) {
      for (const column of jacobian ?? []) column.fill(0);
      let first = 0;
      for (let j = 0; j < runs; j++) {
        if (!evaluateRun(fitted, j, at, into, jacobian, first)) return false;
        first += (study.runs[j]?.time.length ?? 0) + 1;
      }
      for (let j = 0; own && j < runs; j++) {
        into[first + j] = perDeviation * (at[p + j] ?? 0);
        const column = jacobian?.[p + j];
        if (column !== undefined) column[first + j] = perDeviation;
      }
      if (ratioPlace >= 0) {
        into[residuals - 1] = perRatio * (1 - (at[ratioPlace] ?? 1));
        const column = jacobian?.[ratioPlace];
        if (column !== undefined) column[residuals - 1] = -perRatio;
      }
      return true;
    },
  };
}

/** Rows of one run from `first` on, its readings and then its end reading, divided by σ_j. */
function evaluateRun(
  { study, pass, inference, theta }: FittedStudy,
  j: number,
  at: Float64Array,
  into: Float64Array,
  jacobian: readonly Float64Array[] | null,
  first: number,
): boolean {
  const run = study.runs[j];
  const stand = pass.runs[j];
  if (run === undefined || stand === undefined) throw new RangeError(`no run number ${j}`);
  const p = theta.length;
  const ratioPlace = scalePlace(study);
  const ratio = ratioPlace < 0 ? 1 : (at[ratioPlace] ?? 1);
  const count = run.time.length;
  const model = new Float64Array(count + 1);
  const derivatives = Array.from({ length: p }, () => new Float64Array(count + 1));
  const place = {
    logRateConstant: (at[0] ?? 0) + (at[p + j] ?? 0),
    parameters: at.subarray(1, 1 + study.law.free.length),
    scale: stand.scaleRatio * ratio,
    ownScale: stand.scaleRatio,
    timeZero: stand.timeZero,
    tolerance: FINE_TOLERANCE,
  };
  if (!evaluatePoints(study, run, place, model, derivatives)) return false;
  const error = model.map((value, i) => (run.signal[i] ?? 0) - value);
  const endWeight = endWeightOf(study, run, stand.noise);
  if (endWeight > 0) {
    const perRatio = study.scale * study.followedNumber * stand.scaleRatio;
    error[count] = (run.endSignal?.value ?? 0) - perRatio * ratio * run.most;
    const byRatio = derivatives[ratioPlace];
    if (byRatio !== undefined) byRatio[count] = perRatio * run.most;
  }
  const weight = 1 / Math.sqrt(inference.noiseVariances[j] ?? 1);
  centredInto(error, weight, endWeight, into, first);
  derivatives.forEach((column, i) => {
    const target = jacobian?.[i];
    if (target !== undefined) centredInto(column, -weight, endWeight, target, first);
    const own = i === 0 ? jacobian?.[p + j] : undefined;
    if (own !== undefined) centredInto(column, -weight, endWeight, own, first);
  });
  return true;
}

/** The offset of a run taken out of its column, whose last element is that of the end reading. */
function centredInto(
  column: Float64Array,
  weight: number,
  endWeight: number,
  into: Float64Array,
  first: number,
): void {
  const count = column.length - 1;
  let mean = (endWeight * (column[count] ?? 0)) / (count + endWeight);
  for (let i = 0; i < count; i++) mean += (column[i] ?? 0) / (count + endWeight);
  for (let i = 0; i < count; i++) into[first + i] = weight * ((column[i] ?? 0) - mean);
  into[first + count] = weight * Math.sqrt(endWeight) * ((column[count] ?? 0) - mean);
}
