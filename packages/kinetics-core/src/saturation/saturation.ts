import type { Estimate, Flag } from "kinetics-core/quantities";

/** Rates at several concentrations of one species that is thought to saturate, everything else kept the same. */
export interface SaturationInput {
  /** Not negative, in any one unit. */
  readonly concentrations: readonly number[];
  /** One for each concentration, in any one unit. */
  readonly rates: readonly number[];
  /** Confidence level of the intervals; default 0.95. */
  readonly level?: number;
}

/**
 * v = V c/(K + c) by unweighted least squares of the rates as measured. An estimate is null where the data cannot give
 * it, its interval where the profile does not close; the flags say which and why.
 */
export interface SaturationFit {
  readonly status: "fitted";
  /** V, the rate at saturation, with its profile interval. */
  readonly limitingRate: Estimate;
  /** K, the concentration of half the limiting rate, with its profile interval. */
  readonly halfSaturation: Estimate;
  /** V/K, the slope at low concentration: determined even where V and K apart are not. Profile interval. */
  readonly initialSlope: Estimate;
  /** Of V and K; null without an uncertainty. */
  readonly covariance: readonly (readonly number[])[] | null;
  readonly correlation: number | null;
  readonly residualStandardDeviation: number | null;
  readonly degreesOfFreedom: number;
  /** Measured less fitted. */
  readonly residuals: readonly number[];
  /** Scatter about the curve against scatter between repeats; null without repeats. */
  readonly lackOfFit: LackOfFit | null;
  readonly flags: readonly Flag[];
}

export interface LackOfFit {
  readonly fStatistic: number;
  readonly pValue: number;
  readonly degreesOfFreedom: readonly [number, number];
}

export type SaturationResult =
  | SaturationFit
  | {
      readonly status: "too-few-points" | "bad-input";
      readonly place: keyof SaturationInput;
      readonly message: string;
    };
