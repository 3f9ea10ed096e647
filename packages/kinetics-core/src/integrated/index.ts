export { autocatalyticCourse } from "./autocatalytic-course";
export type { BurstFit, BurstInput, BurstOptions, BurstResult } from "./burst";
export { consecutiveCourse } from "./consecutive-course";
export { type CoursePoint, coursePoint } from "./course-point";
export type { EndSignal } from "./end-signal";
export { fitBurst } from "./fit-burst";
export { fitIntegratedLaw } from "./fit-integrated-law";
export {
  fitSignalCourse,
  type SignalCourseFit,
  type SignalCourseInput,
  type SignalCourseLaw,
  type SignalCourseResult,
} from "./fit-signal-course";
export type { IntegratedLawFit, IntegratedLawInput, IntegratedLawResult } from "./integrated-law";
export type { LackOfFit } from "./lack-of-fit";
export { orderCourse } from "./order-course";
export {
  type OrderCandidate,
  type OrderOfTrace,
  type OrderOfTraceInput,
  type OrderReading,
  orderOfTrace,
} from "./order-of-trace";
export { orderResolution, orderStandardDeviation } from "./order-resolution";
export { phaseFlag } from "./phase-flag";
export type { RefusedCourse } from "./refused-course";
export { reversibleCourse } from "./reversible-course";
export { type AxisLine, straightestAxisOrder } from "./straightest-axis";
export { unequalSecondOrderCourse } from "./unequal-second-order-course";
