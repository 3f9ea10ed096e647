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
  readonly start?: { readonly logRateConstant?: number; readonly parameters?: Readonly<Record<string, number>> };
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

export interface Refusal {
  readonly status: "refused";
  readonly failure: GlobalFitFailure;
}

export function failure(
  status: GlobalFitFailureStatus,
  path: string,
  message: string,
  undetermined: readonly UndeterminedCombination[] = [],
): GlobalFitFailure {
  return { status, path, message, undetermined };
}

export type { Flag };
