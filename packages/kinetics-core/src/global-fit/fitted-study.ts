import type { PriorInformation, RandomRateInference, RunInformation } from "kinetics-core/inference";
import {
  COARSE_SETTLED,
  COARSE_TOLERANCE,
  FINE_BELOW,
  FINE_TOLERANCE,
  MOST_COARSE_PASSES,
  MOST_PASSES,
  POOR_FIT,
  SETTLED,
  STEP_TOLERANCE,
} from "./constants";
import { failure, type GlobalFitFailure, type GlobalFitOptions } from "./global-fit";
import { PooledSearch, type SearchEnd } from "./pooled-search";
import { type PreparedStudy, scalePlace, thinned } from "./prepared-study";
import { randomRateSearch } from "./random-rate-search";
import type { ReadingNoise } from "./reading-noise";
import { earlyRates, meanLogRateDerivatives, startFromRates } from "./starting-values";
import { StudyPass } from "./study-pass";
import { undeterminedCombinations } from "./undetermined";

/**
 * The way of a fit: a start from the early rates, a search on thinned traces, the pooled fit of the full ones, then the
 * outer loop with run-to-run scatter. What comes out is numbers by place; `report` gives them their names.
 */
export interface FittedStudy {
  readonly study: PreparedStudy;
  readonly names: readonly string[];
  readonly theta: Float64Array;
  readonly linearisedAt: Float64Array;
  readonly inference: RandomRateInference;
  readonly information: readonly RunInformation[];
  readonly noise: readonly ReadingNoise[];
  readonly priors: readonly PriorInformation[];
  readonly undetermined: number;
  readonly pooled: PooledNumbers;
  readonly pass: StudyPass;
  readonly bounds: readonly (readonly [number, number])[];
  readonly logRate: Float64Array;
  readonly atBound: readonly string[];
  /** Passes over the full traces. */
  readonly iterations: number;
  readonly tolerance: number;
}

export interface PooledNumbers {
  readonly theta: Float64Array;
  /** Σ JᵀJ with the observation of ε·l, in signal². */
  readonly gram: Float64Array;
  readonly variance: number;
  readonly freedom: number;
}

export type StudyFit =
  | { readonly status: "fitted"; readonly fitted: FittedStudy }
  | { readonly status: "refused"; readonly failure: GlobalFitFailure };

export function fitStudy(study: PreparedStudy, level: number, options: GlobalFitOptions): StudyFit {
  const shouldStop = options.shouldStop ?? (() => false);
  const names = parameterNames(study);
  const pass = new StudyPass(study);
  const begun = beginning(study, pass, options, shouldStop);
  if (begun === null) return refused(shouldStop() ? stopped() : noCourse());
  const { theta, logRate, noise } = begun;
  pass.read(study);
  pass.reset();
  pass.setNoise(noise);
  const search = new PooledSearch(pass, theta, logRate);
  let tolerance = STEP_TOLERANCE;
  let end = search.search({ tolerance, settled: SETTLED, mostPasses: MOST_PASSES, shouldStop });
  if (end === "settled" && isFine(pass)) {
    tolerance = FINE_TOLERANCE;
    pass.setNoise(ownVariance(pass));
    end = search.search({ tolerance, settled: SETTLED, mostPasses: MOST_PASSES, shouldStop });
  }
  const fault = pooledFault(end, pass, names, theta);
  if (fault !== null) return refused(fault);
  const pooled = pooledNumbers(pass, theta);

  pass.setNoise(ownVariance(pass));
  for (const run of pass.runs) {
    const information = run.gram[0] ?? 0;
    const own = information > 0 ? (run.gradient[0] ?? 0) / information : 0;
    run.deviation = study.runs.length > 1 ? Math.max(-1, Math.min(1, own)) : 0;
  }
  const outcome = randomRateSearch(pass, theta, search.bounds, logRate, {
    tolerance,
    level,
    shouldStop,
  });
  if (outcome.status === "stopped") return refused(stopped());
  if (outcome.status === "no-course") return refused(noCourse());
  if (outcome.status === "failed")
    return refused(failure("not-determined", "runs", outcome.inference.message));
  if (!outcome.settled) return refused(notConverged());
  return {
    status: "fitted",
    fitted: {
      linearisedAt: outcome.linearisedAt,
      inference: outcome.inference,
      information: outcome.information,
      noise: outcome.noise,
      priors: outcome.priors,
      study,
      names,
      theta,
      undetermined: outcome.undetermined,
      pooled,
      pass,
      bounds: search.bounds,
      logRate,
      atBound: names.filter((_, i) => isAtBound(theta[i] ?? 0, search.bounds[i])),
      iterations: pass.passes,
      tolerance,
    },
  };
}

