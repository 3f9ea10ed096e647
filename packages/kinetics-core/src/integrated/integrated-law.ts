import type { Trace } from "kinetics-core/initial-rate";
import type { ConcentrationUnit, Estimate, Flag, TimeUnit } from "kinetics-core/quantities";
import type { EndSignal } from "./end-signal";
import type { LackOfFit } from "./lack-of-fit";
import type { RefusedCourse } from "./refused-course";

/**
 * The integrated law −dy/dt = k·yⁿ of one trace, y = |S − S_∞| the distance of the measured signal from its end. The
 * signal may fall (a reactant) or rise (a product). k is that of the loss of y on the signal's own scale: no
 * stoichiometric number is divided out, so that for 2 A → P followed by A it is twice the constant of the rate of
 * reaction v = (1/ν_A) dc_A/dt.
 */
export interface IntegratedLawInput extends Trace {
  /** A number holds the order. */
  readonly order: number | "free";
  /** Free where absent. */
  readonly endSignal?: EndSignal;
  /** Time of mixing, in the unit of `time`; `initialSignal` and `halfLife` are counted from there. Default 0. */
  readonly timeZero?: number;
  readonly level?: number;
  /** For the unit of k in words. */
  readonly signalUnit?: ConcentrationUnit;
  readonly timeUnit?: TimeUnit;
}

export interface IntegratedLawFit {
  readonly status: "fitted";
  /** A held order has no standard error and no interval. */
  readonly order: Estimate;
  readonly rateConstant: Estimate & { readonly unit: string };
  /** Natural logarithm of k. */
  readonly logRateConstant: Estimate;
  /** Signal at the time of mixing, extrapolated where the first reading is later. */
  readonly initialSignal: Estimate;
  readonly endSignal: Estimate;
  /** From mixing until half of the initial distance from the end is gone; depends on the start unless n = 1. */
  readonly halfLife: Estimate;
  /** Part of the initial distance that is gone at the last reading; null where the end is not determined. */
  readonly conversion: number | null;
  /** In signal; null with no degree of freedom. */
  readonly residualStandardDeviation: number | null;
  readonly degreesOfFreedom: number;
  readonly autocorrelation: number;
  readonly effectivePoints: number;
  readonly points: number;
  /** n·ln(RSS/n) + 2K + 2K(K + 1)/(n − K − 1), K = parameters + 1; compares orders on the same readings. Null for n ≤ K + 1. */
  readonly aicc: number | null;
  /** Standard error of the order where it is free, or of what it would be if it were. */
  readonly orderStandardError: number | null;
  /** Agreement of an end that is stated with the one that the readings show. */
  readonly endConflict: number | null;
  readonly lackOfFit: LackOfFit | null;
  /** Fitted signal at each reading from mixing on, and its times, in the units given. */
  readonly curve: { readonly time: Float64Array; readonly signal: Float64Array };
  readonly flags: readonly Flag[];
}

export type IntegratedLawResult = IntegratedLawFit | RefusedCourse;
