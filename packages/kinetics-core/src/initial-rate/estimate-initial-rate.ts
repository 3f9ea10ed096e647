import { studentTFactor } from "kinetics-core/distributions";
import { reachedBy } from "./conversion";
import { estimateFlags } from "./estimate-flags";
import type { PairFit } from "./estimator-pairs";
import type { InitialRate, InitialRateOptions, SlopeEstimate, Trace } from "./initial-rate";
import { type PreparedTrace, prepareTrace } from "./prepared-trace";
import { type NamedEstimator, readingsNeeded, selectAutomatically, selectByName } from "./select-slope";
import { slopeEstimate } from "./slope-estimate";
import { pairsIn, type Scope, scopeOf } from "./window-scope";

/**
 * Initial rate of one trace: the slope of the signal at the time of mixing, with a standard error that counts
 * the noise of neighbouring readings as correlated and the curvature of the trace as a possible bias.
 *
 * `trace`: times strictly increasing, 5 readings or more at or after `timeZero`; any units, which come back in
 * the slope. Never throws on data: `unusable` names the reading at fault, `too-few-points` what is needed. Throws
 * `RangeError` where a level, window or time of mixing is none.
 */
export function estimateInitialRate(trace: Trace, options: InitialRateOptions = {}): InitialRate {
  const level = options.level ?? 0.95;
  if (!(level > 0 && level < 1))
    throw new RangeError(`level is ${level}; a confidence level lies between 0 and 1`);
  if (options.window?.some(Number.isNaN))
    throw new RangeError(`window is ${options.window.join(" to ")}; its ends are two numbers`);
  const prepared = prepareTrace(trace, options);
  const named = namedBy(options);
  if (prepared.status === "too-few-points") {
    const wanted = readingsNeeded(named ?? { estimator: "tangent", degree: 2 });
    return tooFew({ needed: Math.max(prepared.needed, wanted), got: prepared.got });
  }
  if (prepared.status === "unusable") return prepared;

  const scope = scopeOf(prepared, options);
  if ("status" in scope) return scope;
  const pairs = pairsIn(prepared, scope);
  // A window by hand leaves the study's rule altogether: its pair was chosen for another window.
  const rule = options.window ? undefined : options.rule;
  const selected = named
    ? selectByName(prepared, scope, pairs, named)
    : selectAutomatically(prepared, scope, pairs, rule);
  if (selected.status === "too-few-points") return tooFew(selected);
  if (selected.status === "unusable") return selected;

  const { slope, standardError, shown, pair } = selected;
  const { readings, noise } = prepared;
  const half = standardError * studentTFactor(level, noise.degreesOfFreedom);
  const first = readings.time[shown.from] ?? Number.NaN;
  return {
    status: "found",
    ...slopeEstimate(prepared, shown),
    slope,
    standardError,
    interval: [slope - half, slope + half],
    level,
    degreesOfFreedom: noise.degreesOfFreedom,
    pair,
    reached: prepared.progress && reachedBy(readings, prepared.progress),
    noise: noise.standardDeviation,
    autocorrelation: noise.autocorrelation,
    effectivePoints: noise.effectivePoints,
    alternatives: alternativesOf(prepared, options, scope, pairs),
    flags: [...scope.flags, ...selected.flags, ...estimateFlags(prepared, slope, standardError, first)],
  };
}

function namedBy({ estimator = "auto", degree = 2 }: InitialRateOptions): NamedEstimator | null {
  if (estimator === "auto") return null;
  return { estimator, degree: estimator === "tangent" ? degree : null };
}

/**
 * The four estimators side by side, each on its best window; a window by hand holds for all of them, the
 * study's rule for none. Those with too few readings are absent.
 */
function alternativesOf(
  prepared: PreparedTrace,
  options: InitialRateOptions,
  scope: Scope,
  pairs: readonly PairFit[],
): SlopeEstimate[] {
  const ruled = options.rule !== undefined && options.window === undefined;
  const free = ruled ? scopeOf(prepared, {}) : scope;
  if ("status" in free) return [];
  const freePairs = ruled ? pairsIn(prepared, free) : pairs;
  return SIDE_BY_SIDE.flatMap((named) => {
    const selected = selectByName(prepared, free, freePairs, named);
    if (selected.status !== "selected") return [];
    return [{ ...slopeEstimate(prepared, selected.shown), standardError: selected.standardError }];
  });
}

const SIDE_BY_SIDE: readonly NamedEstimator[] = [
  { estimator: "straight", degree: null },
  { estimator: "tangent", degree: 2 },
  { estimator: "exponential", degree: null },
  { estimator: "integrated", degree: null },
];

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
