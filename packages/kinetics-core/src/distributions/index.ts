export { chiSquaredCdf, chiSquaredQuantile, chiSquaredSurvival } from "./chi-squared";
export { fCdf, fQuantile, fSurvival } from "./f-ratio";
export { incompleteBeta } from "./incomplete-beta";
export { incompleteGamma, type Tails } from "./incomplete-gamma";
export { normalCdf, normalQuantile, normalSurvival } from "./normal";
export { logGamma } from "./stirling-error";
export { studentTCdf, studentTFactor, studentTQuantile, studentTSurvival } from "./student-t";
