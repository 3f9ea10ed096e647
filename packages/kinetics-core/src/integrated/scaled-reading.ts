import { type Readings, readingsOf, type Trace } from "kinetics-core/initial-rate";
import type { EndSignal } from "./end-signal";
import type { ScaledEnd } from "./fit-course";
import type { TooFewReadings, UnusableTrace } from "./refused-course";
import type { ScaledTrace } from "./search-course";

/** A checked trace on scales of its own, with the way back: t = firstTime + τ·duration, S = firstSignal + y·range. */
export interface ScaledReadings {
  readonly status: "scaled";
  readonly readings: Readings;
  readonly trace: ScaledTrace;
  readonly end: ScaledEnd;
  readonly duration: number;
  readonly range: number;
  /** Since mixing. */
  readonly firstTime: number;
  readonly firstSignal: number;
}

/** Smaller spans, and larger ones than its reciprocal, leave no room for squares. */
const LEAST_RANGE = 1e-150;

function isOfSomeSize(span: number): boolean {
  return span >= LEAST_RANGE && span <= 1 / LEAST_RANGE;
}

/** An end known to less than this part of the range is exact beside readings that are doubles. */
const EXACT_END = 1e-13;

/** `needed`: as many readings as the fit has parameters. */
export function scaledReadings(
  trace: Trace,
  timeZero: number,
  endSignal: EndSignal,
  needed: number,
): ScaledReadings | UnusableTrace | TooFewReadings {
  const readings = readingsOf(trace, timeZero);
  if (readings.status !== "usable") return readings;
  const { time, signal, offset } = readings;
  const got = time.length;
  if (got < needed) return tooFew(needed, got, readings.before);
  const [firstTime, lastTime] = [time[0] ?? 0, time[got - 1] ?? 0];
  let [low, high] = [0, 0];
  let largest = 0;
  for (const value of signal) {
    low = Math.min(low, value);
    high = Math.max(high, value);
    largest = Math.max(largest, Math.abs(value + offset));
  }
  const [duration, range] = [lastTime - firstTime, high - low];
  if (!isOfSomeSize(duration) || !Number.isFinite(range / LEAST_RANGE)) {
    return {
      status: "unusable",
      code: "not-finite",
      message:
        "Times or signals are too large, or times too close together, to be squared; check the power of ten and the unit.",
    };
  }
  if (!(range > 2 * Number.EPSILON * largest) || range < LEAST_RANGE) {
    return {
      status: "unusable",
      code: "constant-signal",
      message: `All ${got} readings have the signal ${offset}, so nothing reacts that this signal shows; check the signal column.`,
    };
  }
  return {
    status: "scaled",
    readings,
    trace: {
      time: time.map((t) => (t - firstTime) / duration),
      signal: signal.map((value) => value / range),
      rounding: (Number.EPSILON / 2) * (largest / range),
    },
    end: scaledEnd(endSignal, offset, range),
    duration,
    range,
    firstTime,
    firstSignal: offset,
  };
}

function scaledEnd(endSignal: EndSignal, firstSignal: number, range: number): ScaledEnd {
  if (endSignal.kind === "free") return { kind: "free" };
  const value = ((endSignal.kind === "known" ? endSignal.value : 0) - firstSignal) / range;
  const uncertainty = endSignal.kind === "known" ? endSignal.standardUncertainty / range : 0;
  return uncertainty > EXACT_END
    ? { kind: "stated", value, standardUncertainty: uncertainty }
    : { kind: "fixed", value };
}

function tooFew(needed: number, got: number, before: number): TooFewReadings {
  return {
    status: "too-few-points",
    needed,
    got,
    message:
      got === 0 && before > 0
        ? "No reading lies at or after the time of mixing; check the time zero of this run."
        : `The law has ${needed} unknowns and the trace ${got} ${got === 1 ? "reading" : "readings"} at or after mixing; add readings, hold the order or state the end signal.`,
  };
}
