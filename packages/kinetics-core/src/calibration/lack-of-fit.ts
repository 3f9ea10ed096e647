import { fSurvival } from "kinetics-core/distributions";
import type { CalibrationLine } from "./calibration";
import { levelsOf } from "./levels";

/** Scatter of replicates about the mean of their level, which no line can take away. */
export interface PureError {
  /** √(Σ w (y − ȳ_level)²/ν), on the scale of a signal of weight 1. */
  readonly standardDeviation: number;
  readonly degreesOfFreedom: number;
  /** Levels from the lowest up. */
  readonly levels: readonly {
    readonly concentration: number;
    readonly mean: number;
    readonly replicates: number;
    /** On the scale of a signal of weight 1; null for a single standard. */
    readonly standardDeviation: number | null;
  }[];
}

/**
 * Does the line miss the means of the levels by more than replicates differ among themselves?
 * F = ((RSS − SS_pure)/(levels − parameters))/(SS_pure/ν_pure).
 */
export interface CalibrationLackOfFit {
  readonly fStatistic: number;
  readonly degreesOfFreedom: readonly [number, number];
  readonly pValue: number;
}

/** Null where no level is replicated. */
export function pureErrorOf(line: CalibrationLine): PureError | null {
  const levels = levelsOf(line.standards.map((one) => one.concentration)).map((indices) => {
    const members = indices.flatMap((i) => line.standards[i] ?? []);
    const total = members.reduce((sum, one) => sum + one.weight, 0);
    const mean = members.reduce((sum, one) => sum + one.weight * one.signal, 0) / total;
    const squares = members.reduce((sum, one) => sum + one.weight * (one.signal - mean) ** 2, 0);
    return { concentration: members[0]?.concentration ?? 0, mean, replicates: members.length, squares };
  });
  const degreesOfFreedom = line.standards.length - levels.length;
  if (degreesOfFreedom === 0) return null;
  const squares = levels.reduce((sum, one) => sum + one.squares, 0);
  return {
    standardDeviation: Math.sqrt(squares / degreesOfFreedom),
    degreesOfFreedom,
    levels: levels.map(({ concentration, mean, replicates, squares: own }) => ({
      concentration,
      mean,
      replicates,
      standardDeviation: replicates > 1 ? Math.sqrt(own / (replicates - 1)) : null,
    })),
  };
}

/** Null without replicates, without a level more than the line has parameters, or where replicates agree exactly. */
export function testLackOfFit(line: CalibrationLine): CalibrationLackOfFit | null {
  const pure = pureErrorOf(line);
  if (pure === null || line.residualStandardDeviation === null) return null;
  const parameters = line.interceptFitted ? 2 : 1;
  const between = pure.levels.length - parameters;
  const pureSquares = pure.standardDeviation ** 2 * pure.degreesOfFreedom;
  const squares = line.residualStandardDeviation ** 2 * line.degreesOfFreedom;
  // Replicates that agree to rounding are copies, not repeats: nothing to measure the line by.
  if (between < 1 || line.exact || pureSquares <= 1e-24 * squares) return null;
  const fStatistic = Math.max(squares - pureSquares, 0) / between / pure.standardDeviation ** 2;
  return {
    fStatistic,
    degreesOfFreedom: [between, pure.degreesOfFreedom],
    pValue: fSurvival(fStatistic, between, pure.degreesOfFreedom),
  };
}

/**
 * Does the scatter of replicates differ between the lowest and the highest replicated level, as ISO 8466-1 asks before
 * a line without weights? p of the ratio of the two variances, the higher level above; null where two levels with
 * replicates that scatter are missing.
 */
export function unevenScatter(pure: PureError): { readonly ratio: number; readonly pValue: number } | null {
  const replicated = pure.levels.filter((one) => one.replicates > 1);
  const [low, high] = [replicated[0], replicated.at(-1)];
  if (low === undefined || high === undefined || low === high) return null;
  if (!low.standardDeviation || high.standardDeviation === null) return null;
  const ratio = (high.standardDeviation / low.standardDeviation) ** 2;
  return { ratio, pValue: fSurvival(ratio, high.replicates - 1, low.replicates - 1) };
}
