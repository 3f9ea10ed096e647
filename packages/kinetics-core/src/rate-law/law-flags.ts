import { type Estimate, type Flag, inARow } from "kinetics-core/quantities";
import type { OrdersFit } from "./fit-orders";
import type { RateLawFit } from "./rate-law";
import { nearestSimpleOrder } from "./simple-orders";

/** What a reader should know about the law as a whole. */

/**
 * Figures of an exercise, or computed ones: measured rates always scatter. `simple`: the law of simple orders, which
 * has freedom where free orders take it all.
 */
export function exactTableFlags(fit: OrdersFit, simple: OrdersFit | null): readonly Flag[] {
  const tested = fit.degreesOfFreedom > 0 ? fit : simple;
  if (tested === null || !tested.exact || tested.degreesOfFreedom === 0) return [];
  return [
    {
      code: "exact-table",
      severity: "note",
      message:
        "The rates obey the law to the last digit, as computed figures do. Measured rates scatter, so the intervals here say nothing about a measurement.",
    },
  ];
}

/** No freedom: the numbers are exact solutions. One or two: an interval, but a wide and fragile one. */
export function freedomFlags(fit: OrdersFit): readonly Flag[] {
  const freedom = fit.degreesOfFreedom;
  const runs = fit.runs.length;
  const parameters = fit.design.terms.columns;
  if (freedom === 0)
    return [
      {
        code: "no-freedom",
        severity: "blocks",
        message: `${runs === 1 ? "One run carries" : `${runs} runs carry`} ${parameters === 1 ? "one parameter" : `${parameters} parameters`}: the values are exact solutions, and no uncertainty can be given. One more run gives a first interval, three more a usable one.`,
      },
    ];
  if (freedom > 2) return [];
  return [
    {
      code: "little-freedom",
      severity: "weakens",
      message: `The intervals rest on ${freedom === 1 ? "one degree" : "two degrees"} of freedom (${runs} runs, ${parameters === 1 ? "one parameter" : `${parameters} parameters`}), so they are wide and their width is itself uncertain. ${freedom === 1 ? "Two more runs" : "One more run"} would narrow them.`,
    },
  ];
}

export function scopeFlags(fit: OrdersFit, blocksIgnored: boolean): readonly Flag[] {
  const flags: Flag[] = [];
  if (blocksIgnored)
    flags.push({
      code: "blocks-not-separable",
      severity: "weakens",
      message:
        "The runs cannot tell a difference between blocks from the orders or from scatter, so blocks were not counted. Repeat one recipe in every block.",
    });
  if (!fit.settled)
    flags.push({
      code: "rate-scale-unsettled",
      severity: "blocks",
      message:
        "The fit to the rates themselves did not settle: rates that cannot be told from zero leave the law open. Set those runs aside, or measure them for longer.",
    });
  return flags;
}

/** Orders that no simple order matches, and simple orders that hang on a single run. */
export function readingFlags(
  species: readonly string[],
  orders: readonly Estimate[],
  simple: RateLawFit["simpleOrders"],
  without: RateLawFit["leaveOneOut"],
  fit: OrdersFit,
): readonly Flag[] {
  return species.flatMap((name, i): readonly Flag[] => {
    const order = orders[i];
    if (order === undefined || order.estimate === null || order.interval === null) return [];
    if (simple.reading[name] === "nearest") {
      const [low, high] = order.interval;
      return [
        {
          code: "order-not-simple",
          severity: "note",
          message: `The order in ${name} lies between ${limits(low, high)}, which contains no simple order near it: a law of another form may lie behind it.`,
        },
      ];
    }
    if (simple.reading[name] !== "is" || fit.exact) return [];
    const settled = simple.orders[name];
    const turning = without.filter((one) => {
      const value = one.orders[name] ?? null;
      return value !== null && nearestSimpleOrder(value) !== settled;
    });
    if (turning.length === 0) return [];
    return [
      {
        code: "reading-on-one-run",
        severity: "weakens",
        message: `Without ${inARow(turning.map((one) => one.label))} the order in ${name} would read otherwise. A repeat would show whether the law may rest on ${turning.length === 1 ? "it" : "them"}.`,
      },
    ];
  });
}

/** With as many places as it takes to tell the ends apart. */
function limits(low: number, high: number): string {
  const places = Math.min(Math.max(2, 1 - Math.floor(Math.log10(high - low || 1))), 6);
  const [one = "", other = ""] = [low, high].map((value) => value.toFixed(places).replace("-", "\u2212"));
  return `${one} and ${other}`;
}
