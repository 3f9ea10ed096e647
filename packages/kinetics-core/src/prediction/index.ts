export {
  type Judgement,
  judgeConfirmation,
  type SealedPrediction,
  type SealRequest,
  type SealResult,
  sealPrediction,
} from "./confirmation";
export { type Banded, type CourseBand, type CourseBandPoint, courseBand } from "./course-band";
export { type FittedLaw, type LawOfFit, lawOfRates, type Prediction } from "./fitted-law";
export { lawOfTraces } from "./law-of-traces";
export { predictRate, type RatePrediction } from "./predict-rate";
export {
  type RatioOfConstants,
  ratioOfRateConstants,
  type StudyConstant,
  studyConstantOf,
} from "./ratio-of-rate-constants";
export type { CourseFault, Mixture } from "./reaction-course";
export {
  decayTimes,
  halfLife,
  type TimeResult,
  type TimeToConversion,
  timeToConversion,
} from "./time-to-conversion";
export {
  type UnknownConcentration,
  type UnknownMixture,
  unknownConcentration,
} from "./unknown-concentration";
