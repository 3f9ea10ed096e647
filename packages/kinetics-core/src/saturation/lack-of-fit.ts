import { fSurvival } from "kinetics-core/distributions";
import { squaresAboutMean } from "kinetics-core/summation";
import type { LackOfFit } from "./saturation";
import type { SaturationPoints } from "./saturation-curve";

const PARAMETERS = 2;

/**
 * F = ((S − S_pure)/(levels − 2))/(S_pure/(n − levels)), S_pure the squares about the mean of each repeated
 * concentration. Null without repeats, with fewer than three levels, and where repeats do not scatter at all.
 */
export function lackOfFitOf(
  { concentrations, rates }: SaturationPoints,
  residualSquares: number,
): LackOfFit | null {
  const levels = new Map<number, number[]>();
  concentrations.forEach((c, i) => {
    levels.set(c, [...(levels.get(c) ?? []), rates[i] ?? 0]);
  });
  let pure = 0;
  for (const repeats of levels.values()) pure += squaresAboutMean(repeats);
  const above = levels.size - PARAMETERS;
  const below = rates.length - levels.size;
  if (above < 1 || below < 1 || !(pure > 0)) return null;
  const fStatistic = Math.max(residualSquares - pure, 0) / above / (pure / below);
  if (!Number.isFinite(fStatistic)) return null;
  return { fStatistic, pValue: fSurvival(fStatistic, above, below), degreesOfFreedom: [above, below] };
}
