import type { ConstantView, LawView } from "@/app/_ui/law-view";
import type { Sheet } from "@/db/sheet/sheet.schema";
import type { StudyAnalysis } from "./analysis";
import { standingConstant } from "./standing-constant";
import { constantView, lawExpression } from "./standing-law.view";

/** The law at one moment, as much as is needed to say how a change moved it. */
export type LawSnapshot =
  | {
      readonly status: "law";
      readonly expression: LawView;
      readonly constant: ConstantView;
      /** The constant in mol L⁻¹ and s, by which a change of its unit is told from a change of its value. */
      readonly internal: number | null;
    }
  /** `missing` is a sentence, "Two more levels of B are needed." */
  | { readonly status: "no-law"; readonly missing: string };

export function lawSnapshot(sheet: Sheet, { law }: StudyAnalysis): LawSnapshot {
  return law.status === "no-law"
    ? { status: "no-law", missing: law.missing }
    : {
        status: "law",
        expression: lawExpression(sheet, law.fit),
        constant: constantView(sheet, law.fit, 1),
        internal: standingConstant(sheet, law.fit).estimate.estimate,
      };
}

/** What a change did to the law, in prose for a toast: "*k* moves from 11.8 ± 0.3 to 11.7 ± 0.3 L mol^-1 s^-1." */
export function lawEffect(before: LawSnapshot, after: LawSnapshot): string {
  if (after.status === "no-law") {
    return before.status === "law" ? `No law stands any more. ${after.missing}` : "";
  }
  if (before.status === "no-law") return `A law stands now: ${constantInWords(after.constant)}.`;
  const constant = isRestated(before, after)
    ? `${sentenceStart(after.constant.symbol)} is the same in another unit: ${numberInWords(before.constant)} is ${numberInWords(after.constant)}.`
    : constantMoved(before.constant, after.constant);
  return [ordersMoved(before.expression, after.expression), constant]
    .filter((sentence) => sentence !== "")
    .join(" ");
}

type Law = Extract<LawSnapshot, { status: "law" }>;

/** Rounding in a refit of the same numbers stays far below. */
const SAME_PART = 1e-9;

/** Whether one constant is written in two units, as after a change from seconds to minutes. */
function isRestated(before: Law, after: Law): boolean {
  return (
    before.constant.symbol === after.constant.symbol &&
    before.constant.unit !== after.constant.unit &&
    before.internal !== null &&
    after.internal !== null &&
    Math.abs(after.internal - before.internal) <= SAME_PART * Math.abs(before.internal)
  );
}

function constantMoved(before: ConstantView, after: ConstantView): string {
  if (before.symbol !== after.symbol || before.unit !== after.unit) {
    return `${sentenceStart(before.symbol)} was ${numberInWords(before)}; now ${constantInWords(after)}.`;
  }
  if (numberInWords(before) === numberInWords(after)) {
    return `${sentenceStart(after.symbol)} stays at ${numberInWords(after)}.`;
  }
  if (before.number.power === after.number.power && sameValue(before.number.value, after.number.value)) {
    return `${sentenceStart(after.symbol)} keeps its value and ${intervalMoved(before, after)}: ${bare(before)} before, now ${numberInWords(after)}.`;
  }
  const from =
    before.number.power === after.number.power && after.number.power === 0
      ? bare(before)
      : numberInWords(before);
  return `${sentenceStart(after.symbol)} moves from ${from} to ${numberInWords(after)}.`;
}

/** Whether two printed values are one value to the digits that both show: 0.85 and 0.847. */
function sameValue(one: string, other: string): boolean {
  const [a, b] = [one, other].map((text) => Number(text.replace("\u2212", "-").replaceAll("\u202f", "")));
  const digits = Math.min(decimalsOf(one), decimalsOf(other));
  return a !== undefined && b !== undefined && a.toFixed(digits) === b.toFixed(digits);
}

function decimalsOf(text: string): number {
  return text.split(".")[1]?.length ?? 0;
}

function intervalMoved({ number: before }: ConstantView, { number: after }: ConstantView): string {
  if (after.uncertainty === null) return "loses its interval";
  if (before.uncertainty === null) return "gains an interval";
  return Number(after.uncertainty) < Number(before.uncertainty)
    ? "its interval narrows"
    : "its interval widens";
}

function ordersMoved(before: LawView, after: LawView): string {
  const earlier = new Map(before.factors.map((factor) => [factor.symbol, factor.order]));
  const moved = after.factors.flatMap(({ symbol, order }) => {
    const was = earlier.get(symbol);
    if (was === undefined || was === order) return [];
    // A free 1.02 and a settled 1 are two statements; a free 1.00 and a settled 1 differ in the statement alone.
    if (Number(was) === Number(order)) {
      return order.length < was.length
        ? [`the order in ${symbol} now counts as ${order} exactly`]
        : [`the order in ${symbol} is free, ${order}`];
    }
    return [`the order in ${symbol} moves from ${was} to ${order}`];
  });
  return moved.length === 0 ? "" : `${sentenceStart(moved.join(", "))}.`;
}

function constantInWords(constant: ConstantView): string {
  return `${constant.symbol} = ${numberInWords(constant)}`;
}

/** "(2.86 ± 0.07) × 10^-5 L mol^-1 s^-1" */
function numberInWords(constant: ConstantView): string {
  const { number, unit } = constant;
  const pair = bare(constant);
  if (number.power === 0) return `${pair} ${unit}`.trim();
  return `${number.uncertainty === null ? pair : `(${pair})`} × 10^${number.power} ${unit}`.trim();
}

function bare({ number }: ConstantView): string {
  return number.uncertainty === null ? number.value : `${number.value} ± ${number.uncertainty}`;
}

function sentenceStart(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
