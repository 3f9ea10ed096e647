import type { Estimator, FittedCurve } from "./initial-rate";

/** One estimator on one window of readings [from, to). */
export interface WindowFit {
  readonly estimator: Estimator;
  readonly degree: number | null;
  readonly from: number;
  readonly to: number;
  readonly slope: number;
  readonly standardError: number;
  /** Whether the search for its shape settled; polynomials need none. */
  readonly settled: boolean;
  /** Made when asked for: most windows that are tried are never drawn. */
  readonly curve: () => FittedCurve;
}

/** Whether the readings fix this slope at all; an exponential that was over before the second reading has none. */
export function isDetermined({ slope, standardError }: WindowFit): boolean {
  return Number.isFinite(slope) && Number.isFinite(standardError);
}
