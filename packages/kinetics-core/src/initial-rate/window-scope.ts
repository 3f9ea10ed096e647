import type { Flag } from "kinetics-core/quantities";
import {
  LEAST_LONG_WINDOW_PART,
  LEAST_LONG_WINDOW_POINTS,
  LEAST_WINDOW_POINTS,
  LONG_CONVERSION_ENDS,
  POLYNOMIAL_CONVERSION_END,
} from "./constants";
import { type Progress, pointsTo } from "./conversion";
import { integratedPairs, type PairFit, polynomialPairs } from "./estimator-pairs";
import type { InitialRate, InitialRateOptions, StudyRule } from "./initial-rate";
import type { PreparedTrace } from "./prepared-trace";
import { geometricWindows } from "./windows";

/** Readings [from, to). */
export interface Window {
  readonly from: number;
  readonly to: number;
}

/** Where estimators may look: one window that is given, or several to choose from. */
export interface Scope {
  /** The whole of what may be used. */
  readonly widest: Window;
  /** Windows of the polynomial pairs; empty where too little is known to compare estimators. */
  readonly polynomial: readonly Window[];
  /** Windows of the pair exponential→general order. */
  readonly integrated: readonly Window[];
  /** What the choice of windows itself has to say. */
  readonly flags: readonly Flag[];
}

/**
 * Windows by the caller's wish: by hand, by the study's rule, or free. With under 8 readings there is nothing to
 * choose, and without a known conversion windows of all lengths compete; the scope says so in a flag.
 */
export function scopeOf(
  prepared: PreparedTrace,
  { window, rule }: Pick<InitialRateOptions, "window" | "rule">,
): Scope | Extract<InitialRate, { status: "unusable" }> {
  if (window) return scopeByHand(prepared, window);
  const { readings, progress } = prepared;
  const widest = { from: 0, to: readings.time.length };
  if (widest.to < LEAST_WINDOW_POINTS) {
    const flag = progress ? fewReadings(widest.to) : CONVERSION_UNKNOWN_AND_FEW;
    return { widest, polynomial: [], integrated: [], flags: [flag] };
  }
  if (!progress) return scopeWithoutConversion(prepared);
  return rule ? scopeByRule(prepared, progress, rule) : freeScope(prepared, progress);
}

/** All pairs that the scope's windows hold, with the integrated ones unjudged (see `isAdequate`). */
export function pairsIn({ readings, noise, scratch }: PreparedTrace, scope: Scope): PairFit[] {
  return [
    ...scope.polynomial.flatMap(({ from, to }) => polynomialPairs(readings, noise, from, to, scratch)),
    ...scope.integrated.flatMap(({ from, to }) => integratedPairs(readings, noise, from, to)),
  ];
}

function freeScope({ readings }: PreparedTrace, progress: Progress): Scope {
  const all = readings.time.length;
  const early = pointsTo(readings, progress, POLYNOMIAL_CONVERSION_END);
  const ends = geometricWindows(readings.time, Math.max(early, LEAST_WINDOW_POINTS));
  const longEnds = new Set(
    LONG_CONVERSION_ENDS.map((conversion) =>
      Math.max(pointsTo(readings, progress, conversion), leastLongWindow(all)),
    ).filter((to) => to <= all),
  );
  return {
    widest: { from: 0, to: all },
    polynomial: ends.map((to) => ({ from: 0, to })),
    integrated: [...longEnds].map((to) => ({ from: 0, to })),
    flags: early < LEAST_WINDOW_POINTS ? [sparseStart(early, POLYNOMIAL_CONVERSION_END)] : [],
  };
}

/**
 * Where nobody says what complete conversion is, the disagreement of the pairs alone keeps bent windows out. In
 * simulation (orders 0 to 2, 5 to 90 % conversion) intervals then cover the truth in 98 %, with half the error of
 * a quadratic over all readings, whose intervals cover it in 67 % (at 90 % conversion in 45 %).
 */
