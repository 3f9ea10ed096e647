import { uniformFloat64 } from "pure-rand/distribution/uniformFloat64";
import { xoroshiro128plus } from "pure-rand/generator/xoroshiro128plus";
import { partConsumed } from "./general-order";
import type { Trace } from "./initial-rate";

/** Traces of known truth, for tests and for measuring how often an interval covers it. */

/** Standard normal deviates, the same for the same seed (Box and Muller, Ann. Math. Statist. 29 (1958) 610). */
export function normalDeviates(seed: number): () => number {
  const generator = xoroshiro128plus(seed);
  return () => {
    const radius = Math.sqrt(-2 * Math.log1p(-uniformFloat64(generator)));
    return radius * Math.cos(2 * Math.PI * uniformFloat64(generator));
  };
}

export interface SimulatedCourse {
  readonly order: number;
  /** k·t_end: progress at the last reading (see `partConsumed`). */
  readonly progress: number;
  readonly readings: number;
  readonly duration: number;
  readonly start: number;
  readonly span: number;
  /** Standard deviation of one reading and its correlation with the one before. */
  readonly noise: number;
  readonly autocorrelation: number;
}

/** Evenly spaced readings of a reaction of one order, with first-order autoregressive noise. */
export function simulateTrace(course: SimulatedCourse, deviate: () => number): Trace {
  const time = new Float64Array(course.readings);
  const signal = new Float64Array(course.readings);
  const innovation = Math.sqrt(1 - course.autocorrelation ** 2);
  let error = deviate();
  for (let i = 0; i < course.readings; i++) {
    const part = i / (course.readings - 1);
    if (i > 0) error = course.autocorrelation * error + innovation * deviate();
    time[i] = part * course.duration;
    signal[i] =
      course.start + course.span * partConsumed(course.progress * part, course.order) + course.noise * error;
  }
  return { time, signal };
}

/** dS/dt at mixing: span·k, because the part consumed starts with slope k whatever the order. */
export function trueSlope({ span, progress, duration }: SimulatedCourse): number {
  return (span * progress) / duration;
}

/** k·t_end that brings a reaction of this order to a conversion: ∫ dc/cⁿ from 1 − X to 1. */
export function progressTo(conversion: number, order: number): number {
  if (order === 1) return -Math.log1p(-conversion);
  return ((1 - conversion) ** (1 - order) - 1) / (order - 1);
}
