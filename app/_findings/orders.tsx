import { typeset } from "@/app/_ui/prose";
import { SectionTitle } from "@/app/_ui/sheet";
import { Whisker } from "@/app/_ui/whisker";
import type { OrderView } from "./rate-law.view";

/** Simple orders that the common axis names. */
const TICKS = [
  { at: -1, label: "−1" },
  { at: 0, label: "0" },
  { at: 0.5, label: "½" },
  { at: 1, label: "1" },
  { at: 1.5, label: "1½" },
  { at: 2, label: "2" },
  { at: 3, label: "3" },
] as const;

/** Every order with its interval on one axis, and how it reads. */
export function OrderList({ orders, note }: { orders: readonly OrderView[]; note: string }) {
  const ends = orders.flatMap(({ estimate, interval, heldAt }) => [
    ...(interval ?? []),
    ...(estimate === null ? [] : [estimate]),
    ...(heldAt === null ? [] : [heldAt]),
  ]);
  const least = Math.min(0, ...ends);
  const from = least < -0.05 ? Math.floor(least) : 0;
  const to = Math.max(2, Math.ceil(Math.max(0, ...ends) - 0.05));
  const ticks = TICKS.filter((tick) => tick.at >= from && tick.at <= to);
  const free = orders.filter((order) => order.heldAt === null).length;
  return (
    <div>
      <SectionTitle note={free === 0 ? "all held" : free === orders.length ? "all free, 95 %" : "95 %"}>
        Orders
      </SectionTitle>
      {orders.map((order, index) => (
        <div key={order.speciesId}>
          <p className="flex items-baseline justify-between gap-5">
            <span className="law text-[19px]">order in {order.name}</span>
            <b className="whitespace-nowrap">{order.text}</b>
          </p>
          <p className="text-caption text-ink-2">{typeset(order.reading)}</p>
          {order.estimate !== null && (
            <Whisker
              estimate={order.estimate}
              interval={order.interval}
              from={from}
              to={to}
              ticks={ticks}
              showLabels={index === orders.length - 1}
              label={spoken(order)}
            />
          )}
        </div>
      ))}
      <p className="mt-2.5 text-small text-ink-2">{typeset(note)}</p>
    </div>
  );
}

function spoken({ name, text, interval }: OrderView): string {
  return interval === null
    ? `order in ${name}: ${text}`
    : `order in ${name}: ${text}, 95 % interval ${interval[0].toFixed(3)} to ${interval[1].toFixed(3)}`;
}
