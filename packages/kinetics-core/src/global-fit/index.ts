export {
  bootstrapGlobalFit,
  type GlobalBootstrap,
  type GlobalBootstrapOptions,
  type GlobalBootstrapResult,
} from "./bootstrap-global-fit";
export type { StudySpecies } from "./course-law";
export { type EndConflict, endConflict, fitGlobalAndCompareEnds } from "./end-conflict";
export { fitGlobal } from "./fit-global";
export type {
  FittedRun,
  GlobalFit,
  GlobalFitFailure,
  GlobalFitFailureStatus,
  GlobalFitInput,
  GlobalFitLaw,
  GlobalFitOptions,
  GlobalFitResult,
  GlobalFitRun,
  PooledEstimates,
  UndeterminedCombination,
} from "./global-fit";
export { type GlobalProfile, profileGlobalFit } from "./profile-global-fit";
export { type RobustBeside, robustBeside } from "./robust-beside";
export { type GlobalSecondOpinion, secondOpinionOnFit } from "./second-opinion-on-fit";
