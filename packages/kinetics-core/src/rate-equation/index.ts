export {
  type EquationParameter,
  type EquationValue,
  equationValue,
  type RateEquation,
} from "./rate-equation";
