export { quadraticForm, stepCorrelations } from "./autoregressive-noise";
export { chooseFromSurveys, chooseStudyRule } from "./choose-study-rule";
export { countedReadings, type NotCounted, type TraceCounts, whyNotCounted } from "./counted-readings";
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
export { type ProposedSpikes, proposeSpikes } from "./propose-spikes";
export { type Readings, type RefusedTrace, readingsOf } from "./readings";
export { type SlopeAtEnd, slopeAgainstWindowEnd } from "./slope-against-window-end";
export { surveyTrace, type TraceSurvey } from "./survey-trace";
export { type TraceNoise, traceNoise } from "./trace-noise";
