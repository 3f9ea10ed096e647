export { labelOf, nineRecipes, nineRuns, type Scenario, simulateRuns } from "./simulated-runs";
export { progressTo, type SimulatedCourse, simulateTrace, trueSlope } from "./simulated-trace";
