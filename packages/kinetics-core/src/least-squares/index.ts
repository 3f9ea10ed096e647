export { fitNonlinear } from "./fit-nonlinear";
export { fitShape, type Shape, type ShapeFit } from "./fit-shape";
export type {
  NonlinearFit,
  NonlinearOptions,
  NonlinearProblem,
  NonlinearSolution,
} from "./nonlinear-problem";
export {
  orthonormalPolynomials,
  type PolynomialBasis,
  type PolynomialRecurrence,
  plainCoefficients,
  polynomialsAt,
  projectOn,
} from "./orthonormal-polynomials";
