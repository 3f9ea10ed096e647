import { type Calibration, calibrate } from "kinetics-core/calibration";
import { mean } from "kinetics-core/summation";
import type { Sheet, SheetStandard } from "@/db/sheet/sheet.schema";

/**
 * The calibration line of the sheet's standards: signal against mol L⁻¹, a point for every reading. Blanks, standards
 * that are set aside and those outside the chosen range are not in it.
 */
export type CalibratedStandards =
  | {
      readonly status: "calibrated";
      readonly calibration: Calibration;
      readonly used: readonly SheetStandard[];
    }
  /** `message` says what is missing or wrong, and what to do. */
  | { readonly status: "no-line"; readonly message: string; readonly used: readonly SheetStandard[] };

export function calibratedStandards(
  sheet: Pick<Sheet, "standards" | "calibration">,
  readings: readonly (readonly number[])[] = [],
): CalibratedStandards {
  const used = sheet.standards.filter((standard) => isInLine(standard, sheet.calibration));
  if (used.length === 0) {
    return {
      status: "no-line",
      used,
      message:
        sheet.standards.length === 0
          ? "There are no standards yet. Enter their concentrations and readings, or paste them."
          : "No standard is in the line: all are blanks, set aside, without readings or outside the range. Take one back or widen the range.",
    };
  }
  const { weighting, intercept } = sheet.calibration;
  const points = used.flatMap((standard) =>
    standard.signals.map((signal) => ({ concentration: standard.concentration.value, signal, standard })),
  );
  if (weighting === "proportional") {
    const flat = used.find((standard) => mean(standard.signals) === 0);
    if (flat !== undefined) {
      return {
        status: "no-line",
        used,
        message: `${flat.label} reads 0 on average, so that its scatter cannot be in proportion to its signal. Weigh all readings alike, or mark ${flat.label} as a blank.`,
      };
    }
  }
  const calibration = calibrate({
    concentrations: points.map(({ concentration }) => concentration),
    signals: points.map(({ signal }) => signal),
    intercept,
    readings,
    ...(weighting === "proportional"
      ? { weights: points.map(({ standard }) => mean(standard.signals) ** -2) }
      : {}),
  });
  return calibration.status === "calibrated"
    ? { status: "calibrated", calibration, used }
    : { status: "no-line", used, message: calibration.message };
}

/** Whether a standard's readings are points of the line. */
export function isInLine(
  { isBlank, setAside, signals, concentration }: SheetStandard,
  { rangeMolar }: Sheet["calibration"],
): boolean {
  const inRange =
    rangeMolar === null ||
    (concentration.value >= rangeMolar.low * (1 - SLACK) &&
      concentration.value <= rangeMolar.high * (1 + SLACK));
  return !isBlank && setAside === null && signals.length > 0 && inRange;
}

/** A range that ends at a standard holds it, whatever its limits lost on the way through units. */
const SLACK = 1e-9;