function scopeWithoutConversion({ readings }: PreparedTrace): Scope {
  const all = readings.time.length;
  const widest = { from: 0, to: all };
  return {
    widest,
    polynomial: geometricWindows(readings.time, all).map((to) => ({ from: 0, to })),
    integrated: all >= LEAST_LONG_WINDOW_POINTS ? [widest] : [],
    flags: [CONVERSION_UNKNOWN],
  };
}

/** A run that does not reach the conversion uses its end; a pair's own least number of readings still holds. */
function scopeByRule({ readings }: PreparedTrace, progress: Progress, rule: StudyRule): Scope {
  const reached = pointsTo(readings, progress, rule.conversionEnd);
  const to = pointsByRule(readings.time.length, reached, rule.pair);
  const widest = { from: 0, to };
  const integrated = rule.pair === "exponential-general" && to >= LEAST_LONG_WINDOW_POINTS;
  return {
    widest,
    polynomial: integrated ? [] : [widest],
    integrated: integrated ? [widest] : [],
    flags: reached < to ? [sparseStart(reached, rule.conversionEnd, to)] : [],
  };
}

/** Readings that a pair takes on a run of `all` readings, `reached` of them up to the rule's conversion. */
export function pointsByRule(all: number, reached: number, pair: StudyRule["pair"]): number {
  const least = pair === "exponential-general" ? leastLongWindow(all) : LEAST_WINDOW_POINTS;
  return Math.min(Math.max(reached, least), all);
}

function scopeByHand(
  { readings }: PreparedTrace,
  [start, end]: readonly [number, number],
): ReturnType<typeof scopeOf> {
  const { time, timeZero } = readings;
  const from = countWhile(time, (t) => t < start - timeZero);
  const to = countWhile(time, (t) => t <= end - timeZero);
  if (to <= from) {
    return {
      status: "unusable",
      code: "empty-window",
      message: `No reading at or after mixing lies between ${start} and ${end}; move the ends of the window.`,
    };
  }
  const widest = { from, to };
  const points = to - from;
  const compared = points >= LEAST_WINDOW_POINTS;
  return {
    widest,
    polynomial: compared ? [widest] : [],
    integrated: points >= LEAST_LONG_WINDOW_POINTS ? [widest] : [],
    flags: compared ? [] : [fewReadings(points)],
  };
}

function leastLongWindow(all: number): number {
  return Math.max(LEAST_LONG_WINDOW_POINTS, Math.ceil(all * LEAST_LONG_WINDOW_PART));
}

/** Number of leading times that pass; the times increase, so a bisection finds it. */
function countWhile(time: Float64Array, passes: (time: number) => boolean): number {
  let low = 0;
  let high = time.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (passes(time[middle] ?? Number.NaN)) low = middle + 1;
    else high = middle;
  }
  return low;
}

const CONVERSION_UNKNOWN: Flag = {
  code: "conversion-unknown",
  severity: "weakens",
  message:
    "The signal change at complete conversion is not known, so windows compete up to the whole trace and none is " +
    "held to a conversion; give the calibration and the starting concentration.",
};

const CONVERSION_UNKNOWN_AND_FEW: Flag = {
  ...CONVERSION_UNKNOWN,
  message:
    "The signal change at complete conversion is not known and the readings are few, so all of them are used; " +
    `give the calibration and the starting concentration, and ${LEAST_WINDOW_POINTS} readings or more.`,
};

function fewReadings(points: number): Flag {
  return {
    code: "few-points",
    severity: "weakens",
    message:
      `With ${points} reading${points === 1 ? "" : "s"} there is no choice of estimator; ` +
      `${LEAST_WINDOW_POINTS} or more let the curvature be judged.`,
  };
}

function sparseStart(reached: number, conversionEnd: number, taken: number = LEAST_WINDOW_POINTS): Flag {
  return {
    code: "sparse-start",
    severity: "weakens",
    message:
      `Only ${reached} reading${reached === 1 ? " lies" : "s lie"} below ${Math.round(conversionEnd * 100)} % conversion, ` +
      `so the window takes the first ${taken}; read the start of the run more densely.`,
  };
}