function isAtBound(value: number, bounds: readonly [number, number] | undefined): boolean {
  return bounds !== undefined && (value <= bounds[0] || value >= bounds[1]);
}

/** Names of θ: "ln k", the law's free parameters, "scale". */
export function parameterNames(study: PreparedStudy): readonly string[] {
  return ["ln k", ...study.law.free, ...(scalePlace(study) >= 0 ? ["scale"] : [])];
}

/** θ found on thinned traces, from the start that fits best; null where no start has a course in every run. */
function beginning(
  study: PreparedStudy,
  pass: StudyPass,
  options: GlobalFitOptions,
  shouldStop: () => boolean,
) {
  const few = thinned(study);
  const rates = earlyRates(few);
  const noise = pointNoise(study);
  let best: { theta: Float64Array; logRate: Float64Array; own: number } | null = null;
  for (const start of starts(study, few, rates, options)) {
    pass.read(few);
    pass.reset();
    pass.setNoise(noise);
    const logRate = meanLogRateDerivatives(few, start);
    const search = new PooledSearch(pass, start, logRate);
    const end = search.search({
      tolerance: COARSE_TOLERANCE,
      settled: COARSE_SETTLED,
      mostPasses: MOST_COARSE_PASSES,
      shouldStop,
    });
    if (end === "stopped") return best === null ? null : { ...best, noise };
    if (end === "no-course") continue;
    const own = ownVariance(pass);
    if (best === null || own < best.own) best = { theta: start, logRate, own };
    if (end === "settled" && own < POOR_FIT * noise && !search.held.includes(1)) break;
  }
  return best === null ? null : { ...best, noise: Math.max(noise, Math.min(best.own, POOR_FIT * noise)) };
}

/** The caller's start, then the law read from the early rates, then the law's own start and whole orders about it. */
function* starts(
  study: PreparedStudy,
  few: PreparedStudy,
  rates: ReturnType<typeof earlyRates>,
  { start }: GlobalFitOptions,
): Generator<Float64Array> {
  const { free, starts: own, largestSteps } = study.law;
  if (start !== undefined) {
    const parameters = free.map((name, j) => start.parameters?.[name] ?? own[j] ?? 0);
    // A given k is taken only where the traces show none: they are the better witness.
    const theta = startFromRates(few, rates, parameters, false);
    if (rates.length === 0 && start.logRateConstant !== undefined) theta[0] = start.logRateConstant;
    yield theta;
  }
  yield startFromRates(few, rates, own, true);
  yield startFromRates(few, rates, own, false);
  for (const order of [0.5, 2]) {
    const shifted = own.map((value, j) => (Number.isFinite(largestSteps[j] ?? 0) ? order : value));
    if (shifted.some((value, j) => value !== own[j])) yield startFromRates(few, rates, shifted, false);
  }
}

/** Second differences of a run that are asked for its noise. */
const MOST_BENDS = 200;

/** Variance of one reading from second differences in time order, in the median of the runs: no model is asked. */
function pointNoise(study: PreparedStudy): number {
  const variances = study.runs.map(({ signal }) => {
    const stride = Math.max(1, Math.floor(signal.length / MOST_BENDS));
    let sum = 0;
    let count = 0;
    for (let i = 1; i + 1 < signal.length; i += stride) {
      const bend = (signal[i - 1] ?? 0) - 2 * (signal[i] ?? 0) + (signal[i + 1] ?? 0);
      sum += bend * bend;
      count++;
    }
    return sum / 6 / count;
  });
  variances.sort((a, b) => a - b);
  return Math.max(variances[variances.length >> 1] ?? 0, Number.MIN_VALUE);
}

