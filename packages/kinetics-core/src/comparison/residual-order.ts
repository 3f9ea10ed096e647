import type { RateResiduals } from "./candidate";
import { EXACT_RELATIVE } from "./constants";
import { type DurbinWatson, durbinWatson } from "./durbin-watson";
import { type RunsTest, runsTest } from "./runs-test";

/** Whether a law leaves a wave in its residuals along the rate that it foretells. */
export interface ResidualOrder {
  readonly runsTest: RunsTest | null;
  readonly durbinWatson: DurbinWatson | null;
}

/** `labels` and `weights` run by run. The order does not depend on how the runs were listed. */
export function residualOrder(
  onRates: RateResiduals,
  labels: readonly string[],
  weights: readonly number[],
): ResidualOrder {
  const { fitted, residuals, sensitivities } = onRates;
  const low = Math.min(...fitted);
  // Repeats of one recipe have one fitted value but for rounding, and are taken by label.
  const steps = fitted.map((value) => Math.round((value - low) / EXACT_RELATIVE));
  const order = fitted
    .map((_, j) => j)
    .sort((a, b) => (steps[a] ?? 0) - (steps[b] ?? 0) || compareText(labels[a] ?? "", labels[b] ?? ""));
  const weighted = (column: ArrayLike<number>) =>
    order.map((j) => Math.sqrt(weights[j] ?? 0) * (column[j] ?? 0));
  // A run on the law to rounding has no side.
  const inOrder = weighted(residuals.map((value) => (Math.abs(value) > EXACT_RELATIVE ? value : 0)));
  return { runsTest: runsTest(inOrder), durbinWatson: durbinWatson(inOrder, sensitivities.map(weighted)) };
}

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
