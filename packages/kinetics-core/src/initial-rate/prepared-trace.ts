import { type Progress, progressOf } from "./conversion";
import type { InitialRateOptions, Trace } from "./initial-rate";
import { type Readings, type RefusedTrace, readingsOf } from "./readings";
import { type NoiseModel, noiseOf } from "./trace-noise";

/** A trace with everything that every estimator needs, read once. */
export interface PreparedTrace {
  readonly readings: Readings;
  readonly noise: NoiseModel;
  /** Null where the signal change at complete conversion is not known. */
  readonly progress: Progress | null;
  /** Room for the polynomial columns of any window up to degree 4. */
  readonly scratch: Float64Array;
}

/** Readings that even a straight line by hand needs: two parameters and two to spare. */
const LEAST_READINGS = 4;

/** Of signals up to 1e60 these leave a conversion that is a number; a span outside counts as not known. */
const SMALLEST_SPAN = 1e-60;
const LARGEST_SPAN = 1e60;

export function prepareTrace(
  trace: Trace,
  options: Pick<InitialRateOptions, "timeZero" | "signalSpan">,
):
  | ({ readonly status: "prepared" } & PreparedTrace)
  | RefusedTrace
  | { readonly status: "too-few-points"; readonly needed: number; readonly got: number } {
  const readings = readingsOf(trace, options.timeZero ?? 0);
  if (readings.status !== "usable") return readings;
  const got = readings.time.length;
  if (got < LEAST_READINGS) return { status: "too-few-points", needed: LEAST_READINGS, got };
  const span = options.signalSpan;
  const known = span !== undefined && span >= SMALLEST_SPAN && span <= LARGEST_SPAN;
  return {
    status: "prepared",
    readings,
    noise: noiseOf(readings),
    progress: known ? progressOf(readings, span) : null,
    scratch: new Float64Array(got * 5),
  };
}
