import { numberInWords } from "kinetics-core/quantities";
import type { CalibrationFault, CalibrationInput } from "./calibration";
import { levelsOf } from "./levels";

/** Sizes, zero aside, between which squares, quotients and their squares stay within what a double holds. */
const LEAST_SIZE = 1e-40;
const GREATEST_SIZE = 1e40;

/** What stands in the way of a line, the first of it; null where nothing does. */
export function calibrationFault({
  concentrations,
  signals,
  weights,
  intercept,
}: CalibrationInput): CalibrationFault | null {
  for (const [argument, values] of [
    ["signals", signals],
    ["weights", weights ?? concentrations],
  ] as const) {
    if (values.length !== concentrations.length) {
      return {
        status: "lengths-differ",
        argument,
        index: null,
        message: `There are ${concentrations.length} concentrations and ${values.length} ${argument}. Each standard needs one of each.`,
      };
    }
  }
  for (const [argument, values] of [
    ["concentrations", concentrations],
    ["signals", signals],
  ] as const) {
    const index = values.findIndex((value) => !Number.isFinite(value));
    if (index >= 0) {
      return {
        status: "not-finite",
        argument,
        index,
        message: `Standard ${index + 1} has no ${argument.slice(0, -1)} that is a number. Give it, or leave the standard out.`,
      };
    }
  }
  const index = weights?.findIndex((weight) => !(Number.isFinite(weight) && weight > 0)) ?? -1;
  if (index >= 0) {
    return {
      status: "bad-weight",
      argument: "weights",
      index,
      message: `The weight of standard ${index + 1} is ${inWords(weights?.[index])}; weights are numbers above 0. To let a standard not count, leave it out.`,
    };
  }
  const widest = greatestOf(concentrations);
  const strongest = greatestOf(signals);
  return (
    tooFewOf(concentrations, intercept !== "none") ??
    sizeFault("concentrations", widest, widest) ??
    sizeFault("signals", strongest, strongest) ??
    sizeFault("weights", greatestOf(weights ?? [1]), Math.min(...(weights ?? [1])))
  );
}

function inWords(weight: number | undefined): string {
  return weight !== undefined && Number.isFinite(weight) ? numberInWords(weight) : "no number";
}

function sizeFault(
  argument: CalibrationFault["argument"],
  greatest: number,
  least: number,
): CalibrationFault | null {
  if (greatest <= GREATEST_SIZE && (least === 0 || least >= LEAST_SIZE)) return null;
  return {
    status: "beyond-precision",
    argument,
    index: null,
    message: `The ${argument} are so large or so small that their squares leave the range of the computer's numbers. Give them in another unit.`,
  };
}

function greatestOf(values: readonly number[]): number {
  return values.reduce((greatest, value) => Math.max(greatest, Math.abs(value)), 0);
}

function tooFewOf(concentrations: readonly number[], interceptFitted: boolean): CalibrationFault | null {
  const levels = levelsOf(concentrations);
  const enough = interceptFitted
    ? levels.length >= 2
    : levels.some(([first = 0]) => (concentrations[first] ?? 0) !== 0);
  if (enough) return null;
  return {
    status: "too-few-standards",
    argument: "concentrations",
    index: null,
    message: interceptFitted
      ? `A line with an intercept needs standards of at least two concentrations, and here ${concentrations.length === 0 ? "are none" : `all ${concentrations.length} have one`}. Add a standard of another concentration.`
      : "A line through the origin needs a standard of a concentration other than 0. Add one.",
  };
}
