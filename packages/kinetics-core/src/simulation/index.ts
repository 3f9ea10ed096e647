export { type CatalysedRecipe, catalysedRecipes, catalysedSpeeds } from "./catalysed-runs";
export { informationOf, type LinearRun, type LinearStudy, simulateLinearRuns } from "./linear-runs";
export { labelOf, nineRecipes, nineRuns, type Scenario, simulateRuns } from "./simulated-runs";
export { progressTo, type SimulatedCourse, simulateTrace, trueSlope } from "./simulated-trace";
export {
  recipesOf,
  simulateVerdict,
  type TrueLaw,
  trueLaws,
  type VerdictStudy,
  verdictLaws,
} from "./simulated-verdict";
