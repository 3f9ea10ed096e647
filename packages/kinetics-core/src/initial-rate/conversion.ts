import { orthonormalPolynomials, polynomialsAt, projectOn } from "kinetics-core/least-squares";
import { LEAST_WINDOW_POINTS, POLYNOMIAL_CONVERSION_END } from "./constants";
import type { Readings } from "./readings";

/** How far a trace has come: signal at mixing, and which way the reaction moves it. */
export interface Progress {
  readonly start: number;
  /** +1 where the signal rises with conversion, −1 where it falls. */
  readonly direction: 1 | -1;
  /** Signal change at complete conversion, > 0. */
  readonly span: number;
}

/**
 * The signal at mixing comes from a quadratic over the readings up to 45 % conversion, which in turn are found
 * from a first guess (mean of the first three readings). `readings`: at least 3.
 */
export function progressOf(readings: Readings, span: number): Progress {
  const { time, signal } = readings;
  const guess = ((signal[0] ?? Number.NaN) + (signal[1] ?? Number.NaN) + (signal[2] ?? Number.NaN)) / 3;
  let excess = 0;
  for (const value of signal) excess += value - guess;
  const direction = excess < 0 ? -1 : 1;
  const early = Math.max(
    pointsTo(readings, { start: guess, direction, span }, POLYNOMIAL_CONVERSION_END),
    Math.min(LEAST_WINDOW_POINTS, time.length),
  );
  const basis = orthonormalPolynomials(time, 0, early, 2);
  const projections = projectOn(basis, signal, 0);
  const { values } = polynomialsAt(basis.recurrence, 0);
  const start = values.reduce((sum, value, j) => sum + value * (projections[j] ?? Number.NaN), 0);
  return { start, direction, span };
}

/** Readings at the end whose median says how far the trace came. */
const LAST_READINGS = 5;

/** Conversion at the end of the trace; beyond 1 where the signal changes by more than `span`. */
export function reachedBy({ signal }: Readings, { start, direction, span }: Progress): number {
  const last = signal.slice(-LAST_READINGS).sort();
  const middle = last.length >> 1;
  const upper = last[middle] ?? Number.NaN;
  const end = last.length % 2 === 1 ? upper : ((last[middle - 1] ?? Number.NaN) + upper) / 2;
  return ((end - start) * direction) / span;
}

/**
 * Number of readings up to a conversion. Noise crosses a threshold many times, so the end is where a cut best
 * separates readings below it from readings above it: the least number of readings on the wrong side. On a
 * noiseless monotone trace that is the last reading at or below the conversion. Complete conversion (≥ 1) and
 * conversions that are never reached mean the whole trace.
 */
export function pointsTo(readings: Readings, progress: Progress, conversion: number): number {
  const { signal } = readings;
  if (conversion >= 1) return signal.length;
  const limit = conversion * progress.span;
  let score = 0;
  let best = 0;
  let count = 0;
  for (let i = 0; i < signal.length; i++) {
    const change = ((signal[i] ?? Number.NaN) - progress.start) * progress.direction;
    score += change <= limit ? 1 : -1;
    if (score > best) {
      best = score;
      count = i + 1;
    }
  }
  return count;
}
