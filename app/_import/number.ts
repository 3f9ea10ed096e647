import { MEASURED } from "@/db/limits";

/**
 * Numbers as people and instruments write them, read to exactly the double of the literal: decimal point or comma,
 * grouped thousands, scientific notation, the true minus U+2212. A cell is never half read: "12abc" is no number.
 */

/** `either`: any single mark is the decimal mark and nothing is grouped. */
export type DecimalMark = "." | "," | "either";

export type CellReading =
  | { readonly kind: "number"; readonly value: number }
  /** No reading was taken: an empty cell. */
  | { readonly kind: "empty" }
  /** The instrument's own word for no reading: NaN, Inf, overflow. */
  | { readonly kind: "no-reading" }
  /** One mark and three digits where the mark is not the decimal mark: 1 234 or 1.234. */
  | { readonly kind: "ambiguous"; readonly asDecimal: number; readonly asGrouped: number }
  /** A number with a mark of doubt: 0.214*, <0.4, 0.31 (sat). Never read without being asked about. */
  | { readonly kind: "flagged"; readonly asNumber: number }
  /** Larger than any reading, or too small for a double. */
  | { readonly kind: "out-of-range" }
  | { readonly kind: "text" };

export interface NumberFormat {
  readonly decimalMark: DecimalMark;
  /** A person said what the decimal mark is, so the other mark can only group thousands. */
  readonly stated: boolean;
}

const NO_READING =
  /^(#?nan|n\/?a|#n\/a|#num!|#value!|#div\/0!|null|none|[+\-−]?(inf(inity)?|∞)|-1\.#ind|1\.#inf|1\.#qnan|ovrflw|over(flow|range)?|out of range|-+|–|—|\*+|\.)$/i;

const SPACE_GROUPED = /^\d{1,3}([ \u00a0\u202f'’]\d{3})+(?=$|[.,eE])/;
const PLAIN = /^(\d+(\.\d*)?|\.\d+)([eE][+-]?\d+)?$/;

/** What one cell says. Never throws; surrounding blanks are ignored. */
export function readCell(cell: string, format: NumberFormat): CellReading {
  const trimmed = cell.trim();
  if (trimmed === "") return { kind: "empty" };
  if (format.decimalMark === "." && isPlain(trimmed)) return fromLiteral(trimmed);

  let text = trimmed.replace(/[−﹣－]/g, "-").replace(/[×·]10\^?(?=[+-]?\d+$)/, "e");
  let sign = "";
  if (text.startsWith("-") || text.startsWith("+")) {
    sign = text.startsWith("-") ? "-" : "";
    text = text.slice(1).trimStart();
  }
  if (SPACE_GROUPED.test(text)) text = text.replace(/[ \u00a0\u202f'’]/g, "");

  const points = text.split(".").length - 1;
  const commas = text.split(",").length - 1;
  const literal = decimalLiteral(text, points, commas, format);
  if (literal !== null && typeof literal === "object") {
    const asDecimal = Number(sign + literal.ambiguous.replace(",", "."));
    const asGrouped = Number(sign + literal.ambiguous.replace(/[.,]/, ""));
    return { kind: "ambiguous", asDecimal, asGrouped };
  }
  if (literal !== null && PLAIN.test(literal)) return fromLiteral(sign + literal);
  return NO_READING.test(trimmed) ? { kind: "no-reading" } : (flagged(trimmed, format) ?? { kind: "text" });
}

/** Below or above a limit, or a mark behind a blank, in brackets, or of signs that belong to no number. */
const FLAGGED = /^([<>≤≥~]\s*)?(\S+?)(\s*(?:[*†‡#!?]{1,3}|\([^()]{1,16}\)|\[[^[\]]{1,16}\])|\s+[A-Z]{1,4})?$/;

function flagged(text: string, format: NumberFormat): CellReading | null {
  if (text.length > 60) return null;
  const [, limit, inner = "", mark] = FLAGGED.exec(text) ?? [];
  if (limit === undefined && mark === undefined) return null;
  const reading = readCell(inner, format);
  return reading.kind === "number" ? { kind: "flagged", asNumber: reading.value } : null;
}

/** The number in JavaScript's own notation, a lone ambiguous mark, or null where the marks make no number. */
function decimalLiteral(
  text: string,
  points: number,
  commas: number,
  format: NumberFormat,
): string | { ambiguous: string } | null {
  if (points + commas === 0) return text;
  if (format.decimalMark === "either") return points + commas === 1 ? text.replace(",", ".") : null;
  const mark = format.decimalMark;
  const other = mark === "." ? "," : ".";
  const others = mark === "." ? commas : points;
  if (others === 0) return text.replace(mark, ".");
  const whole = text.split(mark)[0] ?? "";
  if (!isGrouped(whole, other)) return null;
  const certain = format.stated || others > 1 || text.includes(mark);
  return certain ? text.replaceAll(other, "").replace(mark, ".") : { ambiguous: text };
}

/** "1,234,567" with `mark` ",": groups of exactly three digits, and no leading zero. */
export function isGrouped(text: string, mark: "." | ","): boolean {
  return mark === "," ? /^[1-9]\d{0,2}(,\d{3})+$/.test(text) : /^[1-9]\d{0,2}(\.\d{3})+$/.test(text);
}

/** The overwhelmingly usual cell, read without an allocation; NaN where it takes `readCell` to say what it is. */
export function plainNumber(cell: string, format: NumberFormat): number {
  const comma = format.decimalMark === ",";
  if (comma && cell.includes(".")) return Number.NaN;
  const literal = comma ? cell.replace(",", ".") : cell;
  if (format.decimalMark === "either" || !isPlain(literal)) return Number.NaN;
  const value = Number(literal);
  return value === 0 || Math.abs(value) > MEASURED.most ? Number.NaN : value;
}

function isPlain(text: string): boolean {
  return /^[+-]?(\d+(\.\d*)?|\.\d+)([eE][+-]?\d+)?$/.test(text);
}

function fromLiteral(literal: string): CellReading {
  const value = Number(literal);
  if (Math.abs(value) > MEASURED.most) return { kind: "out-of-range" };
  if (value === 0 && /[1-9]/.test(literal.split(/[eE]/)[0] ?? "")) return { kind: "out-of-range" };
  return { kind: "number", value };
}

/** Whether a cell could be a number under some decimal mark; used before the mark is known. */
export function looksNumeric(cell: string): boolean {
  const trimmed = cell.trim();
  if (trimmed === "") return false;
  return /^[+\-−]?\s?(\d[\d.,\u00a0\u202f '’]*|[.,]\d+)([eE][+\-−]?\d+)?$/.test(trimmed);
}
