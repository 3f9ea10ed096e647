export { type Banded, type CourseBand, type CourseBandPoint, courseBand } from "./course-band";
export { type FittedLaw, type LawOfFit, lawOfRates, type Prediction } from "./fitted-law";
export type { CourseFault, Mixture } from "./reaction-course";
export {
  decayTimes,
  halfLife,
  type TimeResult,
  type TimeToConversion,
  timeToConversion,
} from "./time-to-conversion";
