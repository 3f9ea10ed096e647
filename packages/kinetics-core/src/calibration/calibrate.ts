import type { Flag } from "kinetics-core/quantities";
import type { CalibrateInput, CalibrationFault, CalibrationLine } from "./calibration";
import { lineFlags } from "./calibration-flags";
import { type Curvature, testCurvature } from "./curvature";
import { type DetectionLimits, detectionLimits } from "./detection-limits";
import { fitCalibrationLine } from "./fit-calibration-line";
import { type ConcentrationReading, readConcentration, readingOf } from "./inverse-reading";
import { type CalibrationLackOfFit, testLackOfFit } from "./lack-of-fit";
import { type LinearRange, linearRange } from "./linear-range";
import { readingFlags } from "./reading-flags";

/** Everything that a calibration can say: the line, whether it is one, what it can detect, and what it reads. */
export interface Calibration extends DetectionLimits {
  readonly status: "calibrated";
  readonly line: CalibrationLine;
  readonly curvature: Curvature;
  /** Null without replicates of a level. */
  readonly lackOfFit: CalibrationLackOfFit | null;
  readonly linearRange: LinearRange;
  /** In the order of the request. */
  readonly readings: readonly ConcentrationReading[];
  readonly flags: readonly Flag[];
}

/** A reading that cannot be used; `index` counts the unknowns, `replicate` their signals. */
export interface ReadingFault {
  readonly status: "reading-empty" | "reading-not-finite" | "bad-weight" | "lengths-differ";
  readonly argument: "readings" | "readingWeights";
  /** Null where it is the argument as a whole. */
  readonly index: number | null;
  readonly replicate: number | null;
  readonly message: string;
}

export function calibrate(input: CalibrateInput): Calibration | CalibrationFault | ReadingFault {
  const readings = input.readings ?? [];
  const fault = readingFault(readings) ?? readingWeightFault(input);
  if (fault !== null) return fault;
  const line = fitCalibrationLine(input);
  if (line.status !== "fitted") return line;

  const curvature = testCurvature(line);
  const lackOfFit = testLackOfFit(line);
  const range = linearRange(line);
  const limits = detectionLimits(line);
  const read = readings.map((signals, i) =>
    readConcentration(line, readingOf(signals, input.readingWeights?.[i])),
  );
  return {
    status: "calibrated",
    line,
    curvature,
    lackOfFit,
    linearRange: range,
    ...limits,
    readings: read,
    flags: [
      ...lineFlags(line, curvature, lackOfFit, range, input.weights !== undefined),
      ...readingFlags(line, read, input, range, limits),
    ],
  };
}

function readingFault(readings: readonly (readonly number[])[]): ReadingFault | null {
  for (const [index, signals] of readings.entries()) {
    if (signals.length === 0) {
      return {
        status: "reading-empty",
        argument: "readings",
        index,
        replicate: null,
        message: `Unknown ${index + 1} has no signal. Give at least one, or leave it out.`,
      };
    }
    const replicate = signals.findIndex((signal) => !Number.isFinite(signal));
    if (replicate >= 0) {
      return {
        status: "reading-not-finite",
        argument: "readings",
        index,
        replicate,
        message: `Signal ${replicate + 1} of unknown ${index + 1} is no number. Give it, or leave it out.`,
      };
    }
  }
  return null;
}

function readingWeightFault({ readings = [], readingWeights }: CalibrateInput): ReadingFault | null {
  if (readingWeights === undefined) return null;
  if (readingWeights.length !== readings.length)
    return {
      status: "lengths-differ",
      argument: "readingWeights",
      index: null,
      replicate: null,
      message: `There are ${readings.length} readings and ${readingWeights.length} weights of readings. Each reading needs one.`,
    };
  const index = readingWeights.findIndex((weight) => !(Number.isFinite(weight) && weight > 0));
  if (index < 0) return null;
  return {
    status: "bad-weight",
    argument: "readingWeights",
    index,
    replicate: null,
    message: `The weight of reading ${index + 1} is not a number above 0. Correct it, or leave the weights of readings out.`,
  };
}
