import { printUncertain } from "kinetics-core/quantities";
import type { RateLawFit } from "kinetics-core/rate-law";

const MINUS = "\u2212";

/** Simple orders as the trade writes them: "1", "½", "−1", "1½"; null where the value is none of these. */
export function printSimpleOrder(order: number): string | null {
  const size = Math.abs(order);
  const whole = Math.floor(size);
  const rest = size - whole;
  if (rest !== 0 && rest !== 0.5) return null;
  const text = rest === 0 ? String(whole) : `${whole === 0 ? "" : whole}½`;
  return order < 0 ? MINUS + text : text;
}

/** A held order as it was typed, "1.3" or "½". */
export function printHeldOrder(order: number): string {
  return printSimpleOrder(order) ?? String(order).replace("-", MINUS);
}

/** How one order of a fit is to be read. */
export type OrderReading =
  /** The data settle it, or somebody holds it: the law carries the simple number. */
  | { readonly kind: "settled"; readonly order: number }
  | { readonly kind: "held"; readonly order: number }
  /** The law carries the free estimate. */
  | { readonly kind: "free"; readonly order: number }
  | { readonly kind: "unknown" };

export function readOrder(fit: RateLawFit, species: string, heldAt: number | null): OrderReading {
  if (heldAt !== null) return { kind: "held", order: heldAt };
  const estimate = fit.orders[species]?.estimate ?? null;
  if (estimate === null) return { kind: "unknown" };
  const simple = fit.simpleOrders.orders[species];
  if (fit.simpleOrders.reading[species] === "is" && simple !== undefined)
    return { kind: "settled", order: simple };
  return { kind: "free", order: estimate };
}

/** The exponent of one factor of the law: simple where it is settled or held, else as many places as are known. */
export function printExponent(fit: RateLawFit, species: string, heldAt: number | null): string {
  const reading = readOrder(fit, species, heldAt);
  if (reading.kind === "unknown") return "?";
  if (reading.kind !== "free") return printHeldOrder(reading.order);
  const interval = fit.orders[species]?.interval ?? null;
  // Without an interval two places are shown: the page says that none can be given.
  const half = interval === null ? 0.05 : (interval[1] - interval[0]) / 2;
  return printUncertain(reading.order, half, { digits: 1, power: 0 }).value;
}
