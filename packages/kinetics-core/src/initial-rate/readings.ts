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
  readonly timeZero: number;
}

export type RefusedTrace = Extract<InitialRate, { status: "unusable" }>;

/**
 * Checks a trace and puts it on the clock of mixing. Returns `unusable` with a sentence that names the reading
 * (counted from 1) for lengths that differ, numbers that are not finite and times that do not increase.
 * Readings before `timeZero` are left out and counted.
 */
export function readingsOf(
  trace: Trace,
  timeZero: number,
): ({ readonly status: "usable" } & Readings) | RefusedTrace {
  if (!Number.isFinite(timeZero)) throw new RangeError("The time of mixing must be a finite number");
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
  return { status: "usable", time: shifted, signal: values, offset, before, timeZero };
}

function faultOf(time: ArrayLike<number>, signal: ArrayLike<number>): RefusedTrace | null {
  for (let i = 0; i < time.length; i++) {
    const t = time[i] ?? Number.NaN;
    const s = signal[i] ?? Number.NaN;
    if (!Number.isFinite(t)) {
      return refused(
        "not-finite",
        `The time of reading ${i + 1} is not a number; correct it or leave it out.`,
      );
    }
    if (!Number.isFinite(s)) {
      return refused(
        "not-finite",
        `The signal of reading ${i + 1}, at time ${t}, is not a number; correct it or leave the reading out.`,
      );
    }
    if (i === 0) continue;
    const previous = time[i - 1] ?? Number.NaN;
    if (t > previous) continue;
    if (time.length > 1 && t === previous && isConstant(time)) {
      return refused("flat-time", `All ${time.length} readings have the time ${t}; check the time column.`);
    }
    return refused(
      "not-increasing",
      t === previous
        ? `Readings ${i} and ${i + 1} both have the time ${t}; average them or leave one out.`
        : `Reading ${i + 1}, at time ${t}, comes after time ${previous}; put the readings in order of time.`,
    );
  }
  return null;
}

function isConstant(values: ArrayLike<number>): boolean {
  for (let i = 1; i < values.length; i++) if (values[i] !== values[0]) return false;
  return true;
}

function refused(code: RefusedTrace["code"], message: string): RefusedTrace {
  return { status: "unusable", code, message };
}
