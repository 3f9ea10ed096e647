import { concentrationUnitText } from "kinetics-core/quantities";
import type { ConcentrationUnitName } from "./reading";

/** Small sentences that issues share: places, counts, lists. Columns are 0-based inside and 1-based in words. */

export function columnName(column: number, name: string): string {
  return name === "" ? `column ${column + 1}` : `column ${column + 1} (${name})`;
}

export function lines(first: number, last: number): string {
  return first === last ? `line ${first}` : `lines ${first} to ${last}`;
}

export function lineList(numbers: readonly number[], total: number): string {
  const shown = numbers.slice(0, 4);
  const rest = total - shown.length;
  const list = joined(shown.map(String), rest > 0 ? `${grouped(rest)} more` : null);
  return total === 1 ? `line ${list}` : `lines ${list}`;
}

export function joined(words: readonly string[], more: string | null = null): string {
  const all = more === null ? words : [...words, more];
  if (all.length <= 1) return all.join("");
  return `${all.slice(0, -1).join(", ")} and ${all.at(-1)}`;
}

/** Quoted as in the file, cut where it would fill the page. */
export function quoted(text: string): string {
  return text.length > 48 ? `“${text.slice(0, 45)}…”` : `“${text}”`;
}

export function counted(count: number, one: string, many: string = `${one}s`): string {
  return `${grouped(count)} ${count === 1 ? one : many}`;
}

/** Whole numbers in groups of three from five digits on. */
export function grouped(value: number): string {
  return value < 10_000 ? String(value) : String(value).replace(/\B(?=(\d{3})+$)/g, "\u202f");
}

/** A number as typed back to the reader, with the true minus. */
export function plain(value: number): string {
  return String(value).replace("-", "−");
}

/** "mmol L⁻¹", for sentences; never with a solidus. */
export function unitWords(unit: ConcentrationUnitName): string {
  return concentrationUnitText(unit).replace("^-1", "⁻¹").replace(/^umol/, "µmol");
}
