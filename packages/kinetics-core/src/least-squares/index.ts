export { fitShape, type Shape, type ShapeFit } from "./fit-shape";
export {
  orthonormalPolynomials,
  type PolynomialBasis,
  type PolynomialRecurrence,
  plainCoefficients,
  polynomialsAt,
  projectOn,
} from "./orthonormal-polynomials";
