export { confidenceBand, predictionBand } from "./bands";
export { type Calibration, calibrate, type ReadingFault } from "./calibrate";
export type {
  CalibrateInput,
  CalibrationFault,
  CalibrationInput,
  CalibrationLine,
  Standard,
} from "./calibration";
export { type Curvature, testCurvature } from "./curvature";
export {
  criticalConcentration,
  type DetectionLimits,
  detectionLimits,
  quantificationConcentration,
} from "./detection-limits";
export { estimateOfRatio, fieller, type Ratio, type RatioOfEstimates, type RatioSet } from "./fieller";
export { fitCalibrationLine, signalAt } from "./fit-calibration-line";
export {
  type ConcentrationReading,
  readConcentration,
  readingOf,
  type SignalReading,
  standardAdditions,
} from "./inverse-reading";
export {
  type CalibrationLackOfFit,
  type PureError,
  pureErrorOf,
  testLackOfFit,
  unevenScatter,
} from "./lack-of-fit";
export {
  type LinearRange,
  linearRange,
  linearRangeFlags,
  type Straightness,
  straightnessAt,
} from "./linear-range";
export { partWithoutCurvature } from "./part-without-curvature";
