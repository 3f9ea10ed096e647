import { mean, squaresAboutMean } from "kinetics-core/summation";
import type { Sheet } from "@/db/sheet/sheet.schema";

/** Mean signal of the blanks, with the standard deviation of the mean; null without two readings of one. */
export function blankOfStandards({
  standards,
}: Pick<Sheet, "standards">): { value: number; standardUncertainty: number } | null {
  const readings = standards.flatMap(({ isBlank, setAside, signals }) =>
    isBlank && setAside === null ? signals : [],
  );
  if (readings.length < 2) return null;
  return {
    value: mean(readings),
    standardUncertainty: Math.sqrt(squaresAboutMean(readings) / (readings.length - 1) / readings.length),
  };
}
