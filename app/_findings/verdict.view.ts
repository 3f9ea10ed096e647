import { printNumber } from "kinetics-core/quantities";
import type { StudyAnalysis } from "@/app/_worksheet/analysis";
import { list } from "@/app/_worksheet/missing-law";
import { printExponent, printHeldOrder } from "@/app/_worksheet/print-order";
import { type NamedOrder, standingOrders } from "@/app/_worksheet/standing-constant";
import { countInWords } from "@/app/_worksheet/words";
import type { Sheet } from "@/db/sheet/sheet.schema";

/** The finding as a sentence: a claim that the highlighter marks, then the numbers that support it. */
export interface VerdictView {
  readonly claim: string;
  readonly support: string;
}

export function verdictOf(sheet: Sheet, analysis: StudyAnalysis): VerdictView {
  const { law, runs } = analysis;
  if (law.status === "no-law") return { claim: "The runs do not support a law yet.", support: law.missing };
  const standing = runs.filter((run) => run.state === "standing").length;
  const orders = standingOrders(sheet, law.fit);
  const settled = orders.filter((one) => one.reading.kind === "settled");
  const held = orders.filter((one) => one.reading.kind === "held");
  const free = orders.filter((one) => one.reading.kind === "free");
  const sharp = free.filter((one) => isSharp(law.fit, one.name));
  const open = free.filter((one) => !sharp.includes(one));
  return {
    claim: claimOf(counted(standing), { settled, held, sharp, open }, law.fit),
    support: [
      departure(law.fit.residuals),
      freeOrders(law.fit, [...settled, ...free]),
      freedom(law.fit.degreesOfFreedom),
    ]
      .filter((sentence) => sentence !== "")
      .join(" "),
  };
}

/** Known well, and near no simple order: a finding, where a wide interval is a lack of one. */
function isSharp(fit: Fit, name: string): boolean {
  const interval = fit.orders[name]?.interval ?? null;
  return (
    fit.simpleOrders.reading[name] === "nearest" &&
    interval !== null &&
    (interval[1] - interval[0]) / 2 <= SHARP_HALF_WIDTH
  );
}

/** As wide as the interval of an order may be to settle it. */
const SHARP_HALF_WIDTH = 0.25;

function counted(runs: number): string {
  return `${countInWords(runs)} runs`;
}

interface Sorted {
  readonly settled: readonly NamedOrder[];
  readonly held: readonly NamedOrder[];
  readonly sharp: readonly NamedOrder[];
  readonly open: readonly NamedOrder[];
}

function claimOf(runs: string, { settled, held, sharp, open }: Sorted, fit: Fit): string {
  if (settled.length + sharp.length + open.length === 0)
    return `${runs} fix *k* with ${list(held.map((one) => `the order in ${one.name} held at ${orderOf(one)}`))}.`;
  const supported = [
    ...(settled.length === 0 ? [] : [ordersInWords(settled)]),
    ...sharp.map(({ name }) => `an order of ${printExponent(fit, name, null)} in ${name}`),
  ];
  const parts = [
    ...(supported.length === 0 ? [] : [`support ${list(supported)}`]),
    ...(open.length === 0
      ? []
      : [`leave the order${open.length > 1 ? "s" : ""} in ${list(open.map((one) => one.name))} unsettled`]),
  ];
  const holding =
    held.length === 0 ? "" : `, with ${list(held.map((one) => `${one.name} held at ${orderOf(one)}`))}`;
  return `${runs} ${list(parts)}${holding}.`;
}

const ORDINALS: Readonly<Record<string, string>> = {
  "-1": "order −1",
  "-0.5": "order −½",
  "0": "zero order",
  "0.5": "half order",
  "1": "first order",
  "1.5": "order 1½",
  "2": "second order",
  "3": "third order",
};

function ordersInWords(orders: readonly NamedOrder[]): string {
  const numbers = orders.flatMap(({ reading }) => (reading.kind === "settled" ? [reading.order] : []));
  const first = numbers[0];
  if (first !== undefined && numbers.length > 1 && numbers.every((order) => order === first))
    return `${ORDINALS[String(first)] ?? `order ${first}`} in each reactant`;
  return list(
    orders.map(({ name, reading }) =>
      reading.kind === "settled"
        ? `${ORDINALS[String(reading.order)] ?? `order ${reading.order}`} in ${name}`
        : `an open order in ${name}`,
    ),
  );
}

function orderOf({ reading }: NamedOrder): string {
  return reading.kind === "unknown" ? "?" : printHeldOrder(reading.order);
}

type Fit = Extract<StudyAnalysis["law"], { status: "law" }>["fit"];

function departure(residuals: Fit["residuals"]): string {
  const worst = [...residuals].sort((a, b) => Math.abs(b.residual) - Math.abs(a.residual))[0];
  if (worst === undefined || residuals.length < 2) return "";
  const percent = Math.abs(Math.expm1(worst.residual)) * 100;
  if (percent < 0.05) return "No run departs from the law by more than 0.05 %.";
  return `No run departs from the law by more than ${printNumber(percent, 2)} % (${worst.label}).`;
}

/** How close the data hold each settled order to its simple value, and where an unsettled one lies. */
function freeOrders(fit: Fit, orders: readonly NamedOrder[]): string {
  const reach: { name: string; order: number; within: number }[] = [];
  const open: string[] = [];
  for (const { name, reading } of orders) {
    const interval = fit.orders[name]?.interval ?? null;
    if (interval === null) continue;
    const [low, high] = interval;
    if (reading.kind === "settled")
      reach.push({ name, order: reading.order, within: Math.max(high - reading.order, reading.order - low) });
    if (reading.kind === "free")
      open.push(`The order in ${name} lies between ${twoPlaces(low)} and ${twoPlaces(high)}.`);
  }
  const [first, ...rest] = reach;
  if (first === undefined) return open.join(" ");
  const widest = printNumber(Math.max(...reach.map((one) => one.within)), 2);
  const held =
    rest.length > 0 && rest.every((one) => one.order === first.order)
      ? `The free orders lie within ${widest} of ${printHeldOrder(first.order)}.`
      : `${reach.length === 1 ? `The order in ${first.name} lies` : "The free orders lie"} within ${widest} of ${reach.length === 1 ? printHeldOrder(first.order) : "these"}.`;
  return [held, ...open].join(" ");
}

function twoPlaces(value: number): string {
  return value.toFixed(2).replace("-", "\u2212");
}

function freedom(degrees: number): string {
  if (degrees === 0)
    return "As many runs as unknowns: nothing is left to judge them by, and no interval can be given.";
  return degrees <= 2
    ? `The intervals rest on ${degrees === 1 ? "one degree" : "two degrees"} of freedom.`
    : "";
}
