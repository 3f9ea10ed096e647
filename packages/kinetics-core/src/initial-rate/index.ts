export type {
  Estimator,
  EstimatorPair,
  FittedCurve,
  InitialRate,
  InitialRateFound,
  InitialRateOptions,
  SlopeEstimate,
  StudyRule,
  StudyRuleChoice,
  StudyTrace,
  Trace,
} from "./initial-rate";
