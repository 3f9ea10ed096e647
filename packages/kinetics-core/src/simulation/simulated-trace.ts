import type { Trace } from "kinetics-core/initial-rate";

/** Traces of known truth, for tests and for measuring how often an interval covers it. */

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

/** Evenly spaced readings of a reaction of one order, with first-order autoregressive noise. `deviate`: standard normal. */
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

/**
 * Part consumed 1 − c of dc/dτ = −cⁿ from c = 1, in closed form and so independent of what is tested with it; an
 * order below one is exhausted at τ = 1/(1 − n).
 */
function partConsumed(progress: number, order: number): number {
  if (order === 1) return -Math.expm1(-progress);
  const left = Math.max(1 - (1 - order) * progress, 0);
  return 1 - left ** (1 / (1 - order));
}

/** k·t_end that brings a reaction of this order to a conversion: ∫ dc/cⁿ from 1 − X to 1. */
export function progressTo(conversion: number, order: number): number {
  if (order === 1) return -Math.log1p(-conversion);
  return ((1 - conversion) ** (1 - order) - 1) / (order - 1);
}
