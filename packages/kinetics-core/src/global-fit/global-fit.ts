import type { PriorInformation, RandomRateInference, RunInformation } from "kinetics-core/inference";
import type { ConcentrationUnit, Estimate, Flag, TimeUnit, Uncertain } from "kinetics-core/quantities";
import type { RateEquation } from "kinetics-core/rate-equation";
import type { StudySpecies } from "./course-law";

/** The shapes of a law fitted to all traces of a study at once. Field names are those of the public compute API. */

/** The rate law: powers of concentrations, or any other equation with some of its parameters held by name. */
export type GlobalFitLaw =
  | { readonly orders: Readonly<Record<string, "free" | number>> }
  | { readonly equation: RateEquation; readonly held?: Readonly<Record<string, number>> };

export interface GlobalFitRun {
  readonly label: string;
  /** Of every species of the study, at the time of mixing; ≥ 0. */
  readonly concentrations: Readonly<Record<string, number>>;
  /** Since mixing: ≥ 0, strictly increasing, at least 4. */
  readonly time: ArrayLike<number>;
  readonly signal: ArrayLike<number>;
  /** Signal after the reaction, as one more observation; without an uncertainty it is as good as one reading. */
  readonly endSignal?: { readonly value: number; readonly standardUncertainty: number | null };
  /** Time of mixing on the clock of `time` where it is not known exactly. */
  readonly timeZero?: Uncertain;
}

export interface GlobalFitInput {
  readonly species: readonly StudySpecies[];
  /** The species that the signal follows; its stoichiometric number is not 0. */
  readonly followed: string;
  /** ε·l, shared by all runs: one observation. `standardUncertainty: 0` holds it. */
  readonly signalPerConcentration: Uncertain;
  /** Standard deviation of a run's own relative departure from ε·l; 0 (none) where absent. */
  readonly scaleDeviation?: number;
  readonly runs: readonly GlobalFitRun[];
  readonly law: GlobalFitLaw;
  /** Default mol/L. */
  readonly concentrationUnit?: ConcentrationUnit;
  /** Default s. */
  readonly timeUnit?: TimeUnit;
  /** Confidence level of every interval, default 0.95. */
  readonly level?: number;
}

export interface GlobalFitOptions {
  /** Where the search begins, beside the start that is read from the traces. Free parameters by name. */
  readonly start?: {
    readonly logRateConstant?: number;
    readonly parameters?: Readonly<Record<string, number>>;
  };
  /** Asked between passes over the data; true ends the fit with status "stopped". */
  readonly shouldStop?: () => boolean;
}

/** What the pooled fit says of the parameters: every reading independent, no scatter between runs. */
export interface PooledEstimates {
  readonly parameters: Readonly<Record<string, Estimate>>;
  readonly orders: Readonly<Record<string, Estimate>>;
  readonly logRateConstant: Estimate;
}

export interface FittedRun {
  readonly label: string;
  /** ln k of the run alone, at the shared parameters. */
  readonly logRateConstant: Estimate;
  /** Signal where the followed species has none left. */
  readonly offset: number | null;
  readonly residualStandardDeviation: number | null;
  readonly autocorrelation: number;
  readonly points: number;
}

export interface UndeterminedCombination {
  /** Σ coefficient · parameter that the traces leave open; "ln k" stands for the logarithm of the rate constant. */
  readonly combination: Readonly<Record<string, number>>;
  readonly message: string;
}

export type GlobalFitFailureStatus =
  | "bad-input"
  | "too-few-points"
  | "no-change"
  | "wrong-direction"
  | "exhausted-at-first-reading"
  | "not-determined"
  | "no-course"
  | "not-converged"
  | "beyond-precision"
  | "stopped";

export interface GlobalFitFailure {
  readonly status: GlobalFitFailureStatus;
  /** Which argument, dotted: "runs.2.time". */
  readonly path: string;
  readonly message: string;
  /** Only for "not-determined". */
  readonly undetermined: readonly UndeterminedCombination[];
}

export interface GlobalFit {
  readonly status: "fitted";
  /** Free parameters of the law by name; an order goes by its species where the law is one of powers. */
  readonly parameters: Readonly<Record<string, Estimate>>;
  /** Of every species of a law of powers, held ones without an uncertainty; empty for other equations. */
  readonly orders: Readonly<Record<string, Estimate>>;
  readonly logRateConstant: Estimate;
  /** k at 1 (concentration unit). `unit` is null where the equation gives k none. */
  readonly rateConstant: Estimate & { readonly unit: string | null };
  /** ε·l after the fit. */
  readonly signalPerConcentration: Estimate;
  /** τ: standard deviation of ln k between runs; null where there are too few runs to tell. */
  readonly betweenRunStandardDeviation: number | null;
  /** m − r behind the intervals. */
  readonly degreesOfFreedom: number;
  /** Names and order of `covariance`: "ln k", the free parameters, "scale" (the ratio of ε·l to the stated value). */
  readonly parameterNames: readonly string[];
  /** Null where there is no uncertainty. */
  readonly covariance: readonly (readonly number[])[] | null;
  readonly pooled: PooledEstimates;
  readonly runs: readonly FittedRun[];
  /** Of one reading, every run with its own ln k. */
  readonly residualStandardDeviation: number | null;
  /** Passes over all readings. */
  readonly iterations: number;
  readonly flags: readonly Flag[];
  /** The linearised problem at the answer, for profiles, robust errors and comparisons. */
  readonly information: readonly RunInformation[];
  readonly priors: readonly PriorInformation[];
  readonly inference: RandomRateInference;
  /** r: parameters that only differences between runs determine. */
  readonly undeterminedWithinRuns: number;
}

export type GlobalFitResult = GlobalFit | GlobalFitFailure;

export function failure(
  status: GlobalFitFailureStatus,
  path: string,
  message: string,
  undetermined: readonly UndeterminedCombination[] = [],
): GlobalFitFailure {
  return { status, path, message, undetermined };
}
