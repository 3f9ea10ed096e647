import { type Flag, numberInWords, percent } from "kinetics-core/quantities";
import type { CalibrationLine } from "./calibration";
import type { Curvature } from "./curvature";
import { detectionLimits } from "./detection-limits";
import { fitCalibrationLine } from "./fit-calibration-line";
import { type CalibrationLackOfFit, pureErrorOf, unevenScatter } from "./lack-of-fit";
import { type LinearRange, linearRangeFlags } from "./linear-range";
import { partWithoutCurvature } from "./part-without-curvature";

/** ISO 8466-1 compares with 99 % points, both for curvature and for uneven scatter; lack of fit follows. */
const SIGNIFICANT = 0.01;
/** For an intercept that was left out, where the error would go unnoticed: the usual 95 %. */
const SIGNIFICANT_INTERCEPT = 0.95;

/** What a reader should know about the line, before anything is read from it. */
export function lineFlags(
  line: CalibrationLine,
  curvature: Curvature,
  lackOfFit: CalibrationLackOfFit | null,
  range: LinearRange,
  weighted: boolean,
): readonly Flag[] {
  return [
    ...exactFlags(line),
    ...freedomFlags(line),
    ...slopeFlags(line),
    ...interceptFlags(line),
    ...curvatureFlags(curvature),
    ...lackOfFitFlags(lackOfFit),
    ...scatterFlags(line, weighted),
    // At the blank there is no net signal, and so nothing that could be curved.
    ...linearRangeFlags(
      range,
      line.standards.map((one) => one.concentration).filter((concentration) => concentration !== 0),
      "standards",
      partWithoutCurvature(line),
    ),
    ...limitFlags(line, weighted),
  ];
}

function exactFlags(line: CalibrationLine): readonly Flag[] {
  if (!line.exact || line.degreesOfFreedom === 0) return [];
  return [
    {
      code: "exact-table",
      severity: "note",
      message:
        "The standards lie on the line to the last digit, as computed figures do. Measured signals scatter, so the intervals here say nothing about a measurement.",
    },
  ];
}

function freedomFlags({ degreesOfFreedom, standards, interceptFitted }: CalibrationLine): readonly Flag[] {
  const parameters = interceptFitted ? "slope and intercept" : "the slope";
  if (degreesOfFreedom === 0)
    return [
      {
        code: "no-freedom",
        severity: "blocks",
        message: `${standards.length === 1 ? "One standard gives" : `${standards.length} standards give`} ${parameters} exactly, and no uncertainty. One more gives a first interval, three more a usable one.`,
      },
    ];
  if (degreesOfFreedom > 2) return [];
  return [
    {
      code: "little-freedom",
      severity: "weakens",
      message: `The intervals rest on ${degreesOfFreedom === 1 ? "one degree" : "two degrees"} of freedom, so they are wide and their width is itself uncertain. ${degreesOfFreedom === 1 ? "Two more standards" : "One more standard"} would narrow them.`,
    },
  ];
}

/** Where the interval of the slope holds 0 the signal may not depend on the concentration at all. */
function slopeFlags({ slope }: CalibrationLine): readonly Flag[] {
  const { estimate, interval } = slope;
  const open = estimate === 0 || (interval !== null && interval[0] <= 0 && interval[1] >= 0);
  if (!open) return [];
  return [
    {
      code: "slope-not-shown",
      severity: "blocks",
      message:
        "The slope cannot be told from zero, so nothing can be read from the line within limits. Widen the range of the standards, or add more.",
    },
  ];
}

function interceptFlags(line: CalibrationLine): readonly Flag[] {
  if (line.interceptFitted) {
    const { estimate, interval } = line.intercept;
    if (estimate === null || interval === null || line.exact || interval[0] > 0 || interval[1] < 0) return [];
    return [
      {
        code: "intercept-covers-zero",
        severity: "note",
        message: `The intercept, ${numberInWords(estimate)}, cannot be told from zero. A line through the origin would use one parameter less, if a blank reads zero for a reason.`,
      },
    ];
  }
  const free = fitCalibrationLine({
    concentrations: line.standards.map((one) => one.concentration),
    signals: line.standards.map((one) => one.signal),
    weights: line.standards.map((one) => one.weight),
    level: SIGNIFICANT_INTERCEPT,
  });
  if (free.status !== "fitted" || free.intercept.interval === null || free.exact) return [];
  const [low, high] = free.intercept.interval;
  if (low <= 0 && high >= 0) return [];
  return [
    {
      code: "intercept-needed",
      severity: "weakens",
      message: `The line is held at the origin, but the standards themselves put the intercept between ${numberInWords(low)} and ${numberInWords(high)}. Fit the intercept, or find out what the blank reads.`,
    },
  ];
}

function curvatureFlags(curvature: Curvature): readonly Flag[] {
  if (curvature.status !== "tested" || curvature.pValue >= SIGNIFICANT) return [];
  return [
    {
      code: "curvature-significant",
      severity: "weakens",
      message: `A parabola fits the standards better than the line (F ${numberInWords(curvature.fStatistic)}, p ${pInWords(curvature.pValue)}). Leave out the standards at which the signal bends.`,
    },
  ];
}

function lackOfFitFlags(lackOfFit: CalibrationLackOfFit | null): readonly Flag[] {
  if (lackOfFit === null || lackOfFit.pValue >= SIGNIFICANT) return [];
  return [
    {
      code: "lack-of-fit",
      severity: "weakens",
      message: `The line misses the means of the levels by more than replicates differ among themselves (F ${numberInWords(lackOfFit.fStatistic)}, p ${pInWords(lackOfFit.pValue)}): the signal bends, or a standard was not what it was meant to be.`,
    },
  ];
}

function scatterFlags(line: CalibrationLine, weighted: boolean): readonly Flag[] {
  const pure = pureErrorOf(line);
  const uneven = pure === null ? null : unevenScatter(pure);
  if (uneven === null || uneven.pValue >= SIGNIFICANT) return [];
  return [
    {
      code: "uneven-scatter",
      severity: "weakens",
      message: `Replicates of the highest level scatter ${numberInWords(Math.sqrt(uneven.ratio))} times as much as those of the lowest${weighted ? ", weights taken into account" : ""}, so low readings look less certain than they are and high ones more. ${weighted ? "Correct the weights" : "Give weights"}, in proportion to 1/variance.`,
    },
  ];
}

/** With weights s is that of a signal of weight 1, which may be none of the standards. */
function limitFlags(line: CalibrationLine, weighted: boolean): readonly Flag[] {
  const lowest = line.standards.reduce<CalibrationLine["standards"][number] | null>(
    (least, one) =>
      least === null || Math.abs(one.concentration) < Math.abs(least.concentration) ? one : least,
    null,
  );
  if (!weighted || lowest === null || lowest.weight === 1) return [];
  const { limitOfDetection, limitOfQuantitation } = detectionLimits(line, { weight: lowest.weight });
  if (limitOfDetection === null || limitOfQuantitation === null) return [];
  return [
    {
      code: "limits-of-unit-weight",
      severity: "note",
      message: `The limits are those of a signal of weight 1. With the weight of the lowest standard, ${numberInWords(lowest.weight)}, they are ${numberInWords(limitOfDetection)} for detection and ${numberInWords(limitOfQuantitation)} for quantitation.`,
    },
  ];
}

function pInWords(p: number): string {
  return p < 1e-4 ? "below 0.01 %" : percent(p);
}
