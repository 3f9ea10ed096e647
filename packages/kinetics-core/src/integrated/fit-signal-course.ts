import type { Trace } from "kinetics-core/initial-rate";
import { type Estimate, exponentialOf, type Flag, inARow, noEstimate } from "kinetics-core/quantities";
import { AUTOCORRELATION_WEAKENS, LACK_OF_FIT_LEVEL } from "./constants";
import type { CourseLaw } from "./course-law";
import {
  autocatalyticLaw,
  consecutiveLaw,
  knownExcessLaw,
  reversibleLaw,
  unequalSecondOrderLaw,
} from "./course-laws";
import type { EndSignal } from "./end-signal";
import { type CourseFit, fitCourse, type Gradient } from "./fit-course";
import type { LackOfFit } from "./lack-of-fit";
import { courseLackOfFit } from "./order-check";
import { estimateQuantity } from "./quantity";
import type { RefusedCourse } from "./refused-course";
import { type ScaledReadings, scaledReadings } from "./scaled-reading";

/**
 * Courses beyond one order of one reactant, by the name of their law; rates come back in the reciprocal of the unit of time:
 *
 * - `unequal-second-order`, A + B: `rate` = k·a₀ and `excess` = b₀/a₀ − 1; with `excess` given it is held. The signal
 *   shows A, or what forms from it.
 * - `reversible`, A ⇌ P: `forward` and `back`. Both need the signal without any A; with a free end only their sum shows.
 * - `consecutive`, A → I → P: `first` and `second`. Where A and I both show in amounts unknown, the two may change roles.
 * - `autocatalytic`, A + P → 2 P: `rate` = k·a₀ and `seed` = p₀/a₀.
 */
export type SignalCourseLaw =
  | { readonly name: "unequal-second-order"; readonly excess?: number }
  | { readonly name: "reversible" | "consecutive" | "autocatalytic" };

export interface SignalCourseInput extends Trace {
  readonly law: SignalCourseLaw;
  /** Signal without the followed species; free where absent. */
  readonly endSignal?: EndSignal;
  /** Amounts, and so a₀, are those at this time, in the unit of `time`. Default 0. */
  readonly timeZero?: number;
  readonly level?: number;
}

export interface SignalCourseFit {
  readonly status: "fitted";
  readonly parameters: Readonly<Record<string, Estimate>>;
  /** Signal of each followed species at its full amount a₀, in the order of the law. */
  readonly scales: readonly Estimate[];
  readonly endSignal: Estimate;
  readonly residualStandardDeviation: number | null;
  readonly degreesOfFreedom: number;
  readonly autocorrelation: number;
  readonly lackOfFit: LackOfFit | null;
  readonly flags: readonly Flag[];
}

export type SignalCourseResult = SignalCourseFit | RefusedCourse;

/** Never throws on data; an excess below −1 or not finite is a programmer's error. */
export function fitSignalCourse(input: SignalCourseInput): SignalCourseResult {
  const { endSignal = { kind: "free" }, timeZero = 0, level = 0.95 } = input;
  const law = lawOf(input.law);
  const needed = law.parameters.length + law.species + (endSignal.kind === "free" ? 1 : 0);
  const scaled = scaledReadings(input, timeZero, endSignal, needed);
  if (scaled.status !== "scaled") return scaled;
  // On the clock of mixing, since the amounts are those at mixing.
  const last = scaled.firstTime + scaled.duration;
  const onClock = { ...scaled, trace: { ...scaled.trace, time: scaled.readings.time.map((t) => t / last) } };
  const fit = fitCourse(law, onClock.trace, onClock.end);
  return fit.status === "fitted" ? reportOf(law, fit, onClock, endSignal, last, level) : fit;
}

function lawOf(law: SignalCourseLaw): CourseLaw {
  switch (law.name) {
    case "reversible":
      return reversibleLaw();
    case "consecutive":
      return consecutiveLaw();
    case "autocatalytic":
      return autocatalyticLaw();
    case "unequal-second-order":
      if (law.excess === undefined) return unequalSecondOrderLaw();
      if (!(law.excess >= -1 && Number.isFinite(law.excess)))
        throw new RangeError(`An excess b₀/a₀ − 1 is a number from −1 on, got ${law.excess}`);
      return knownExcessLaw(law.excess);
  }
}

function reportOf(
  law: CourseLaw,
  fit: CourseFit,
  scaled: ScaledReadings,
  endSignal: EndSignal,
  unitOfTime: number,
  level: number,
): SignalCourseFit {
  const { theta, problem } = fit.found;
  const { noise } = fit;
  const estimate = (value: number, gradient: Gradient) => estimateQuantity(fit, { value, gradient }, level);
  const parameters = Object.fromEntries(
    law.parameters.map(({ name, kind }, j) => {
      if (fit.stopped[j]) return [name, noEstimate(level)];
      const gradient = { theta: unitVector(j), scales: [], end: 0 };
      const value = theta[j] ?? Number.NaN;
      return kind === "rate"
        ? [name, exponentialOf(estimate(value - Math.log(unitOfTime), gradient))]
        : [name, estimate(value, gradient)];
    }),
  );
  const { range, firstSignal } = scaled;
  const lack = courseLackOfFit(fit, scaled);
  return {
    status: "fitted",
    parameters,
    scales: Array.from(problem.linear.scales, (scale, s) =>
      estimate(range * scale, { theta: [], scales: unitVector(s).map((one) => range * one), end: 0 }),
    ),
    endSignal:
      fit.condition.kind === "fixed"
        ? { ...noEstimate(level), estimate: endSignal.kind === "known" ? endSignal.value : 0 }
        : estimate(firstSignal + range * problem.linear.end, { theta: [], scales: [], end: range }),
    residualStandardDeviation: noise.degreesOfFreedom > 0 ? noise.standardDeviation * range : null,
    degreesOfFreedom: noise.degreesOfFreedom,
    autocorrelation: noise.autocorrelation,
    lackOfFit: lack,
    flags: flagsOf(parameters, lack, noise.autocorrelation),
  };
}

function unitVector(place: number): number[] {
  return Array.from({ length: place + 1 }, (_, j) => (j === place ? 1 : 0));
}

function flagsOf(
  parameters: Readonly<Record<string, Estimate>>,
  lack: LackOfFit | null,
  autocorrelation: number,
): Flag[] {
  const open = Object.entries(parameters).flatMap(([name, { estimate }]) =>
    estimate === null ? [name] : [],
  );
  const flags: Flag[] = [];
  if (open.length > 0) {
    flags.push({
      code: "undetermined",
      severity: "blocks",
      message: `The readings do not determine ${inARow(open)}; state the signal without the followed species, hold what is known, or use a simpler law.`,
    });
  }
  if (lack !== null && lack.pValue < LACK_OF_FIT_LEVEL) {
    flags.push({
      code: "lack-of-fit",
      severity: "weakens",
      message:
        "The residuals hold a pattern that this law does not describe; look for another step, a burst or a drift.",
    });
  }
  if (autocorrelation > AUTOCORRELATION_WEAKENS) {
    flags.push({
      code: "autocorrelated",
      severity: "weakens",
      message: `Neighbouring residuals correlate by ${autocorrelation.toFixed(2)}; look for a course that this law does not follow, or for drift.`,
    });
  }
  return flags;
}
