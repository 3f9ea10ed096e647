import { studentTFactor } from "kinetics-core/distributions";
import { estimateFlags } from "./estimate-flags";
import { evaluateCurve } from "./evaluate-curve";
import type { InitialRate, InitialRateOptions, Trace } from "./initial-rate";
import { type PreparedTrace, prepareTrace } from "./prepared-trace";
import { type Selected, selectByRule, selectFreely, selectOnWindow } from "./select-slope";

/**
 * Initial rate of one trace: the slope of the signal at the time of mixing, with a standard error that counts
 * the noise of neighbouring readings as correlated and the curvature of the trace as a possible bias.
 *
 * `trace`: times strictly increasing, 5 readings or more at or after `timeZero`; any units, which come back in
 * the slope. Never throws on data: `unusable` names the reading at fault, `too-few-points` what is needed.
 */
export function estimateInitialRate(trace: Trace, options: InitialRateOptions = {}): InitialRate {
  const level = options.level ?? 0.95;
  if (!(level > 0 && level < 1)) throw new RangeError("A confidence level lies between 0 and 1");
  const prepared = prepareTrace(trace, options);
  if (prepared.status === "too-few-points") return tooFew(prepared);
  if (prepared.status === "unusable") return prepared;

  const selected = select(prepared, options);
  if (selected.status === "unusable") return selected;
  if (selected.status === "too-few-points") return tooFew(selected);

  const { slope, standardError, shown, pair } = selected;
  const { readings, noise, progress } = prepared;
  const curve = shown.curve();
  const first = readings.time[shown.from] as number;
  const last = readings.time[shown.to - 1] as number;
  const half = standardError * studentTFactor(level, noise.degreesOfFreedom);
  const change = Math.abs(evaluateCurve(curve, last) - evaluateCurve(curve, 0));
  return {
    status: "found",
    slope,
    standardError,
    interval: [slope - half, slope + half],
    level,
    degreesOfFreedom: noise.degreesOfFreedom,
    estimator: shown.estimator,
    degree: shown.degree,
    pair,
    window: [first + readings.timeZero, last + readings.timeZero],
    points: shown.to - shown.from,
    conversion: progress ? change / progress.span : null,
    noise: noise.standardDeviation,
    autocorrelation: noise.autocorrelation,
    effectivePoints: noise.effectivePoints,
    curve,
    alternatives: [],
    flags: [...selected.flags, ...estimateFlags(prepared, slope, standardError, first)],
  };
}

function select(
  prepared: PreparedTrace,
  options: InitialRateOptions,
): Selected | Extract<InitialRate, { status: "unusable" }> {
  if (options.estimator !== undefined && options.estimator !== "auto") {
    throw new RangeError(`The estimator ${options.estimator} cannot be asked for by name`);
  }
  if (options.window) {
    const [start, end] = options.window;
    const { time, timeZero } = prepared.readings;
    const from = firstAtOrAfter(time, start - timeZero);
    const to = firstAfter(time, end - timeZero);
    if (to <= from) {
      return {
        status: "unusable",
        code: "empty-window",
        message: `No reading at or after mixing lies between ${start} and ${end}; move the ends of the window.`,
      };
    }
    return selectOnWindow(prepared, from, to);
  }
  return options.rule ? selectByRule(prepared, options.rule) : selectFreely(prepared);
}

function firstAtOrAfter(time: Float64Array, limit: number): number {
  const index = time.findIndex((t) => t >= limit);
  return index < 0 ? time.length : index;
}

function firstAfter(time: Float64Array, limit: number): number {
  const index = time.findIndex((t) => t > limit);
  return index < 0 ? time.length : index;
}

function tooFew({ needed, got }: { needed: number; got: number }): InitialRate {
  return {
    status: "too-few-points",
    needed,
    got,
    message:
      got === 0
        ? "No reading lies at or after the time of mixing; check the time zero of this run."
        : `The estimate needs ${needed} readings at or after mixing and has ${got}; widen the window or add readings.`,
  };
}