/** Variance of a reading when every run has its own ln k. */
function ownVariance(pass: StudyPass): number {
  let freedom = -pass.parameters;
  for (const run of pass.runs) freedom += run.points - 2;
  return Math.max(pass.ownResidualSquares() / Math.max(1, freedom), Number.MIN_VALUE);
}

/** The residuals are so small that errors of the integration would show among them. */
function isFine(pass: StudyPass): boolean {
  const { study } = pass;
  const spans = study.runs.map(({ span }) => span).sort((a, b) => a - b);
  const signal = Math.abs((spans[spans.length >> 1] ?? 0) * study.scale * study.followedNumber);
  return Math.sqrt(ownVariance(pass)) < FINE_BELOW * signal;
}

/**
 * All courses together gain no more over a constant for each run than chance would give them in one of a thousand. In
 * most studies the first run settles that it is not so.
 */
function isUnchanged(pass: StudyPass): boolean {
  const least = (10 + 6 * pass.runs.length) * ownVariance(pass);
  let gain = 0;
  for (const [j, { signal }] of pass.study.runs.entries()) {
    const flat = squaresAboutMean(signal);
    gain += Math.max(0, flat - (pass.runs[j]?.residualSquares ?? 0));
    if (gain > least) return false;
  }
  return true;
}

/** 0 where only rounding is left. */
function squaresAboutMean(values: Float64Array): number {
  let mean = 0;
  for (let i = 0; i < values.length; i++) mean += (values[i] ?? 0) / values.length;
  let squares = 0;
  for (let i = 0; i < values.length; i++) squares += ((values[i] ?? 0) - mean) ** 2;
  return squares > values.length * (1e-14 * mean) ** 2 ? squares : 0;
}

function pooledNumbers(pass: StudyPass, theta: Float64Array): PooledNumbers {
  let freedom = -pass.parameters + (scalePlace(pass.study) >= 0 ? 1 : 0);
  for (const run of pass.runs) freedom += run.points - 1;
  return {
    theta: theta.slice(),
    gram: pass.gram.slice(),
    variance: pass.residualSquares / Math.max(1, freedom),
    freedom,
  };
}

function pooledFault(
  end: SearchEnd,
  pass: StudyPass,
  names: readonly string[],
  theta: Float64Array,
): GlobalFitFailure | null {
  if (end === "stopped") return stopped();
  if (end === "no-course") return noCourse();
  if (!theta.every(Number.isFinite) || Math.abs(theta[0] ?? 0) >= 690)
    return failure(
      "beyond-precision",
      "runs",
      "The rate constant leaves the range of a double. Check the units of concentrations and times, or hold an order nearer to what is expected.",
    );
  if (pass.runs.every((run) => !((run.gram[0] ?? 0) > 0)))
    return failure(
      "exhausted-at-first-reading",
      "runs",
      "In every run the reaction is over at the first reading, or never begins with the concentrations given, so the traces say nothing about its rate. Read earlier, slow the reaction down, or check the starting concentrations.",
    );
  if (isUnchanged(pass))
    return failure(
      "no-change",
      "runs",
      "No trace changes beyond its noise: the reaction was over before the first reading, or has hardly begun at the last. Read earlier, or wait longer.",
    );
  const open = undeterminedCombinations(pass.gram, names);
  if (open.length > 0)
    return failure("not-determined", "runs", open.map(({ message }) => message).join(" "), open);
  return end === "not-settled" ? notConverged() : null;
}

function notConverged(): GlobalFitFailure {
  return failure(
    "not-converged",
    "law",
    "The search for the parameters did not settle from any start that was tried: the traces do not follow this law, or one run does not belong. Set a run aside, try another law, or hold an order.",
  );
}

function noCourse(): GlobalFitFailure {
  return failure(
    "no-course",
    "law",
    "The law has no finite rate along some run: a negative order in a species that is absent at the start or used up, or a parameter beyond its range. Give a starting concentration above 0, or another law.",
  );
}

function stopped(): GlobalFitFailure {
  return failure("stopped", "options.shouldStop", "The fit was stopped before it had settled.");
}

function refused(fault: GlobalFitFailure): StudyFit {
  return { status: "refused", failure: fault };
}
