export { type DevianceAt, leastDeviance } from "./least-deviance";
export { parametersLeftToRuns } from "./parameters-left-to-runs";
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
