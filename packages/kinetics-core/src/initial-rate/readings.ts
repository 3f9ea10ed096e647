import { type Drift, driftBefore } from "./drift-before-mixing";
import type { InitialRate, Trace } from "./initial-rate";

/** A trace that has been checked, on a clock that starts at mixing. */
export interface Readings {
  /** Time since mixing, strictly increasing, all ≥ 0. */
  readonly time: Float64Array;
  /** Above `offset`. */
  readonly signal: Float64Array;
  /**
   * First signal at or after mixing. Slopes do not depend on it, and without it a detector that stands still gives a
   * slope of exactly 0 rather than a rounding error that a logarithm would take for a rate.
   */
  readonly offset: number;
  /** Readings before mixing, which were left out. */
  readonly before: number;
  /** What they do; null where they are too few to say. */
  readonly drift: Drift | null;
  readonly timeZero: number;
}

export type RefusedTrace = Extract<InitialRate, { status: "unusable" }>;

/**
 * Checks a trace and puts it on the clock of mixing. Returns `unusable` with a sentence that names the reading
 * (counted from 1) for lengths that differ, numbers that are not finite or beyond 1e60, and times that do not
 * increase by 1e-9 of the trace at least. Readings before `timeZero` are left out and counted.
 */
export function readingsOf(
  trace: Trace,
  timeZero: number,
): ({ readonly status: "usable" } & Readings) | RefusedTrace {
  if (!(Math.abs(timeZero) <= LARGEST_SIZE))
    throw new RangeError(`timeZero is ${timeZero}; the time of mixing is a finite number`);
  const { time, signal } = trace;
  if (time.length !== signal.length) {
    return refused(
      "lengths-differ",
      `There are ${time.length} times but ${signal.length} signals; give every reading both.`,
    );
  }
  const fault = faultOf(time, signal);
  if (fault) return fault;

  let before = 0;
  while (before < time.length && (time[before] ?? Number.NaN) < timeZero) before++;
  const count = time.length - before;
  const shifted = new Float64Array(count);
  const values = new Float64Array(count);
  const offset = signal[before] ?? 0;
  for (let i = 0; i < count; i++) {
    shifted[i] = (time[before + i] ?? Number.NaN) - timeZero;
    values[i] = (signal[before + i] ?? Number.NaN) - offset;
  }
  const drift = driftBefore(trace, before);
  return { status: "usable", time: shifted, signal: values, offset, before, drift, timeZero };
}

/** Squares of signals over squares of times, and what is summed of them, stay within a double (1e308). */
const LARGEST_SIZE = 1e60;
const SHORTEST_TRACE = 1e-60;
/** Of the whole trace: readings closer than this are one for every curve, and fix no slope between them. */
const SHORTEST_STEP = 1e-9;

function faultOf(time: ArrayLike<number>, signal: ArrayLike<number>): RefusedTrace | null {
  for (let i = 0; i < time.length; i++) {
    const t = time[i] ?? Number.NaN;
    const s = signal[i] ?? Number.NaN;
    if (!(Math.abs(t) <= LARGEST_SIZE)) {
      return refused(
        "not-finite",
        `The time of reading ${i + 1} is ${asFound(t)}; correct it or leave it out.`,
      );
    }
    if (!(Math.abs(s) <= LARGEST_SIZE)) {
      return refused(
        "not-finite",
        `The signal of reading ${i + 1}, at time ${t}, is ${asFound(s)}; correct it or leave the reading out.`,
      );
    }
    const order = i === 0 ? null : orderFault(time, i);
    if (order) return order;
  }
  return spacingFault(time);
}

function spacingFault(time: ArrayLike<number>): RefusedTrace | null {
  const span = (time[time.length - 1] ?? 0) - (time[0] ?? 0);
  if (time.length < 2) return null;
  if (!(span >= SHORTEST_TRACE)) {
    return refused(
      "flat-time",
      `All ${time.length} readings lie within ${span} of each other in time; check the unit of the time column.`,
    );
  }
  for (let i = 1; i < time.length; i++) {
    const step = (time[i] ?? Number.NaN) - (time[i - 1] ?? Number.NaN);
    if (step >= SHORTEST_STEP * span) continue;
    return refused(
      "not-increasing",
      `Readings ${i} and ${i + 1}, at times ${time[i - 1]} and ${time[i]}, cannot be told apart in a trace of length ${span}; look for a wrong power of ten among the times.`,
    );
  }
  return null;
}

function asFound(value: number): string {
  return Number.isFinite(value)
    ? `${value} and so beyond what is computed with, ${LARGEST_SIZE.toExponential()}`
    : "not a number";
}

function orderFault(time: ArrayLike<number>, i: number): RefusedTrace | null {
  const t = time[i] ?? Number.NaN;
  const previous = time[i - 1] ?? Number.NaN;
  if (t > previous) return null;
  if (t === previous && isConstant(time)) {
    return refused("flat-time", `All ${time.length} readings have the time ${t}; check the time column.`);
  }
  return refused(
    "not-increasing",
    t === previous
      ? `Readings ${i} and ${i + 1} both have the time ${t}; average them or leave one out.`
      : `Reading ${i + 1}, at time ${t}, comes after time ${previous}; put the readings in order of time.`,
  );
}

function isConstant(values: ArrayLike<number>): boolean {
  for (let i = 1; i < values.length; i++) if (values[i] !== values[0]) return false;
  return true;
}

function refused(code: RefusedTrace["code"], message: string): RefusedTrace {
  return { status: "unusable", code, message };
}
