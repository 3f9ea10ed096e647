import type { Sheet } from "@/db/sheet/sheet.schema";
import { calibratedStandards, meanOf } from "./calibrated-standards";

/**
 * The sheet with its signal per concentration as the standards give it, where the signal is said to follow them. To be
 * applied by whatever changes a standard or how the line is drawn, in the same change: applied again it changes nothing.
 * While the standards make no line, the factor that was there stays.
 */
export function recalibrated(sheet: Sheet): Sheet {
  if (sheet.signal?.kind !== "calibrated" || sheet.signal.source !== "standards") return sheet;
  const perMolar = slopeOfStandards(sheet);
  if (perMolar === null) return sheet;
  return { ...sheet, signal: { ...sheet.signal, perMolar, blank: blankOfStandards(sheet) } };
}

/** Signal per mol L⁻¹; its uncertainty is that of the line and of the stock that all standards were made from. */
export function slopeOfStandards(
  sheet: Pick<Sheet, "standards" | "calibration">,
): { value: number; standardUncertainty: number } | null {
  const line = calibratedStandards(sheet);
  if (line.status === "no-line") return null;
  const { estimate, standardError } = line.calibration.line.slope;
  if (estimate === null || estimate === 0 || standardError === null) return null;
  return {
    value: asTyped(estimate),
    standardUncertainty: asTyped(Math.hypot(standardError, estimate * sheet.calibration.stockRelative)),
  };
}

/** As many digits as pass through a box unchanged: a set-up that is saved untouched must not look as if another factor had been typed. */
function asTyped(value: number): number {
  return Number(value.toPrecision(8));
}

/** Mean signal of the blanks, with the standard deviation of the mean; null without two readings of one. */
function blankOfStandards({ standards }: Pick<Sheet, "standards">) {
  const readings = standards.flatMap(({ isBlank, setAside, signals }) =>
    isBlank && setAside === null ? signals : [],
  );
  if (readings.length < 2) return null;
  const mean = meanOf(readings);
  const squares = readings.reduce((sum, reading) => sum + (reading - mean) ** 2, 0);
  return {
    value: mean,
    standardUncertainty: Math.sqrt(squares / (readings.length - 1) / readings.length),
  };
}
