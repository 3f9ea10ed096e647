"use client";

import { useRouter } from "next/navigation";
import { Button } from "@/app/_ui/button";
import { Choice, Select } from "@/app/_ui/field";
import { MarginSection } from "@/app/_ui/margin";
import type { Order } from "../measuring-order";
import { type BenchOptions as Options, optionsQuery } from "../options";

/** What each order is good for and what it costs. */
function tradeOff(order: Order, seed: number): string {
  switch (order) {
    case "least":
      return "Limits carry-over when a cell or pipette is reused. Drift in time would pass for an order; a repeat of the first recipe at the end shows it.";
    case "random":
      return `Drift in time turns into scatter. Rinse more: a dilute run may follow a concentrated one. Seed ${seed}, so it prints the same again.`;
    case "table":
      return "Easy to follow at the bench. Nothing guards against drift or carry-over.";
  }
}

const NAMES: readonly (readonly [order: Order, name: string])[] = [
  ["least", "Least to most concentrated"],
  ["random", "Randomised"],
  ["table", "As on the mixing table"],
];

/** The choices of a bench sheet. Each stands in the address; the sheet follows. */
export function BenchOptions({
  options,
  starters,
  startsId,
}: {
  options: Options;
  starters: readonly { readonly id: string; readonly head: string }[];
  startsId: string;
}) {
  const router = useRouter();
  const choose = (part: Partial<Options>) =>
    router.replace(`${window.location.pathname}${optionsQuery({ ...options, ...part })}`, { scroll: false });
  return (
    <>
      <MarginSection title="Order of measuring">
        {NAMES.map(([order, name]) => (
          <Choice
            key={order}
            type="radio"
            name="order"
            label={name}
            note={tradeOff(order, options.seed)}
            checked={options.order === order}
            onChange={() => choose({ order })}
          />
        ))}
        {options.order === "random" && (
          <Button size="small" onClick={() => choose({ seed: options.seed + 1 })}>
            Draw another order
          </Button>
        )}
      </MarginSection>
      <MarginSection title="Print with">
        {starters.length > 1 && (
          <div className="mb-2">
            <Select
              label="Added last, starts it"
              value={startsId}
              onChange={(event) => choose({ starts: event.target.value })}
            >
              {starters.map(({ id, head }) => (
                <option key={id} value={id}>
                  {head}
                </option>
              ))}
            </Select>
          </div>
        )}
        <Choice
          type="checkbox"
          label="A blank first"
          checked={options.blank}
          onChange={() => choose({ blank: !options.blank })}
        />
        <Choice
          type="checkbox"
          label="Cautions"
          checked={options.cautions}
          onChange={() => choose({ cautions: !options.cautions })}
        />
      </MarginSection>
    </>
  );
}
