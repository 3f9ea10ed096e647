import { dot } from "kinetics-core/linear-algebra";
import { type Estimate, exponentialOf, type Flag, noEstimate } from "kinetics-core/quantities";
import { LACK_OF_FIT_LEVEL } from "./constants";
import type { CourseLaw } from "./course-law";
import { freeOrderLaw, heldOrderLaw, ORDER_BOUNDS } from "./course-laws";
import { endConflict } from "./end-conflict";
import type { EndSignal } from "./end-signal";
import { fitBurst } from "./fit-burst";
import { type CourseFit, fitCourse } from "./fit-course";
import type { IntegratedLawFit, IntegratedLawInput, IntegratedLawResult } from "./integrated-law";
import { integratedLawFlags } from "./integrated-law-flags";
import type { LackOfFit } from "./lack-of-fit";
import { courseLackOfFit, orderCheck } from "./order-check";
import {
  endSignalOf,
  exhaustionOf,
  initialSignalOf,
  logHalfLifeOf,
  logRateConstantOf,
  type OrderCourseState,
} from "./order-quantities";
import { estimateQuantity, type Quantity } from "./quantity";
import { type ScaledReadings, scaledReadings } from "./scaled-reading";
import { signalRateConstantUnit } from "./signal-rate-constant-unit";

/**
 * Order, rate constant, start, end and half-life of one trace by its integrated law (see `IntegratedLawInput` for which
 * k). Least squares on the signal itself, so that every reading has the same absolute error; correlated noise and the
 * uncertainty of a stated end are part of every standard error.
 *
 * Never throws on data: `unusable` names the reading at fault, `too-few-points` what is needed, `not-converged` that no
 * course could be fitted. A held order outside −2 to 5 and a level outside 0 to 1 are a programmer's errors.
 */
export function fitIntegratedLaw(input: IntegratedLawInput): IntegratedLawResult {
  const result = fitWithWorking(input);
  return result.status === "fitted" ? result.report : result;
}

/** The report with what it was made from, for those who compare several laws on one trace. */
export function fitWithWorking(input: IntegratedLawInput):
  | {
      readonly status: "fitted";
      readonly report: IntegratedLawFit;
      readonly fit: CourseFit;
      readonly scaled: ScaledReadings;
    }
  | Exclude<IntegratedLawResult, IntegratedLawFit> {
  const { order, endSignal = { kind: "free" }, timeZero = 0, level = 0.95 } = input;
  assertUsable(order, level, endSignal);
  const free = order === "free";
  const needed = 2 + (free ? 1 : 0) + (endSignal.kind === "free" ? 1 : 0);
  const scaled = scaledReadings(input, timeZero, endSignal, needed);
  if (scaled.status !== "scaled") return scaled;
  const fit = fitCourse(lawOf(order), scaled.trace, scaled.end);
  if (fit.status !== "fitted") return fit;
  return { status: "fitted", report: reportOf(input, endSignal, scaled, fit, level), fit, scaled };
}

function lawOf(order: number | "free"): CourseLaw {
  return order === "free" ? freeOrderLaw() : heldOrderLaw(order);
}

function assertUsable(order: number | "free", level: number, endSignal: EndSignal): void {
  if (order !== "free" && !(order >= ORDER_BOUNDS[0] && order <= ORDER_BOUNDS[1]))
    throw new RangeError(`An order to hold lies between ${ORDER_BOUNDS.join(" and ")}, got ${order}`);
  if (!(level > 0 && level < 1))
    throw new RangeError(`A confidence level lies between 0 and 1, got ${level}`);
  if (
    endSignal.kind === "known" &&
    !(
      Number.isFinite(endSignal.value) &&
      Number.isFinite(endSignal.standardUncertainty) &&
      endSignal.standardUncertainty >= 0
    )
  )
    throw new RangeError("A known end signal is a finite number with a standard uncertainty of 0 or more");
}

