import { randomDraws } from "kinetics-core/random";
import { simulateTrace } from "kinetics-core/simulation";
import { estimateInitialRate } from "./estimate-initial-rate";
import type { InitialRateFound, InitialRateOptions, Trace } from "./initial-rate";

/** Traces to test with, and estimates that must be there. */

export function found(trace: Trace, options?: InitialRateOptions): InitialRateFound {
  const result = estimateInitialRate(trace, options);
  if (result.status !== "found") throw new Error(result.message);
  return result;
}

export function traceOf(time: number[], signal: (t: number) => number): Trace {
  return { time, signal: time.map(signal) };
}

export function evenly(readings: number, end: number, start = 0): number[] {
  return Array.from({ length: readings }, (_, i) => start + ((end - start) * i) / (readings - 1));
}

export function codes({ flags }: InitialRateFound): string[] {
  return flags.map((flag) => flag.code);
}

export const noisy = simulateTrace(
  {
    order: 1,
    progress: 1,
    readings: 150,
    duration: 60,
    start: 0.1,
    span: 0.8,
    noise: 0.004,
    autocorrelation: 0.3,
  },
  randomDraws(21).normal,
);
