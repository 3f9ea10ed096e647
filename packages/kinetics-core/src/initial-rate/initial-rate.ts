import type { Flag } from "kinetics-core/quantities";

/**
 * The shapes of an initial-rate estimate. Time and signal are in whatever units the caller keeps; slopes come
 * back in signal per time. The slope is signed: the caller turns it into a rate of reaction, v = (1/ν) dc/dt.
 */

/** `time` strictly increasing, same length as `signal`. */
export interface Trace {
  readonly time: ArrayLike<number>;
  readonly signal: ArrayLike<number>;
}

export type Estimator = "straight" | "tangent" | "exponential" | "integrated";

/** Nested pairs lower→upper: their disagreement measures the bias of the lower (rules of the library, section 1). */
export type EstimatorPair = "line-quadratic" | "quadratic-cubic" | "cubic-quartic" | "exponential-general";

export interface InitialRateOptions {
  /** Time of mixing, in the unit of `time`; slopes are taken here. Default 0. */
  readonly timeZero?: number;
  /** Signal change at complete conversion, absolute. Without it conversions are null and a quadratic on all points is reported. */
  readonly signalSpan?: number;
  readonly estimator?: "auto" | Estimator;
  /** Fix the window by hand, in the unit of `time`; the estimator then uses exactly these points. */
  readonly window?: readonly [number, number];
  /** Degree for `estimator: "tangent"`: 2, 3 or 4. Default 2. */
  readonly degree?: 2 | 3 | 4;
  /** The study's rule: use this pair up to this conversion end instead of choosing. */
  readonly rule?: StudyRule;
  readonly level?: number;
}

/** One window and pair for all runs of a study, chosen by conversion and never by clock. */
export interface StudyRule {
  readonly conversionEnd: number;
  readonly pair: EstimatorPair;
}

/** Curve to draw: S(t) about the time of mixing, `t` = time − timeZero. */
export type FittedCurve =
  | { readonly kind: "polynomial"; readonly coefficients: readonly number[] }
  | {
      readonly kind: "exponential";
      readonly start: number;
      readonly span: number;
      readonly rateConstant: number;
    }
  | {
      readonly kind: "general-order";
      readonly start: number;
      readonly span: number;
      readonly rateConstant: number;
      readonly order: number;
    };

/** One estimator on one window. */
export interface SlopeEstimate {
  readonly estimator: Estimator;
  readonly degree: number | null;
  readonly slope: number;
  readonly standardError: number;
  readonly window: readonly [number, number];
  readonly points: number;
  readonly conversion: number | null;
  readonly curve: FittedCurve;
}

export interface InitialRateFound {
  readonly status: "found";
  /** Signal per time at mixing, signed. */
  readonly slope: number;
  readonly standardError: number;
  readonly interval: readonly [number, number];
  readonly level: number;
  readonly degreesOfFreedom: number;
  readonly estimator: Estimator;
  readonly degree: number | null;
  /** The pair whose upper member is reported; null where no pair was involved (by hand, or too few points). */
  readonly pair: EstimatorPair | null;
  /** First and last time used, in the caller's clock. */
  readonly window: readonly [number, number];
  readonly points: number;
  readonly conversion: number | null;
  /** Conversion at the end of the trace, from the median of its last five readings; null without a span. May exceed 1. */
  readonly reached: number | null;
  /** σ of one reading and lag-one autocorrelation ρ of the noise, from the whole trace. */
  readonly noise: number;
  readonly autocorrelation: number;
  readonly effectivePoints: number;
  readonly curve: FittedCurve;
  /** What the other estimators say, side by side. */
  readonly alternatives: readonly SlopeEstimate[];
  readonly flags: readonly Flag[];
}

export type InitialRate =
  | InitialRateFound
  | {
      readonly status: "too-few-points";
      readonly needed: number;
      readonly got: number;
      readonly message: string;
    }
  | {
      readonly status: "unusable";
      readonly code:
        | "not-increasing"
        | "not-finite"
        | "lengths-differ"
        | "empty-window"
        | "flat-time"
        /** The estimator asked for by name has no slope at mixing that these readings fix. */
        | "no-slope";
      readonly message: string;
    };

/** A run as `chooseStudyRule` wants it. */
export interface StudyTrace {
  readonly label: string;
  readonly trace: Trace;
  readonly timeZero: number;
  readonly signalSpan: number | null;
}

export interface StudyRuleChoice {
  readonly rule: StudyRule;
  /** Criterion of every (conversion end, pair) that was compared, least first; the first is `rule`. */
  readonly compared: readonly (StudyRule & { readonly criterion: number; readonly runs: number })[];
  /** One sentence for the page: what was chosen and why. */
  readonly reason: string;
}
