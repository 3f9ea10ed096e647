export {
  AVOGADRO_CONSTANT,
  BOLTZMANN_CONSTANT,
  ELECTRIC_CONSTANT,
  ELEMENTARY_CHARGE,
  GAS_CONSTANT,
  PLANCK_CONSTANT,
  ZERO_CELSIUS,
} from "./constants";
export type { Estimate, Flag, Severity, Uncertain } from "./estimate";
export { estimateOf, exponentialOf, noEstimate } from "./estimate-of";
export {
  type PrintedUncertain,
  type PrintOptions,
  printNumber,
  printUncertain,
  superscript,
} from "./printed-number";
export { concentrationUnitText, rateConstantUnit, rateUnit } from "./rate-constant-unit";
export {
  type ConcentrationUnit,
  concentrationToMolar,
  type MolarUnit,
  molarTo,
  secondsTo,
  type TimeUnit,
  timeToSeconds,
} from "./units";
export { concentrationInWords, inARow, numberInWords, percent, verb } from "./wording";
