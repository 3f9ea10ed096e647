import type { InitialRate, StudyRuleChoice } from "kinetics-core/initial-rate";
import type { RateLawResult } from "kinetics-core/rate-law";

/**
 * What the sheet amounts to: every run's rate, the law that stands on them, and what a reader should beware of.
 * Stations, the shared page and the API read this and never compute another way. Internal units: mol L⁻¹, s, K.
 */
export interface StudyAnalysis {
  /** SHA-256 over the inputs and the core's version: equal hashes, equal analysis. */
  readonly hash: string;
  readonly rule: StudyRuleChoice | null;
  readonly runs: readonly RunAnalysis[];
  readonly law: LawAnalysis;
  readonly checks: readonly Check[];
}

export interface RunAnalysis {
  readonly runId: string;
  readonly label: string;
  /** `standing` runs carry the law; `without-rate` have neither trace nor entered rate, or one that is unusable. */
  readonly state: "standing" | "set-aside" | "without-rate";
  readonly rate: RunRate;
  readonly mark: RunMark;
}

export type RunRate =
  | {
      readonly kind: "estimated";
      /** Rate of reaction, v = (1/ν) dc/dt, in mol L⁻¹ s⁻¹, private uncertainty only (ε·l is shared). */
      readonly molarPerSecond: number;
      readonly standardError: number;
      /** The estimate on the signal's own scale, for drawing. `status` is always "found" here. */
      readonly initialRate: Extract<InitialRate, { status: "found" }>;
      readonly byHand: boolean;
    }
  | { readonly kind: "entered"; readonly molarPerSecond: number; readonly standardError: number | null }
  /** `reason` is a sentence with the way out. */
  | { readonly kind: "none"; readonly reason: string };

/** One mark per run, everywhere: which series it belongs to, at which level. Set aside is drawn from `state`. */
export interface RunMark {
  readonly series: "base" | "first" | "second" | "third";
  /** 0-based level within the series and how many levels there are; 0 of 1 for the base recipe. */
  readonly level: number;
  readonly levels: number;
  /** Repeats an earlier run's recipe: same mark, dashed trace. */
  readonly repeat: boolean;
}

export type LawAnalysis =
  | { readonly status: "law"; readonly fit: Extract<RateLawResult, { status: "fitted" }> }
  /** `missing` says what is needed before there can be a law; `fit` what is known all the same, if anything. */
  | {
      readonly status: "no-law";
      readonly missing: string;
      readonly fit: Extract<RateLawResult, { status: "fitted" }> | null;
    };

export type CheckSeverity = "blocks" | "weakens" | "note" | "holds";

export interface Check {
  readonly code: string;
  readonly severity: CheckSeverity;
  readonly station: "set-up" | "standards" | "runs" | "rates" | "rate-law";
  readonly runId: string | null;
  readonly message: string;
  /** Somebody answered it (a run set aside): drawn grey, says who and why. */
  readonly settled: string | null;
  /** Of a run's note, how it goes on after the labels of several runs: pages on the whole study say it once. */
  readonly ofSeveral?: string;
}
