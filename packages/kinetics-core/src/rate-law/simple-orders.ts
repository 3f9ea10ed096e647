import type { Estimate } from "kinetics-core/quantities";
import type { SimpleOrderReading } from "./rate-law";

/** Orders that a mechanism of few steps gives. */
export const SIMPLE_ORDERS: readonly number[] = [-1, -0.5, 0, 0.5, 1, 1.5, 2, 3];

/** An interval wider than this to either side settles nothing. */
const LARGEST_HALF_WIDTH = 0.25;
/** What rounding leaves of an exact table. */
const EXACT_TOLERANCE = 1e-9;

/** The simple order closest to a value; of two equally close the whole one. */
export function nearestSimpleOrder(value: number): number {
  let best = 0;
  for (const order of SIMPLE_ORDERS) {
    const gain = Math.abs(value - best) - Math.abs(value - order);
    if (gain > 1e-9 || (gain > -1e-9 && Number.isInteger(order) && !Number.isInteger(best))) best = order;
  }
  return best;
}

/**
 * What may be said of the nearest simple order: `is` only where the interval contains it, excludes every other simple
 * order and reaches no further than 0.25; `consistent` where it merely contains it; `nearest` where it excludes it or
 * where there is no interval; `undetermined` without an estimate. `exact`: the runs obey the law to rounding, so the
 * comparison tolerates 1e-9.
 */
export function readSimpleOrder(order: Estimate, exact: boolean): SimpleOrderReading {
  if (order.estimate === null) return "undetermined";
  if (order.interval === null) return "nearest";
  const [low, high] = order.interval;
  const tolerance = exact ? EXACT_TOLERANCE : 0;
  const contains = (value: number) => value >= low - tolerance && value <= high + tolerance;
  const nearest = nearestSimpleOrder(order.estimate);
  if (!contains(nearest)) return "nearest";
  const alone = SIMPLE_ORDERS.every((other) => other === nearest || !contains(other));
  return alone && (high - low) / 2 <= LARGEST_HALF_WIDTH ? "is" : "consistent";
}
