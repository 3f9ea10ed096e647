import type { Calibration, LinearRange } from "kinetics-core/calibration";
import { type Flag, molarTo, printNumber } from "kinetics-core/quantities";
import type { CalibrationFigureView, PlacedResidualsView } from "@/app/_figures/figure-view";
import type { StudyAnalysis } from "@/app/_worksheet/analysis";
import { concentrationDisplay, type DisplayScale } from "@/app/_worksheet/display-units";
import { lawName } from "@/app/_worksheet/law-name";
import { blankOfStandards } from "@/app/_worksheet/standards/blank-of-standards";
import { calibratedSpecies } from "@/app/_worksheet/standards/calibrated-species";
import {
  type CalibratedStandards,
  calibratedStandards,
} from "@/app/_worksheet/standards/calibrated-standards";
import { slopeOfStandards } from "@/app/_worksheet/standards/recalibrated";
import { slopeName, slopeUnit } from "@/app/_worksheet/standards/slope-name";
import { printStandardLines } from "@/app/_worksheet/standards/standard-lines";
import { standardsFlags } from "@/app/_worksheet/standards/standards-flags";
import { typedNumber } from "@/app/_worksheet/typed-number/print-typed";
import { uncertainText } from "@/app/_worksheet/uncertain-text";
import { countInWords } from "@/app/_worksheet/words";
import type { ConcentrationUnit, Sheet, SheetStandard } from "@/db/sheet/sheet.schema";
import { inverseReading, type ReadingView } from "./inverse-reading";
import { lineFigure, quantityOf, residualFigure } from "./line-figures";
import { type RunRangeRow, runRange } from "./run-range";
import { type StandardRow, standardRows } from "./standard-rows";

/** The standards station in words and plain props. Words are prose for typesetting. */
export interface StandardsView {
  readonly title: string;
  /** The value of the slope within the title; "" where there is none. It is marked where the signal follows it. */
  readonly slope: string;
  readonly slopeUnit: string;
  readonly lead: string;
  /** Why there is no line; "" where there is one or no standard yet. */
  readonly problem: string;
  readonly unit: ConcentrationUnit;
  readonly unitText: string;
  readonly quantity: string;
  readonly figure: CalibrationFigureView | null;
  readonly residuals: PlacedResidualsView | null;
  readonly rows: readonly StandardRow[];
  /** The standards as they are written in the box. */
  readonly lines: string;
  readonly settings: SettingsView;
  readonly limits: readonly { readonly name: string; readonly text: string }[];
  readonly flags: readonly Flag[];
  readonly budget: readonly { readonly source: string; readonly text: string }[];
  readonly follow: FollowView;
  readonly reading: ReadingView | null;
  readonly runs: readonly RunRangeRow[];
}

/** How the line is drawn, as it stands in the boxes. */
export interface SettingsView {
  readonly speciesId: string;
  readonly species: readonly { readonly id: string; readonly name: string }[];
  readonly intercept: "fitted" | "none";
  readonly weighting: "none" | "proportional";
  readonly low: string;
  readonly high: string;
  readonly stock: string;
}

export interface FollowView {
  /** `not-linear`: the set-up names no signal linear in a concentration. */
  readonly status: "follows" | "typed" | "not-linear";
  readonly sentence: string;
}

export function standardsView(sheet: Sheet, analysis: StudyAnalysis, typedReading: string): StandardsView {
  const unit = calibratedSpecies(sheet)?.unit ?? "mol/L";
  const display = concentrationDisplay(unit);
  const line = calibratedStandards(sheet);
  const calibration = line.status === "calibrated" ? line.calibration : null;
  const slope = slopeOfStandards(sheet);
  return {
    title: titleOf(sheet, line, display),
    slope: slope === null ? "" : uncertainText(slope.value, slope.standardUncertainty),
    slopeUnit: slopeUnit(sheet),
    lead: calibration === null ? "" : leadOf(line.used, sheet),
    problem: line.status === "no-line" && sheet.standards.length > 0 ? line.message : "",
    unit,
    unitText: display.unit,
    quantity: quantityOf(sheet),
    figure: lineFigure(sheet, calibration, display),
    residuals: calibration === null ? null : residualFigure(sheet, calibration, line.used, display),
    rows: standardRows(sheet, calibration, display),
    lines: printStandardLines(sheet.standards, unit),
    settings: settingsOf(sheet, unit),
    limits: calibration === null ? [] : limitsOf(sheet, calibration, display),
    flags: standardsFlags(sheet, analysis.runs),
    budget: calibration === null ? [] : budgetOf(sheet, calibration),
    follow: followOf(sheet, line),
    reading: inverseReading(sheet, typedReading, display),
    runs: calibration === null ? [] : runRange(sheet, calibration, display),
  };
}

/** Ends before the value of the slope where there is one. */
function titleOf(sheet: Sheet, line: CalibratedStandards, { unit, factor }: DisplayScale): string {
  if (sheet.standards.length === 0) return "No standards yet";
  if (line.status === "no-line" || slopeOfStandards(sheet) === null)
    return "The standards make no line with an uncertainty yet";
  const name = slopeName(sheet) === "slope" ? "a slope of" : `${slopeName(sheet)} =`;
  const { linearRange } = line.calibration;
  if (linearRange.status !== "assessed") return `The standards give ${name}`;
  const upTo = `${printNumber(linearRange.straightUpTo * factor, 3)} ${unit}`;
  return isStraightThroughout(linearRange)
    ? `The line is straight to ${upTo} and gives ${name}`
    : `Shown to be straight to ${upTo}, the line gives ${name}`;
}

