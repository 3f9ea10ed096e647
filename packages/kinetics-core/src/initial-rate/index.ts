export { chooseFromSurveys, chooseStudyRule } from "./choose-study-rule";
export { estimateInitialRate } from "./estimate-initial-rate";
export { evaluateCurve } from "./evaluate-curve";
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
export { type SlopeAtEnd, slopeAgainstWindowEnd } from "./slope-against-window-end";
export { surveyTrace, type TraceSurvey } from "./survey-trace";
export { type TraceNoise, traceNoise } from "./trace-noise";
