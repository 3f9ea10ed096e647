export { mean, squaresAboutMean } from "./mean";
export { median, medianOfSorted } from "./median";
export { sum, sumOfSquares } from "./sum";
