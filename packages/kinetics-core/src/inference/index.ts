export {
  type BootstrapIntervals,
  type BootstrapRequest,
  type BootstrapResult,
  bootstrapIntervals,
  bootstrapRuns,
} from "./bootstrap-runs";
export { type ClusterRobust, type ClusterRobustResult, clusterRobust } from "./cluster-robust";
export { type DevianceAt, leastDeviance } from "./least-deviance";
export { type MarginalSquares, marginalSquares } from "./marginal-squares";
export { type ProfileInterval, type ProfileRequest, profileMarginal } from "./profile-marginal";
export {
  type InferenceFailure,
  type InferenceOptions,
  type InferenceResult,
  pooledInference,
  type RandomRateInference,
  type RunRate,
  randomRateInference,
} from "./random-rate-inference";
export type { PriorInformation, RunInformation } from "./run-information";
