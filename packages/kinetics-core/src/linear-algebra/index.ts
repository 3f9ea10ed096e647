export {
  type CorrelatedFit,
  correlatedLeastSquares,
  type RestrictedFit,
  restrictedFit,
} from "./correlated-least-squares";
export { householderQr, invertUpper, type QrFactors, solveUpper } from "./householder-qr";
export { inverseGram, type LeastSquaresSolution, leastSquares } from "./least-squares";
export { columnOf, dot, entry, type Matrix, matrixFromColumns, times, zeroMatrix } from "./matrix";
export { rankOf, type SingularValues, singularValues } from "./singular-values";
