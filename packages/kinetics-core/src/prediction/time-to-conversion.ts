import { studentTFactor } from "kinetics-core/distributions";
import { type Flag, inARow, percent, printNumber } from "kinetics-core/quantities";
import type { FittedLaw, Prediction } from "./fitted-law";
import { bothEstimates, type LogPrediction, logPrediction } from "./log-prediction";
import { rangeFlags } from "./prediction-flags";
import {
  type Course,
  type CourseFault,
  type CourseResult,
  courseOf,
  type Mixture,
  positionOf,
  timeIntegrals,
} from "./reaction-course";

export interface TimeToConversion extends Prediction {
  readonly status: "predicted";
  /** Part of `species` that has reacted. */
  readonly conversion: number;
  readonly species: string;
  /** In the time unit of the law. The symmetric interval of the delta method, beside the back-transformed one. */
  readonly symmetricInterval: readonly [number, number] | null;
  /** ln t with its variances, for sealing and comparing. */
  readonly logTime: LogPrediction;
  /**
   * ∂ ln t/∂ ln λ when all starting concentrations change by a factor λ: 1 − overall order for a power law. 0 means
   * that the time does not depend on how concentrated the mixture is.
   */
  readonly concentrationExponent: number;
}

export type TimeResult = TimeToConversion | CourseFault;

/**
 * Time until a part `conversion` (above 0, below 1) of a reactant has reacted; the reactant that runs out first where
 * `species` is absent. ln t has a variance that is exact in ln k and of first order in the orders, and its interval
 * is back-transformed: t is never negative, and a factor either way is as likely.
 */
export function timeToConversion(
  law: FittedLaw,
  mixture: Mixture,
  conversion: number,
  species?: string,
): TimeResult {
  const prepared = courseOf(law, mixture);
  return prepared.status === "course" ? timeOnCourse(prepared, conversion, species) : prepared;
}

/** Time in which the reactant halves; at an equilibrium, half of the way there (IUPAC). */
export function halfLife(law: FittedLaw, mixture: Mixture, species?: string): TimeResult {
  const prepared = courseOf(law, mixture);
  if (prepared.status !== "course") return prepared;
  const { course } = prepared;
  if (course.end.kind !== "equilibrium") return timeOnCourse(prepared, 0.5, species);
  const name = species ?? firstReactant(course);
  const change = -(mixture.stoichiometricNumbers[name] ?? 0) * course.end.extent;
  return timeOnCourse(prepared, change / 2 / (mixture.concentrations[name] ?? Number.NaN), name);
}

/** Times until 50 % and 90 % of the species are gone, as environmental studies give them. */
export function decayTimes(
  law: FittedLaw,
  mixture: Mixture,
  species?: string,
): { readonly dt50: TimeResult; readonly dt90: TimeResult } {
  return {
    dt50: timeToConversion(law, mixture, 0.5, species),
    dt90: timeToConversion(law, mixture, 0.9, species),
  };
}

function timeOnCourse(
  { course }: Extract<CourseResult, { readonly status: "course" }>,
  conversion: number,
  asked: string | undefined,
): TimeResult {
  const { law, mixture } = course;
  const species = asked ?? firstReactant(course);
  const extent = extentOf(course, species, conversion);
  if (typeof extent !== "number") return extent;
  const sums = new Float64Array(2 + law.parameters.length);
  if (!timeIntegrals(course, 0, positionOf(course, extent), sums)) return noValueOnTheWay();
  const [scaledTime = Number.NaN] = sums;
  const logTime = Math.log(scaledTime) - law.logRateConstant;
  if (!Number.isFinite(logTime)) return noValueOnTheWay();
  const gradient = [-1, ...law.parameters.map((_, j) => (sums[1 + j] ?? Number.NaN) / scaledTime)];
  const prediction = logPrediction(law, logTime, gradient);
  const estimates = bothEstimates(law, prediction);
  const concentrationExponent = (sums[sums.length - 1] ?? Number.NaN) / scaledTime;
  return {
    status: "predicted",
    conversion,
    species,
    ...estimates,
    symmetricInterval: symmetric(law, estimates.ofTheLaw),
    logTime: prediction,
    concentrationExponent,
    flags: [...rangeFlags(law, mixture.concentrations), ...startFlags(conversion, concentrationExponent)],
  };
}

function firstReactant({ mixture, end }: Course): string {
  const [exhausted] = end.exhausted;
  if (exhausted !== undefined) return exhausted;
  const reactants = Object.entries(mixture.stoichiometricNumbers).filter(([, number]) => number < 0);
  const extents = reactants.map(([name, number]) => (mixture.concentrations[name] ?? 0) / -number);
  return reactants[extents.indexOf(Math.min(...extents))]?.[0] ?? "";
}

function extentOf(course: Course, species: string, conversion: number): number | CourseFault {
  const { mixture, end } = course;
  const number = mixture.stoichiometricNumbers[species] ?? 0;
  const start = mixture.concentrations[species] ?? 0;
  if (!(number < 0) || !(start > 0))
    return {
      status: "bad-mixture",
      place: `stoichiometricNumbers.${species}`,
      message: `${species} is not used up in this mixture, so it has no conversion; name a reactant that is present.`,
    };
  if (!(conversion > 0 && conversion < 1))
    return {
      status: "bad-mixture",
      place: "conversion",
      message: `The conversion is ${conversion}; it lies above 0 and below 1.`,
    };
  const extent = (conversion * start) / -number;
  if (extent < end.extent) return extent;
  const most = (-number * end.extent) / start;
  const why =
    end.kind === "equilibrium"
      ? "the reaction comes to its equilibrium"
      : `${inARow(end.exhausted)} ${end.exhausted.length === 1 ? "is" : "are"} used up`;
  return {
    status: "not-reached",
    place: "conversion",
    message: `A conversion of ${percent(conversion)} of ${species} is not reached: at ${percent(most)} ${why}.`,
  };
}

function noValueOnTheWay(): CourseFault {
  return {
    status: "no-rate",
    place: "concentrations",
    message:
      "The law has no finite rate somewhere before that conversion, so no time can be given. Ask for a lower conversion, or check the orders of what is used up.",
  };
}

function symmetric(law: FittedLaw, time: Prediction["ofTheLaw"]): readonly [number, number] | null {
  const { estimate, standardError } = time;
  if (estimate === null || standardError === null || law.degreesOfFreedom === null) return null;
  const half = standardError * studentTFactor(law.level, law.degreesOfFreedom);
  return [estimate - half, estimate + half];
}

/** Beyond this exponent a doubling of concentrations changes the time by 3.5 %: worth saying. */
const DEPENDS_ABOVE = 0.05;

function startFlags(conversion: number, exponent: number): readonly Flag[] {
  if (Math.abs(exponent) < DEPENDS_ABOVE) return [];
  const doubled = 2 ** exponent;
  return [
    {
      code: "depends-on-start",
      severity: "note",
      message: `The time to ${percent(conversion)} depends on the starting concentrations, since the law is not first order: at twice the concentrations it is ${printNumber(doubled, 3)} times as long. State them with it.`,
    },
  ];
}