function reportOf(
  input: IntegratedLawInput,
  endSignal: EndSignal,
  scaled: ScaledReadings,
  fit: CourseFit,
  level: number,
): IntegratedLawFit {
  const { noise } = fit;
  const state = stateOf(input.order, scaled, fit);
  const freedom = noise.degreesOfFreedom;
  // A search that stopped at a bound has found no course of its own.
  const settled = !fit.stopped.includes(true) && !fit.cornered;
  const estimated = (quantity: Quantity | null): Estimate =>
    quantity === null || !settled ? noEstimate(level) : estimateQuantity(fit, quantity, level);
  const logRateConstant = estimated(logRateConstantOf(state));
  const check = settled ? orderCheck(input.order, fit, scaled) : null;
  const order =
    input.order === "free"
      ? estimated({ value: state.order, gradient: { theta: [0, 1], scales: [], end: 0 } })
      : { ...noEstimate(level), estimate: input.order };
  const endEstimate =
    fit.condition.kind === "fixed"
      ? { ...noEstimate(level), estimate: endSignal.kind === "known" ? endSignal.value : 0 }
      : estimated(endSignalOf(state));
  const report = {
    status: "fitted",
    order,
    rateConstant: {
      ...exponentialOf(logRateConstant),
      unit: signalRateConstantUnit(state.order, input.signalUnit ?? null, input.timeUnit ?? null),
    },
    logRateConstant,
    initialSignal: estimated(initialSignalOf(state)),
    endSignal: endEstimate,
    halfLife: exponentialOf(estimated(logHalfLifeOf(state))),
    conversion: settled ? conversionOf(state, fit) : null,
    residualStandardDeviation: freedom > 0 ? noise.standardDeviation * scaled.range : null,
    degreesOfFreedom: freedom,
    autocorrelation: noise.autocorrelation,
    effectivePoints: noise.effectivePoints,
    points: scaled.trace.time.length,
    aicc: aiccOf(fit, scaled),
    orderStandardError: check?.standardError ?? null,
    endConflict:
      endSignal.kind === "known" ? endConflict(lawOf(input.order), scaled.trace, fit, scaled.end) : null,
    lackOfFit: courseLackOfFit(fit, scaled),
    curve: curveOf(fit, scaled),
  } as const;
  const flags = integratedLawFlags({
    report,
    heldOrder: input.order === "free" ? null : input.order,
    endSignal: input.endSignal ?? null,
    before: scaled.readings.before,
    timeZero: scaled.readings.timeZero,
    firstTime: scaled.firstTime,
    duration: scaled.duration,
    parameters: fit.parameters,
    held: fit.stopped,
    cornered: fit.cornered,
    exhaustion: exhaustionOf(state),
    orderCheck: check,
    level,
  });
  return { ...report, flags: [...flags, ...phaseFlags(input, report.lackOfFit)] };
}

/** What leaves a pattern may be a burst or a lag: it is named where one is seen. */
function phaseFlags(input: IntegratedLawInput, lack: LackOfFit | null): readonly Flag[] {
  if (lack === null || lack.pValue >= LACK_OF_FIT_LEVEL) return [];
  const burst = fitBurst(input);
  return burst.status === "found" ? burst.flags : [];
}

function stateOf(order: number | "free", scaled: ScaledReadings, { found }: CourseFit): OrderCourseState {
  const { duration, range, firstTime, firstSignal } = scaled;
  return {
    logRate: found.theta[0] ?? Number.NaN,
    order: order === "free" ? (found.theta[1] ?? Number.NaN) : order,
    scale: found.problem.linear.scales[0] ?? Number.NaN,
    end: found.problem.linear.end,
    duration,
    range,
    firstTime,
    firstSignal,
  };
}

function conversionOf(state: OrderCourseState, fit: CourseFit): number | null {
  if (fit.errorOf({ theta: [], scales: [1], end: 0 }) === "undetermined") return null;
  const left = fit.found.problem.parts[0]?.at(-1) ?? Number.NaN;
  const start = initialSignalOf({ ...state, range: 1, firstSignal: 0 });
  if (start === null) return null;
  const conversion = 1 - (left * state.scale) / (start.value - state.end);
  return Number.isFinite(conversion) ? conversion : null;
}

/** A stated end adds its own term to the likelihood, and itself to the readings. */
function aiccOf(
  { found, condition, parameters, endDeviation }: CourseFit,
  scaled: ScaledReadings,
): number | null {
  const n = scaled.trace.time.length;
  const counted = condition.kind === "observed" ? n + 1 : n;
  const k = parameters + 1;
  if (counted <= k + 1) return null;
  const onReadings = found.residuals.subarray(0, n);
  const squares = Math.max(dot(onReadings, onReadings), n * scaled.trace.rounding ** 2);
  const fitTerm = n * (Math.log(squares / n) + 2 * Math.log(scaled.range)) + endDeviation ** 2;
  return fitTerm + 2 * k + (2 * k * (k + 1)) / (counted - k - 1);
}

function curveOf({ found }: CourseFit, { readings, trace, range, firstSignal }: ScaledReadings) {
  const time = readings.time.map((t) => t + readings.timeZero);
  const signal = trace.signal.map((value, i) => firstSignal + range * (value - (found.residuals[i] ?? 0)));
  return { time, signal };
}
