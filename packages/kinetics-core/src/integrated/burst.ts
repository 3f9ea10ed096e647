import type { Trace } from "kinetics-core/initial-rate";
import type { Estimate, Flag } from "kinetics-core/quantities";
import type { RefusedCourse } from "./refused-course";

export interface BurstOptions {
  /** Time of mixing, in the unit of `time`. Default 0. */
  readonly timeZero?: number;
  readonly level?: number;
}

export type BurstInput = Trace & BurstOptions;

/**
 * A course that begins with a faster or slower phase and settles to a steady rate,
 *
 *   S = S₀ + v_s·t + (v_0 − v_s)(1 − e^(−λt))/λ,   dS/dt = v_s + (v_0 − v_s)e^(−λt).
 *
 * Rates are slopes of the signal, with its sign. The initial rate of the reaction that a rate law describes is then the
 * steady one, v_s, and not the slope at mixing.
 */
export interface BurstFit {
  readonly status: "found";
  /** `burst`: faster at first; `lag`: slower at first, or backwards. */
  readonly kind: "burst" | "lag";
  /** v_s: what 'initial rate' means for this trace. */
  readonly steadyRate: Estimate;
  /** v_0, at mixing. */
  readonly rateAtMixing: Estimate;
  /** λ, in the reciprocal of the unit of time. */
  readonly phaseRateConstant: Estimate;
  readonly initialSignal: Estimate;
  /** (v_0 − v_s)/λ: by how much the steady line, run back to mixing, misses the initial signal. */
  readonly amplitude: Estimate;
  readonly residualStandardDeviation: number;
  readonly degreesOfFreedom: number;
  readonly autocorrelation: number;
  readonly points: number;
  readonly flags: readonly Flag[];
}

export type BurstResult =
  | BurstFit
  | {
      readonly status: "no-phase";
      /**
       * - `straight`: a straight line is as good.
       * - `depletion`: an ordinary course that slows down towards its end is as good.
       * - `not-over`: the phase lasts to the end of the trace, so that no steady rate is seen.
       * - `not-resolved`: the phase is over before readings show it.
       */
      readonly code: "straight" | "depletion" | "not-over" | "not-resolved";
      readonly message: string;
    }
  | RefusedCourse;
