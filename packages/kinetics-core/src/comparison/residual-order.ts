import type { RateResiduals } from "./candidate";
import { type DurbinWatson, durbinWatson } from "./durbin-watson";
import { type RunsTest, runsTest } from "./runs-test";

/** Whether a law leaves a wave in its residuals along the rate that it foretells. */
export interface ResidualOrder {
  readonly runsTest: RunsTest | null;
  readonly durbinWatson: DurbinWatson | null;
}

/** Fitted ln v closer than this part of their range count as equal: repeats of one recipe, then taken by label. */
const EQUAL_PART = 1e-9;

/** `labels` and `weights` run by run. The order does not depend on how the runs were listed. */
export function residualOrder(
  onRates: RateResiduals,
  labels: readonly string[],
  weights: readonly number[],
): ResidualOrder {
  const { fitted, residuals, sensitivities } = onRates;
  const low = Math.min(...fitted);
  const unit = EQUAL_PART * (Math.max(...fitted) - low) || 1;
  const steps = fitted.map((value) => Math.round((value - low) / unit));
  const order = fitted
    .map((_, j) => j)
    .sort((a, b) => (steps[a] ?? 0) - (steps[b] ?? 0) || compareText(labels[a] ?? "", labels[b] ?? ""));
  const weighted = (column: ArrayLike<number>) =>
    order.map((j) => Math.sqrt(weights[j] ?? 0) * (column[j] ?? 0));
  const inOrder = weighted(residuals);
  return { runsTest: runsTest(inOrder), durbinWatson: durbinWatson(inOrder, sensitivities.map(weighted)) };
}

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
