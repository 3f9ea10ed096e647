import type { Kysely } from "kysely";
import type { Database } from "../database";
import type { Actor } from "../member/actor";
import type { Sheet } from "../sheet/sheet.schema";
import { type ChangeResult, type ChangeTarget, changeStudy } from "./change-study";

/** Frees (null) or holds (a number) the orders named; the others stay as they are. */
export function setOrders(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  orders: Sheet["orders"],
): Promise<ChangeResult> {
  return changeStudy(
    db,
    actor,
    target,
    { verb: "orders", summary: (before) => `${inWords(before, orders)}.` },
    (sheet) => {
      const inLaw = new Set(sheet.species.filter((one) => one.inLaw).map((one) => one.id));
      if (Object.keys(orders).some((id) => !inLaw.has(id))) {
        return {
          refused: "An order belongs to a species of the law. Mark the species as part of the law first.",
        };
      }
      return { ...sheet, orders: { ...sheet.orders, ...orders } };
    },
  );
}

function inWords(sheet: Sheet, orders: Sheet["orders"]): string {
  const parts = Object.entries(orders).map(([id, held]) => {
    const symbol = sheet.species.find((one) => one.id === id)?.symbol ?? "";
    return held === null ? `order in ${symbol} free` : `order in ${symbol} held at ${held}`;
  });
  const text = parts.join(", ");
  return text.charAt(0).toUpperCase() + text.slice(1);
}
