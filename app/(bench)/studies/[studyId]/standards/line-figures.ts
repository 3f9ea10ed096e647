import { type Calibration, predictionBand } from "kinetics-core/calibration";
import { printNumber } from "kinetics-core/quantities";
import type { CalibrationFigureView, PlacedResidualsView } from "@/app/_figures/figure-view";
import type { DisplayScale } from "@/app/_worksheet/display-units";
import { lawName } from "@/app/_worksheet/law-name";
import { calibratedSpecies } from "@/app/_worksheet/standards/calibrated-species";
import { isInLine } from "@/app/_worksheet/standards/calibrated-standards";
import type { Sheet, SheetStandard } from "@/db/sheet/sheet.schema";

/** The line with its standards, and what is left of them beside it, in the shown units. */

export function lineFigure(
  sheet: Sheet,
  calibration: Calibration | null,
  display: DisplayScale,
): CalibrationFigureView | null {
  const points = sheet.standards
    .filter(({ isBlank }) => !isBlank)
    .flatMap((standard) =>
      standard.signals.map((y) => ({
        x: standard.concentration.value * display.factor,
        y,
        standard: standard.label,
        isUsed: isInLine(standard, sheet.calibration),
      })),
    );
  if (points.length === 0) return null;
  const used = points.filter(({ isUsed }) => isUsed).map(({ x }) => x);
  return {
    x: concentrationAxis(sheet, display),
    y: { quantity: quantityOf(sheet), unit: signalUnit(sheet) },
    points,
    range: used.length === 0 ? null : rangeOf(Math.min(...used), Math.max(...used)),
    line:
      calibration === null
        ? null
        : drawnLine(calibration, Math.max(...points.map(({ x }) => x)), display.factor),
    note: calibration === null ? "" : equationOf(calibration, display.factor),
  };
}

function rangeOf(from: number, to: number) {
  return { from, to, words: `in use, ${printNumber(from, 3)} to ${printNumber(to, 3)}` };
}

/** `used` are the standards of the line, in its order. */
export function residualFigure(
  sheet: Sheet,
  { line }: Calibration,
  used: readonly SheetStandard[],
  display: DisplayScale,
): PlacedResidualsView {
  const names = used.flatMap(({ label, signals }) => signals.map(() => label));
  const drawn = sheet.standards.filter(({ isBlank, signals }) => !isBlank && signals.length > 0);
  return {
    x: concentrationAxis(sheet, display),
    y: { quantity: "residual", unit: signalUnit(sheet) },
    points: line.standards.map(({ concentration, residual }, index) => ({
      x: concentration * display.factor,
      residual,
      name: names[index] ?? "",
    })),
    xReach: Math.max(0, ...drawn.map(({ concentration }) => concentration.value * display.factor)),
  };
}

export function quantityOf({ signal }: Sheet): string {
  return signal?.kind === "calibrated" ? signal.quantity.toLowerCase() : "signal";
}

function signalUnit({ signal }: Sheet): string {
  return signal?.kind === "calibrated" ? signal.unit : "";
}

function concentrationAxis(sheet: Sheet, { unit }: DisplayScale) {
  const species = calibratedSpecies(sheet);
  return { quantity: `[${species === null ? "standard" : lawName(species)}]`, unit };
}

/** Steps of the drawn line: its band is curved. */
const STEPS = 40;

function drawnLine({ line }: Calibration, last: number, factor: number) {
  const x = Array.from({ length: STEPS + 1 }, (_, i) => (i / STEPS) * last);
  const bands = x.map((at) => predictionBand(line, at / factor));
  return {
    x,
    y: bands.map(({ estimate }) => estimate ?? 0),
    low: bands.map(({ estimate, interval }) => interval?.[0] ?? estimate ?? 0),
    high: bands.map(({ estimate, interval }) => interval?.[1] ?? estimate ?? 0),
  };
}

/** "*S* = 0.0120 + 0.01793 *c*", in the shown units. */
function equationOf({ line }: Calibration, factor: number): string {
  const slope = raised(printNumber((line.slope.estimate ?? 0) / factor, 4));
  if (!line.interceptFitted) return `*S* = ${slope} *c*`;
  const intercept = raised(printNumber(line.intercept.estimate ?? 0, 3));
  return slope.startsWith("\u2212")
    ? `*S* = ${intercept} \u2212 ${slope.slice(1)} *c*`
    : `*S* = ${intercept} + ${slope} *c*`;
}

/** The text families have no raised minus: powers are marked up in place of superscript digits. */
function raised(printed: string): string {
  return printed.replace(/10([⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+)$/, (_, digits: string) => `10^{${plainDigits(digits)}}`);
}

function plainDigits(superscript: string): string {
  return [...superscript].map((sign) => (sign === "⁻" ? "-" : "⁰¹²³⁴⁵⁶⁷⁸⁹".indexOf(sign))).join("");
}
