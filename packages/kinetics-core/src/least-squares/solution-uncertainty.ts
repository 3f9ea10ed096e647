import type { NonlinearSolution } from "./nonlinear-problem";

/** What a solution says about the errors of its parameters; the residual variance carried over from its residuals. */
type Determined = Pick<NonlinearSolution, "residualStandardDeviation" | "unscaledCovariance">;

/** s² (JᵀJ)⁻¹; null without a degree of freedom or where the data leave a direction open. */
export function covarianceOf({
  residualStandardDeviation,
  unscaledCovariance,
}: Determined): number[][] | null {
  if (residualStandardDeviation === null || unscaledCovariance === null) return null;
  return unscaledCovariance.map((row) => row.map((value) => residualStandardDeviation ** 2 * value));
}

/** One standard error a parameter; 0 for one that is fixed, null where there is no covariance. */
export function standardErrorsOf({
  residualStandardDeviation,
  unscaledCovariance,
}: Determined): number[] | null {
  if (residualStandardDeviation === null || unscaledCovariance === null) return null;
  return unscaledCovariance.map((row, j) => residualStandardDeviation * Math.sqrt(row[j] ?? 0));
}

/** Correlation of every pair of parameters; null as for the covariance, or where one of them is fixed. */
export function correlationOf({ unscaledCovariance }: Determined): number[][] | null {
  if (unscaledCovariance === null) return null;
  const deviations = unscaledCovariance.map((row, j) => Math.sqrt(row[j] ?? 0));
  if (deviations.some((deviation) => deviation === 0)) return null;
  return unscaledCovariance.map((row, i) =>
    row.map((value, j) => (i === j ? 1 : value / ((deviations[i] ?? 1) * (deviations[j] ?? 1)))),
  );
}
