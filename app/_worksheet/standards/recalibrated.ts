import type { Sheet } from "@/db/sheet/sheet.schema";
import { calibratedStandards } from "./calibrated-standards";

/**
 * The sheet with its signal per concentration as the standards give it, where the signal is said to follow them. To be
 * applied by whatever changes a standard or how the line is drawn, in the same change: applied again it changes nothing.
 * While the standards make no line, the factor that was there stays. The signal's blank is that of the reaction mixture and
 * not of the standards' medium, so that it stays as it was typed.
 */
export function recalibrated(sheet: Sheet): Sheet {
  if (sheet.signal?.kind !== "calibrated" || sheet.signal.source !== "standards") return sheet;
  const perMolar = slopeOfStandards(sheet);
  if (perMolar === null) return sheet;
  return { ...sheet, signal: { ...sheet.signal, perMolar } };
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
