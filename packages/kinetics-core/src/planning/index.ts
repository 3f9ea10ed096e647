export {
  type DiscriminatingRun,
  type DiscriminationRequest,
  type DiscriminationResult,
  discriminatingRun,
} from "./discriminating-run";
export {
  type ExpectedWidth,
  type ExpectedWidths,
  expectedWidths,
  type WidthRequest,
  type WidthResult,
} from "./expected-widths";
export {
  type FeasibleRequest,
  type FeasibleResult,
  type FeasibleSet,
  feasibleSet,
  isFeasible,
  type PlanningStock,
  type Recipe,
} from "./feasible-set";
export { type NextRunRequest, type NextRunResult, nextRuns, type PlannedRun } from "./next-run";
export { runsToTarget, type TargetRequest, type TargetResult, type TargetStep } from "./runs-to-target";
