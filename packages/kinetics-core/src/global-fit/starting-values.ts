import { mean } from "kinetics-core/summation";
import { NormalStep } from "./normal-step";
import { type PreparedRun, type PreparedStudy, parameterCount, scalePlace } from "./prepared-study";

/**
 * Where the search begins, read from the early parts of the traces: ln v_j = ln k + ln f(c_j; θ) with v_j the slope of
 * the first part of run j and c_j the concentrations in its middle. That k is then right to some ten per cent, however
 * wrong anybody's guess was. Orders enter the regression with a standard deviation of one about their start, which
 * keeps those that the runs do not tell apart where they are.
 */

/** Part of the extent seen within which a straight line serves for a start. */
const EARLY_PART = 0.4;
const FEWEST_EARLY_POINTS = 4;
/** Standard deviation of ln v of an early slope, and of an order about its start. */
const SLOPE_DEVIATION = 0.2;

export interface EarlyRate {
  readonly run: number;
  readonly logRate: number;
  /** Extent in the middle of the early part. */
  readonly extent: number;
}

/** Runs whose early slope is not in the reaction's direction are left out. */
export function earlyRates(study: PreparedStudy): EarlyRate[] {
  return study.runs.flatMap((run, index) => {
    const found = earlyRate(run, study.scale * study.followedNumber);
    return found === null ? [] : [{ run: index, ...found }];
  });
}

function earlyRate(run: PreparedRun, factor: number): { logRate: number; extent: number } | null {
  const { time, signal } = run;
  const count = time.length;
  const first = signal[0] ?? 0;
  let furthest = 0;
  for (let i = 0; i < count; i++) furthest = Math.max(furthest, ((signal[i] ?? 0) - first) / factor);
  let used = 0;
  while (
    used < count &&
    (used < FEWEST_EARLY_POINTS || ((signal[used] ?? 0) - first) / factor < EARLY_PART * furthest)
  )
    used++;
  let meanTime = 0;
  let meanExtent = 0;
  for (let i = 0; i < used; i++) {
    meanTime += (time[i] ?? 0) / used;
    meanExtent += ((signal[i] ?? 0) - first) / factor / used;
  }
  let above = 0;
  let below = 0;
  for (let i = 0; i < used; i++) {
    const t = (time[i] ?? 0) - meanTime;
    above += t * (((signal[i] ?? 0) - first) / factor - meanExtent);
    below += t * t;
  }
  const rate = above / below;
  if (!(rate > 0) || !Number.isFinite(rate)) return null;
  const before = rate * ((time[0] ?? 0) - (run.timeZero?.value ?? 0));
  const extent = Math.min(Math.max(0, meanExtent + before), 0.9 * run.most);
  return { logRate: Math.log(rate), extent };
}

/** θ from the early rates with the law's parameters started at `parameters`; `refined` lets orders follow the rates. */
export function startFromRates(
  study: PreparedStudy,
  rates: readonly EarlyRate[],
  parameters: readonly number[],
  refined: boolean,
): Float64Array {
  const p = parameterCount(study);
  const q = parameters.length;
  const theta = new Float64Array(p);
  for (let j = 0; j < q; j++) theta[1 + j] = parameters[j] ?? 0;
  if (scalePlace(study) >= 0) theta[scalePlace(study)] = 1;
  const rows = logRateRows(study, rates, theta);
  if (rows.length === 0) {
    theta[0] = timescale(study, theta);
    return theta;
  }
  const gram = new Float64Array((1 + q) * (1 + q));
  const gradient = new Float64Array(1 + q);
  for (const { gap, derivatives } of rows)
    for (let a = 0; a <= q; a++) {
      gradient[a] = (gradient[a] ?? 0) + (derivatives[a] ?? 0) * gap;
      for (let b = 0; b <= q; b++)
        gram[a * (1 + q) + b] = (gram[a * (1 + q) + b] ?? 0) + (derivatives[a] ?? 0) * (derivatives[b] ?? 0);
    }
  const held = new Uint8Array(1 + q);
  for (let j = 0; j < q; j++) {
    const isOrder = Number.isFinite(study.law.largestSteps[j] ?? 0);
    held[1 + j] = refined && isOrder ? 0 : 1;
    const place = (1 + j) * (1 + q) + 1 + j;
    gram[place] = (gram[place] ?? 0) + SLOPE_DEVIATION ** 2;
  }
  const step = new Float64Array(1 + q);
  new NormalStep(1 + q).solve(gram, gradient, 0, held, step);
  for (let a = 0; a <= q; a++) theta[a] = (theta[a] ?? 0) + (step[a] ?? 0);
  for (let j = 0; j < q; j++) {
    const [low, high] = study.law.bounds[j] ?? [0, 0];
    theta[1 + j] = Math.min(high, Math.max(low, theta[1 + j] ?? 0));
  }
  return theta;
}

/** ln v − ln f and ∂ln(kf)/∂θ of every run with an early rate at which the law has one too. */
function logRateRows(study: PreparedStudy, rates: readonly EarlyRate[], theta: Float64Array) {
  return rates.flatMap(({ run, logRate, extent }) => {
    const derivatives = logRateDerivatives(study, run, extent, theta);
    return derivatives === null
      ? []
      : [{ gap: logRate - derivatives.logRate, derivatives: derivatives.byTheta }];
  });
}

function logRateDerivatives(
  study: PreparedStudy,
  index: number,
  extent: number,
  theta: Float64Array,
): { logRate: number; byTheta: Float64Array } | null {
  const { law } = study;
  const run = study.runs[index];
  if (run === undefined) return null;
  const q = law.free.length;
  law.begin(run.concentrations, theta.subarray(1, 1 + q));
  const y = new Float64Array(1 + q);
  const derivative = new Float64Array(1 + q);
  y[0] = extent;
  if (!law.evaluate(y, derivative)) return null;
  const rate = derivative[0] ?? 0;
  if (!(rate > 0)) return null;
  const byTheta = new Float64Array(theta.length);
  byTheta[0] = 1;
  for (let j = 0; j < q; j++)
    byTheta[1 + j] = (derivative[1 + j] ?? 0) / (law.sensitivity === "integral" ? 1 : rate);
  return { logRate: Math.log(rate), byTheta };
}

/** ∂ln(rate)/∂θ in the mean of the runs that react at the start. */
export function meanLogRateDerivatives(study: PreparedStudy, theta: Float64Array): Float64Array {
  const sum = new Float64Array(theta.length);
  let count = 0;
  study.runs.forEach((_, index) => {
    const found = logRateDerivatives(study, index, 0, theta);
    if (found === null) return;
    count++;
    for (let i = 0; i < theta.length; i++) sum[i] = (sum[i] ?? 0) + (found.byTheta[i] ?? 0);
  });
  for (let i = 0; i < theta.length; i++) sum[i] = (sum[i] ?? 0) / Math.max(1, count);
  sum[0] = 1;
  return sum;
}

/** ln k by which half of the extent seen is reached in half the time: where no slope can be read. */
function timescale(study: PreparedStudy, theta: Float64Array): number {
  const found: number[] = [];
  study.runs.forEach((run, index) => {
    const at = logRateDerivatives(study, index, 0, theta);
    const end = run.time[run.time.length - 1] ?? 0;
    if (at !== null && end > 0) found.push(Math.log(run.span / end) - at.logRate);
  });
  return found.length === 0 ? 0 : mean(found);
}