function isStraightThroughout({
  curvedFrom,
  straightUpTo,
  highest,
}: Extract<LinearRange, { status: "assessed" }>): boolean {
  return curvedFrom === null && straightUpTo >= highest * (1 - 1e-9);
}

function leadOf(used: readonly SheetStandard[], { standards }: Sheet): string {
  const counts = new Set(used.map(({ signals }) => signals.length));
  const [each] = counts.size === 1 ? counts : [];
  const readings =
    each === undefined
      ? ""
      : `, ${countInWords(each).toLowerCase()} ${each === 1 ? "reading" : "readings"} each`;
  const out = standards.filter(({ isBlank, setAside }) => !isBlank && setAside !== null).length;
  const aside = out === 0 ? "" : ` ${countInWords(out)} set aside.`;
  return `${countInWords(used.length)} ${used.length === 1 ? "standard" : "standards"} in the line${readings}.${aside}`;
}

function settingsOf(sheet: Sheet, unit: ConcentrationUnit): SettingsView {
  const { intercept, weighting, rangeMolar, stockRelative } = sheet.calibration;
  const text = (molar: number) => typedNumber(molarTo(molar, unit));
  return {
    speciesId: calibratedSpecies(sheet)?.id ?? "",
    species: sheet.species.map((species) => ({ id: species.id, name: species.name || lawName(species) })),
    intercept,
    weighting,
    low: rangeMolar === null ? "" : text(rangeMolar.low),
    high: rangeMolar === null ? "" : text(rangeMolar.high),
    stock: stockRelative === 0 ? "" : typedNumber(100 * stockRelative),
  };
}

function limitsOf(sheet: Sheet, calibration: Calibration, { unit, factor }: DisplayScale) {
  const { limitOfDetection, limitOfQuantitation, linearRange, line } = calibration;
  const inUnit = (molar: number | null) =>
    molar === null ? "not known" : `${printNumber(molar * factor, 2)} ${unit}`;
  const scatter = line.residualStandardDeviation;
  const freedom = line.degreesOfFreedom;
  const blank = blankOfStandards(sheet);
  const { intercept } = line;
  return [
    { name: "Detection", text: inUnit(limitOfDetection) },
    { name: "Quantitation", text: inUnit(limitOfQuantitation) },
    {
      name: "Linear to",
      text:
        linearRange.status === "assessed"
          ? `${printNumber(linearRange.straightUpTo * factor, 3)} ${unit}`
          : "not tested",
    },
    {
      name: "Scatter",
      text:
        scatter === null
          ? "not known"
          : `${printNumber(scatter, 2)}, ${freedom} ${freedom === 1 ? "degree" : "degrees"} of freedom`,
    },
    ...(line.interceptFitted && intercept.estimate !== null
      ? [{ name: "Intercept", text: uncertainText(intercept.estimate, intercept.standardError) }]
      : []),
    ...(blank === null
      ? []
      : [{ name: "Blanks read", text: uncertainText(blank.value, blank.standardUncertainty) }]),
  ];
}

function budgetOf(sheet: Sheet, { line }: Calibration) {
  const slope = slopeOfStandards(sheet);
  if (slope === null) return [];
  const stock = Math.abs(slope.value) * sheet.calibration.stockRelative;
  const fit = { source: "Fit of the line", text: printNumber(line.slope.standardError ?? 0, 2) };
  if (stock === 0) return [fit];
  const share = printNumber(100 * sheet.calibration.stockRelative, 2);
  return [fit, { source: `Standard stock, ${share} %`, text: printNumber(stock, 2) }];
}

function followOf(sheet: Sheet, line: CalibratedStandards): FollowView {
  if (sheet.signal?.kind !== "calibrated")
    return {
      status: "not-linear",
      sentence:
        "The set-up names no signal that is linear in a concentration, so that nothing can follow this line.",
    };
  const { perMolar, source } = sheet.signal;
  const text = (of: { value: number; standardUncertainty: number }) =>
    uncertainText(of.value, of.standardUncertainty);
  const name = slopeName(sheet) === "slope" ? "the calibration factor" : slopeName(sheet);
  const held = `${text(perMolar)} ${slopeUnit(sheet)}`;
  if (source === "standards")
    return {
      status: "follows",
      sentence:
        line.status === "no-line"
          ? `The signal follows the standards. While they make no line, ${name} stays at ${held}.`
          : `The signal follows this line: ${name} is ${held} in every rate and in *k*.`,
    };
  const slope = slopeOfStandards(sheet);
  if (slope === null)
    return {
      status: "typed",
      sentence: `The set-up holds a typed factor, ${held}. It stays until there is a line.`,
    };
  const offered = text(slope);
  return {
    status: "typed",
    sentence:
      offered === text(perMolar)
        ? `The set-up holds a typed factor, ${held}, which this line bears out.`
        : `The set-up holds a typed factor. With this line ${name} would be ${offered} instead of ${held}.`,
  };
}
