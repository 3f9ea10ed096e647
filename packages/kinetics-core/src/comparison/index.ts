export type {
  Candidate,
  CandidateParameter,
  ExtensionFact,
  FailedCandidate,
  FittedCandidate,
  LackOfFitTest,
  RateResiduals,
} from "./candidate";
export {
  type ComparedLaw,
  type Comparison,
  type ComparisonInput,
  compareLaws,
  type Reading,
  type Verdict,
} from "./compare-laws";
export type { DurbinWatson } from "./durbin-watson";
export { fitCandidateOnRates } from "./fit-candidate-on-rates";
export type { CandidateRun } from "./rate-problem";
export type { ResidualOrder } from "./residual-order";
export type { LeaveOneOutOpinion } from "./run-level-statistics";
export type { RunsTest } from "./runs-test";
export {
  type AddedTerm,
  extensionByStandardError,
  type TraceFit,
  traceCandidates,
} from "./trace-candidates";
export { traceDisagreement } from "./trace-disagreement";
