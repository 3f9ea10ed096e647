import type { Estimate } from "kinetics-core/quantities";

/** A candidate rate law with what the runs say about it, as `fitCandidateOnRates` or a fit of traces makes it. */
export interface FittedCandidate {
  readonly status: "fitted";
  readonly id: string;
  /** As messages print it: its law in one line. */
  readonly law: string;
  /** Fitted parameters p, ln k among them. */
  readonly parameters: number;
  /** Σ w r² of ln v over the runs, w the weights that all candidates have in common; for traces see `traceSquares`. */
  readonly runSquares: number;
  /** Run by run; null where the candidate was fitted to traces. */
  readonly onRates: RateResiduals | null;
  readonly estimates: readonly CandidateParameter[];
  /** Of the law against replicates; null where no recipe was repeated. */
  readonly lackOfFit: LackOfFitTest | null;
  /** How the law turns into simpler ones. */
  readonly extensions: readonly ExtensionFact[];
}

export interface FailedCandidate {
  readonly status: "failed";
  readonly id: string;
  readonly law: string;
  /** Why it cannot be compared, and the way out. */
  readonly message: string;
}

export type Candidate = FittedCandidate | FailedCandidate;

export interface RateResiduals {
  /** ln v − ln v̂ of each run. */
  readonly residuals: readonly number[];
  /** ln v̂. */
  readonly fitted: readonly number[];
  /** ∂ln v̂/∂θ, one column a parameter. */
  readonly sensitivities: readonly ArrayLike<number>[];
  /** ln v of each run less its prediction from the other runs; null where these leave it open. */
  readonly leaveOneOut: readonly (number | null)[];
}

export interface CandidateParameter {
  readonly name: string;
  readonly value: Estimate;
  readonly atBound: boolean;
  /** The whole interval (99 %) lies beyond what the parameter can be. */
  readonly impossible: boolean;
}

export interface LackOfFitTest {
  readonly fStatistic: number;
  readonly degreesOfFreedom: readonly [number, number];
  readonly pValue: number;
}

/** With `parameter` at `at` the candidate is the simpler law `law`. */
export interface ExtensionFact {
  /** Text of the simpler law. */
  readonly law: string;
  readonly parameter: string;
  readonly at: number;
  /** √((RSS at the null − RSS)/s²): Student's t of the added term by its profile, m − r degrees of freedom. */
  readonly tStatistic: number;
  readonly degreesOfFreedom: number;
  /** The 95 % interval of the added term contains the null. */
  readonly coversNull: boolean;
  /** "β above 0.03", what the interval excludes although it contains the null; null where it excludes nothing. */
  readonly excludes: string | null;
}
