import { type Flag, numberInWords } from "kinetics-core/quantities";
import type { FittedLaw } from "./fitted-law";

/** Rounding of a recipe is no extrapolation. */
const TOLERANCE = 1e-6;

/** Species whose concentration lies outside those of the runs that the law was found from. */
export function rangeFlags(
  { studied }: FittedLaw,
  concentrations: Readonly<Record<string, number>>,
): readonly Flag[] {
  return Object.entries(studied).flatMap(([species, [low, high]]): readonly Flag[] => {
    const value = concentrations[species];
    if (value === undefined) return [];
    if (value >= low * (1 - TOLERANCE) && value <= high * (1 + TOLERANCE)) return [];
    const factor = value < low ? low / value : value / high;
    const how = Number.isFinite(factor)
      ? `${numberInWords(Number(factor.toPrecision(2)))} times ${value < low ? "less than the least" : "the most"} that was studied`
      : "and was always present in the runs";
    return [
      {
        code: "concentration-extrapolated",
        severity: "weakens",
        message: `[${species}] = ${numberInWords(value)} is ${how}; the interval holds only if the law does there too. Make one run nearer to it.`,
      },
    ];
  });
}
