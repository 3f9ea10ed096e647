import { fSurvival } from "kinetics-core/distributions";
import { mean, squaresAboutMean } from "kinetics-core/summation";

/**
 * Corrected Akaike information criterion on the level of runs, m ln(RSS/m) + 2K + 2K(K + 1)/(m − K − 1) with
 * K = parameters + 1 for the variance (Hurvich and Tsai, Biometrika 76, 297, 1989). Null with m ≤ K + 1 runs. The
 * points of the traces do not count: by their number a richer false law wins three studies of four.
 */
export function runLevelAicc(runSquares: number, runs: number, parameters: number): number | null {
  const k = parameters + 1;
  if (runs <= k + 1) return null;
  return runs * Math.log(runSquares / runs) + 2 * k + (2 * k * (k + 1)) / (runs - k - 1);
}

/** F = (RSS − RSS_best)/(RSS_best/(m − p_best)) against F(1, m − p_best); null unless the law fits worse. */
export function runLevelF(
  runSquares: number,
  best: { readonly runSquares: number; readonly parameters: number },
  runs: number,
): { readonly fStatistic: number; readonly pValue: number } | null {
  const freedom = runs - best.parameters;
  if (!(runSquares > best.runSquares) || freedom < 1) return null;
  const fStatistic = (runSquares - best.runSquares) / (best.runSquares / freedom);
  if (!Number.isFinite(fStatistic)) return null;
  return { fStatistic, pValue: fSurvival(fStatistic, 1, freedom) };
}

/** Holm's adjustment for as many tests as there are p-values; null stays null and counts for nothing. */
export function holm(pValues: readonly (number | null)[]): readonly (number | null)[] {
  const order = pValues
    .flatMap((pValue, i) => (pValue === null ? [] : [{ pValue, i }]))
    .sort((a, b) => a.pValue - b.pValue || a.i - b.i);
  const adjusted: (number | null)[] = pValues.map(() => null);
  let running = 0;
  order.forEach(({ pValue, i }, rank) => {
    running = Math.max(running, Math.min(1, (order.length - rank) * pValue));
    adjusted[i] = running;
  });
  return adjusted;
}

export interface LeaveOneOutOpinion {
  /** Root-mean-square error of ln v foretold from the other runs, weighted. */
  readonly error: number;
  /** Paired t of the squared errors against those of the best law; positive where this one foretells worse. */
  readonly pairedT: number | null;
}

/** Null where no run could be foretold. Runs that either law cannot foretell are left out of the pairs. */
export function leaveOneOutOpinion(
  errors: readonly (number | null)[],
  best: readonly (number | null)[] | null,
  weights: readonly number[],
): LeaveOneOutOpinion | null {
  let squares = 0;
  let total = 0;
  const differences: number[] = [];
  errors.forEach((error, j) => {
    if (error === null) return;
    const weight = weights[j] ?? 0;
    squares += weight * error ** 2;
    total += weight;
    const other = best?.[j] ?? null;
    if (other !== null) differences.push(weight * (error ** 2 - other ** 2));
  });
  if (!(total > 0)) return null;
  return { error: Math.sqrt(squares / total), pairedT: tOfMean(differences) };
}

function tOfMean(values: readonly number[]): number | null {
  const n = values.length;
  if (n < 2) return null;
  const variance = squaresAboutMean(values) / (n - 1);
  return variance > 0 ? mean(values) / Math.sqrt(variance / n) : null;
}
