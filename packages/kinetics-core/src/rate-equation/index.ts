export type { PowerTerm } from "./law-of-powers";
export { powerEquation } from "./power-equation";
export {
  type EquationParameter,
  type EquationValue,
  equationValue,
  type RateEquation,
  type SimplerLaw,
} from "./rate-equation";
