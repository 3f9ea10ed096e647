import type { Estimate } from "kinetics-core/quantities";
import type { Outcome } from "./section";

/** Coverage, width and error of one estimate, as columns named after the quantity; no interval covers nothing. */
export function outcomeOf(name: string, estimate: Estimate | null, truth: number): Outcome {
  const interval = estimate?.interval ?? null;
  return {
    [`${name} covered`]: interval === null ? 0 : Number(interval[0] <= truth && truth <= interval[1]),
    [`${name} width`]: interval === null ? Number.NaN : interval[1] - interval[0],
    [`${name} error`]: (estimate?.estimate ?? Number.NaN) - truth,
  };
}
