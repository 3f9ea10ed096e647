import { COARSE_SETTLED, COARSE_TOLERANCE, MOST_COARSE_PASSES, POOR_FIT } from "./constants";
import type { GlobalFitOptions } from "./global-fit";
import { PooledSearch } from "./pooled-search";
import { type PreparedStudy, thinned } from "./prepared-study";
import { type EarlyRate, earlyRates, meanLogRateDerivatives, startFromRates } from "./starting-values";
import type { StudyPass } from "./study-pass";

/** Where the search of the full traces begins. */
export interface Beginning {
  readonly theta: Float64Array;
  /** ∂ ln(rate)/∂θ at mixing, in the mean of the runs. */
  readonly logRate: Float64Array;
  /** Variance of one reading. */
  readonly noise: number;
}

/** θ found on thinned traces, from the start that fits best; null where no start has a course in every run. */
export function beginning(
  study: PreparedStudy,
  pass: StudyPass,
  options: GlobalFitOptions,
  shouldStop: () => boolean,
): Beginning | null {
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
    const own = pass.ownVariance();
    if (best === null || own < best.own) best = { theta: start, logRate, own };
    if (end === "settled" && own < POOR_FIT * noise && !search.held.includes(1)) break;
  }
  return best === null ? null : { ...best, noise: Math.max(noise, Math.min(best.own, POOR_FIT * noise)) };
}

/** The caller's start, then the law read from the early rates, then the law's own start and whole orders about it. */
function* starts(
  study: PreparedStudy,
  few: PreparedStudy,
  rates: readonly EarlyRate[],
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
