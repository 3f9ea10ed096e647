export {
  orthonormalPolynomials,
  type PolynomialBasis,
  type PolynomialRecurrence,
  plainCoefficients,
  polynomialsAt,
  projectOn,
} from "./orthonormal-polynomials";
