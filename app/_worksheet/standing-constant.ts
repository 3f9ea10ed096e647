import type { Estimate } from "kinetics-core/quantities";
import type { RateLawFit } from "kinetics-core/rate-law";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { lawName } from "./law-name";
import { lawSpecies } from "./present-runs";
import { type OrderReading, readOrder } from "./print-order";

/**
 * What the law may claim as its constant. With every order settled or held k has a unit of its own; with any order
 * free it has none worth printing, and the rate at the centre of the design stands in its place.
 */
export type StandingConstant =
  | {
      readonly kind: "rate-constant";
      /** In (mol L⁻¹)^(1−n) s⁻¹. */
      readonly estimate: Estimate;
      readonly overallOrder: number;
      readonly budget: RateLawFit["budget"];
    }
  | {
      readonly kind: "rate-at-centre";
      /** In mol L⁻¹ s⁻¹. */
      readonly estimate: Estimate;
      readonly budget: RateLawFit["budget"];
    };

export interface NamedOrder {
  readonly speciesId: string;
  readonly name: string;
  readonly heldAt: number | null;
  readonly reading: OrderReading;
}

/** The orders of a fit in the order in which the law names its species. */
export function standingOrders(sheet: Sheet, fit: RateLawFit): readonly NamedOrder[] {
  return lawSpecies(sheet).map((species) => {
    const name = lawName(species);
    const heldAt = sheet.orders[species.id] ?? null;
    return { speciesId: species.id, name, heldAt, reading: readOrder(fit, name, heldAt) };
  });
}

export function standingConstant(sheet: Sheet, fit: RateLawFit): StandingConstant {
  const orders = standingOrders(sheet, fit).map((one) => one.reading);
  const fixed = orders.flatMap((one) => (one.kind === "settled" || one.kind === "held" ? [one.order] : []));
  if (fixed.length < orders.length)
    return { kind: "rate-at-centre", estimate: fit.centre.rate, budget: fit.centre.budget };
  const overallOrder = fixed.reduce((sum, order) => sum + order, 0);
  // With all orders held the fit is already that of the law as it stands.
  const allHeld = orders.every((one) => one.kind === "held");
  return allHeld
    ? { kind: "rate-constant", estimate: fit.rateConstant, overallOrder, budget: fit.budget }
    : {
        kind: "rate-constant",
        estimate: fit.simpleOrders.rateConstant,
        overallOrder,
        budget: fit.simpleOrders.budget,
      };
}
