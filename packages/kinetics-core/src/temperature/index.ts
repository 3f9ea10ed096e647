export { fitTemperature } from "./fit-temperature";
export { movedLogRateConstant, type RateConstantAtOneTemperature } from "./moved-rate-constant";
export {
  gibbsEnergyOfActivationAt,
  type RateConstantAt,
  rateConstantAt,
  rateConstantBand,
} from "./rate-constant-at";
export type {
  CurvatureTest,
  RateConstantMeasure,
  ReciprocalLine,
  SharedPointUncertainty,
  TemperatureFit,
  TemperatureInput,
  TemperaturePoint,
  TemperatureResult,
  TwoByTwo,
} from "./temperature";
