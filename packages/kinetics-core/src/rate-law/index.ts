export type {
  AddedVariable,
  RateConstant,
  RateLawFit,
  RateLawInput,
  RateLawResult,
  RateLawRun,
  SharedUncertainty,
  SimpleOrderReading,
} from "./rate-law";
