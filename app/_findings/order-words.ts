import { printUncertain } from "kinetics-core/quantities";
import type { RateLawFit } from "kinetics-core/rate-law";

/** "0.965 ± 0.049", half the interval behind the ±; the value alone where no interval can be given. */
export function orderInWords(fit: RateLawFit, species: string, digits: 1 | 2): string {
  const estimate = fit.orders[species];
  if (estimate === undefined || estimate.estimate === null) return "undetermined";
  const half = estimate.interval === null ? null : (estimate.interval[1] - estimate.interval[0]) / 2;
  const printed = printUncertain(estimate.estimate, half, { digits, power: 0 });
  return printed.uncertainty === null ? printed.value : `${printed.value} ± ${printed.uncertainty}`;
}
