import { fSurvival } from "kinetics-core/distributions";
import { type Flag, inARow, numberInWords, verb } from "kinetics-core/quantities";
import { squaresAboutMean } from "kinetics-core/summation";
import type { CalibrateInput, CalibrationLine } from "./calibration";
import type { DetectionLimits } from "./detection-limits";
import type { ConcentrationReading } from "./inverse-reading";
import { type LinearRange, straightnessAt } from "./linear-range";

/** Replicates of an unknown that scatter so much more than the standards would do so once in a hundred by chance. */
const SIGNIFICANT = 0.01;

/** What a reader should know about the concentrations read, each finding once with the unknowns that it concerns. */
export function readingFlags(
  line: CalibrationLine,
  readings: readonly ConcentrationReading[],
  { readings: signals = [], readingWeights }: CalibrateInput,
  range: LinearRange,
  limits: DetectionLimits,
): readonly Flag[] {
  const low = Math.min(...line.standards.map((one) => one.concentration));
  const high = Math.max(...line.standards.map((one) => one.concentration));
  const detection = limits.limitOfDetection ?? 0;
  const quantitation = limits.limitOfQuantitation ?? 0;
  const where = (holds: (concentration: number, index: number) => boolean) =>
    readings.flatMap(({ estimate }, i) => (estimate !== null && holds(estimate, i) ? [i] : []));

  const flags: Flag[] = [];
  const add = (code: string, severity: Flag["severity"], found: readonly number[], message: string) => {
    if (found.length > 0) flags.push({ code, severity, message: `${namesOf(found)} ${message}` });
  };

  const unbounded = where((_, i) => readings[i]?.interval === null && readings[i]?.g !== null);
  add(
    "reading-unbounded",
    "blocks",
    unbounded,
    `${verb(unbounded.length, "has", "have")} no interval: the slope is known so poorly that no concentration can be bounded. Widen the range of the standards, or add more.`,
  );
  const outside = where((x) => x < low || x > high);
  add(
    "reading-outside-standards",
    "weakens",
    outside,
    `${verb(outside.length, "lies", "lie")} outside the standards, ${numberInWords(low)} to ${numberInWords(high)}, where nothing was tested. Dilute, or add a standard beyond.`,
  );
  const undetected = where((x) => x < detection);
  add(
    "reading-below-detection",
    "weakens",
    undetected,
    `${verb(undetected.length, "is", "are")} below the limit of detection, ${numberInWords(detection)}: report as not detected.`,
  );
  const faint = where((x) => x >= detection && x < quantitation);
  add(
    "reading-below-quantitation",
    "note",
    faint,
    `${verb(faint.length, "is", "are")} between the limits of detection and quantitation, ${numberInWords(detection)} and ${numberInWords(quantitation)}: present, but only roughly known.`,
  );
  const curved = where((x) => straightnessAt(range, x) === "curved");
  add(
    "reading-in-curved-range",
    "weakens",
    curved,
    `${verb(curved.length, "lies", "lie")} where the signal is shown to be curved by more than 2 % of the net signal. Dilute.`,
  );
  const open = where((x) => range.status === "assessed" && straightnessAt(range, x) === "not-shown");
  add(
    "reading-straightness-not-shown",
    "weakens",
    open,
    `${verb(open.length, "lies", "lie")} where the line is not shown to be straight within 2 % of the net signal.`,
  );
  const restless = where((_, i) => scattersMore(line, signals[i] ?? [], readingWeights?.[i] ?? 1));
  add(
    "reading-scatter",
    "weakens",
    restless,
    `${verb(restless.length, "has", "have")} replicates that scatter more than the standards do, so the interval, which rests on the standards, is too narrow. Measure ${verb(restless.length, "it", "them")} again.`,
  );
  return flags;
}

/** F of the replicates' own variance over that about the line. */
function scattersMore(line: CalibrationLine, signals: readonly number[], weight: number): boolean {
  const { residualStandardDeviation: s, degreesOfFreedom } = line;
  const freedom = signals.length - 1;
  if (s === null || line.exact || freedom < 1) return false;
  const variance = squaresAboutMean(signals) / freedom;
  return fSurvival((weight * variance) / s ** 2, freedom, degreesOfFreedom) < SIGNIFICANT;
}

function namesOf(indices: readonly number[]): string {
  const numbers = inARow(
    indices.map((i) => String(i + 1)),
    5,
  );
  return indices.length === 1 ? `Reading ${numbers}` : `Readings ${numbers}`;
}
