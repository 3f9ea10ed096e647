import { type Calibration, predictionBand } from "kinetics-core/calibration";
import { printNumber } from "kinetics-core/quantities";
import { mean } from "kinetics-core/summation";
import type { DisplayScale } from "@/app/_worksheet/display-units";
import { columnOf } from "@/app/_worksheet/printed-column";
import { isInLine } from "@/app/_worksheet/standards/calibrated-standards";
import { uncertainText } from "@/app/_worksheet/uncertain-text";
import type { Sheet, SheetStandard } from "@/db/sheet/sheet.schema";

/** A standard on the table, its numbers as they are printed. */
export interface StandardRow {
  readonly id: string;
  readonly label: string;
  readonly concentration: string;
  readonly readings: readonly string[];
  readonly mean: string;
  /** Mean less the line, "" where there is none. */
  readonly residual: string;
  readonly state: "used" | "blank" | "set-aside" | "outside" | "unread";
  readonly remark: string;
}

export function standardRows(
  sheet: Sheet,
  calibration: Calibration | null,
  { factor }: DisplayScale,
): readonly StandardRow[] {
  const decimals = decimalsOf(sheet.standards.flatMap(({ signals }) => signals));
  const residuals = sheet.standards.map((standard) => residualOf(standard, calibration));
  const scatter = calibration?.line.residualStandardDeviation ?? null;
  const { printed } = columnOf(
    residuals.map((value) => (value === null ? null : { value, uncertainty: scatter })),
  );
  return sheet.standards.map((standard, index) => {
    const { id, label, concentration, signals } = standard;
    const state = stateOf(standard, sheet);
    return {
      id,
      label,
      concentration: uncertainText(concentration.value * factor, concentration.standardUncertainty * factor),
      readings: signals.map((signal) => printSignal(signal, decimals)),
      mean: signals.length === 0 ? "" : printSignal(mean(signals), decimals === null ? null : decimals + 1),
      residual: printed[index]?.value ?? "",
      state,
      remark: remarkOf(standard, state),
    };
  });
}

/** Mean of the readings less the line; null without either, and of blanks, which the line is not held against. */
function residualOf(
  { signals, isBlank, concentration }: SheetStandard,
  calibration: Calibration | null,
): number | null {
  if (calibration === null || isBlank || signals.length === 0) return null;
  const { estimate } = predictionBand(calibration.line, concentration.value);
  return estimate === null ? null : mean(signals) - estimate;
}

/** Signals beyond these sizes are printed with a power of ten, each with its own. */
const PLAIN = { least: 1e-3, most: 1e6 } as const;
const MOST_DECIMALS = 6;

/** Digits after the point that all signals are printed with; null where they take powers of ten. */
function decimalsOf(signals: readonly number[]): number | null {
  const largest = Math.max(0, ...signals.map(Math.abs));
  if (largest !== 0 && (largest < PLAIN.least || largest >= PLAIN.most)) return null;
  const typed = signals.map((signal) => signal.toFixed(MOST_DECIMALS).replace(/0+$/, "").split(".")[1] ?? "");
  return Math.max(0, ...typed.map(({ length }) => length));
}

function printSignal(signal: number, decimals: number | null): string {
  return decimals === null ? printNumber(signal, 4) : signal.toFixed(decimals).replace("-", "\u2212");
}

function stateOf(standard: SheetStandard, sheet: Sheet): StandardRow["state"] {
  if (standard.setAside !== null) return "set-aside";
  if (standard.isBlank) return "blank";
  if (standard.signals.length === 0) return "unread";
  return isInLine(standard, sheet.calibration) ? "used" : "outside";
}

function remarkOf({ setAside, remark }: SheetStandard, state: StandardRow["state"]): string {
  if (setAside !== null) return `Set aside: ${setAside.reason}`;
  const said = {
    used: "",
    blank: "Not in the line",
    unread: "No readings yet",
    outside: "Outside the range",
  };
  return [said[state === "set-aside" ? "used" : state], remark].filter((part) => part !== "").join(". ");
}
