export { type AutocatalyticOptions, autocatalyticEquation } from "./autocatalytic-equation";
export { type BackgroundOptions, backgroundEquation } from "./background-equation";
export { type CatalystOptions, catalystEquation } from "./catalyst-equation";
export type { TypicalConcentration } from "./constant-parameter";
export { describeEquation } from "./describe-equation";
export {
  type ExpressionEquation,
  type ExpressionOptions,
  expressionEquation,
} from "./expression/expression-equation";
export type { ExpressionFault, ExpressionFaultCode } from "./expression/expression-fault";
export type { RateConstantOf } from "./expression/rate-constant-of";
export { type InhibitedOptions, inhibitedEquation } from "./inhibited-equation";
export type { PowerTerm } from "./law-of-powers";
export { powerEquation } from "./power-equation";
export {
  type EquationParameter,
  type EquationValue,
  equationValue,
  type RateEquation,
  type SimplerLaw,
} from "./rate-equation";
export { type ReversibleOptions, reversibleEquation } from "./reversible-equation";
export { type SaturatingOptions, saturatingEquation } from "./saturating-equation";
export { simplerLawIn } from "./simpler-law";
