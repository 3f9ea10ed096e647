export { fitRateLaw } from "./fit-rate-law";
export type {
  AddedVariable,
  BudgetLine,
  LackOfFit,
  OrderCombination,
  RateConstant,
  RateLawFit,
  RateLawInput,
  RateLawResult,
  RateLawRun,
  Separability,
  SharedUncertainty,
  SimpleOrderReading,
} from "./rate-law";
export { type VarianceComponents, type VarianceProblem, varianceComponents } from "./restricted-likelihood";
export { nearestSimpleOrder, SIMPLE_ORDERS } from "./simple-orders";
