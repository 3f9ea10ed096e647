"use client";

import { useActionState, useState } from "react";
import type { OrderView } from "@/app/_findings/rate-law.view";
import { Button } from "@/app/_ui/button";
import { Field } from "@/app/_ui/field";
import { printHeldOrder } from "@/app/_worksheet/print-order";
import { useStudyChange } from "../../../_change/use-study-change";
import { saveOrders } from "../actions";
import { readTypedOrder } from "../read-order";

interface Refusal {
  readonly speciesId: string | null;
  readonly message: string;
}

/** Orders free or held to a value, one box per species; empty is free. */
export function OrderForm({
  target,
  orders,
}: {
  target: { readonly studyId: string; readonly base: number };
  orders: readonly OrderView[];
}) {
  const change = useStudyChange(target.studyId);
  const [typed, setTyped] = useState(() =>
    Object.fromEntries(
      orders.map((order) => [order.speciesId, order.heldAt === null ? "" : printHeldOrder(order.heldAt)]),
    ),
  );
  const [refusal, act, saving] = useActionState(async (): Promise<Refusal | null> => {
    const read: Record<string, number | null> = {};
    for (const { speciesId, name } of orders) {
      const value = readTypedOrder(typed[speciesId] ?? "");
      if (value === undefined)
        return {
          speciesId,
          message: `“${typed[speciesId]}” is no order in ${name}. Type a number like 1, ½ or −1, or leave the box empty to set it free.`,
        };
      read[speciesId] = value;
    }
    const result = await saveOrders({ ...target, orders: read });
    if (!result.ok) return { speciesId: null, message: result.message };
    change.announce(result.value);
    return null;
  }, null);
  return (
    <form action={act} className="mt-3 print:hidden">
      <div className="flex flex-wrap items-end gap-3">
        {orders.map(({ speciesId, name }) => (
          <div key={speciesId} className="w-32">
            <Field
              label={`Hold order in ${name} at`}
              placeholder="free"
              value={typed[speciesId] ?? ""}
              onChange={(event) => setTyped({ ...typed, [speciesId]: event.target.value })}
              error={refusal?.speciesId === speciesId ? refusal.message : undefined}
            />
          </div>
        ))}
        <Button type="submit" size="small" disabled={saving}>
          Set orders
        </Button>
      </div>
      {refusal !== null && refusal.speciesId === null && (
        <p className="field-error mt-1">{refusal.message}</p>
      )}
      <p className="hint mt-1">Leave a box empty to let the runs say.</p>
    </form>
  );
}
