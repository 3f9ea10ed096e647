import type { Sheet } from "@/db/sheet/sheet.schema";
import { meanOf } from "./calibrated-standards";

/** Mean signal of the blanks, with the standard deviation of the mean; null without two readings of one. */
export function blankOfStandards({
  standards,
}: Pick<Sheet, "standards">): { value: number; standardUncertainty: number } | null {
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
