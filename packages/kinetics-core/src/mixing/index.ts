export { type ConcentrationPlace, concentrationBudget, concentrationCovariance } from "./covariance";
export { forRateLaw, type RateLawMixtures } from "./for-rate-law";
export { mixRuns } from "./mix-runs";
export type {
  Composition,
  Device,
  ErrorSource,
  MeasuredVolume,
  MixedRow,
  MixedSolution,
  Mixing,
  MixingInput,
  MixingRefusal,
  Portion,
  RefusedRow,
  RunMixture,
  Solute,
  Stock,
  Total,
} from "./mixing";
