export {
  type DesignColumn,
  fitLinear,
  type LinearFit,
  type LinearOptions,
  type LinearSolution,
} from "./fit-linear";
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
export { type ProfileEnd, type ProfileInterval, profileInterval } from "./profile-interval";
export { type SecondOpinion, type SecondOpinionOptions, secondOpinion } from "./second-opinion";
export { correlationOf, covarianceOf, standardErrorsOf } from "./solution-uncertainty";
export { powersOf, type TwicePrecise } from "./twice-precision";
