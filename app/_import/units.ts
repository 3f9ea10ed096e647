import { concentrationToMolar, timeToSeconds } from "kinetics-core/quantities";
import type { ConcentrationUnitName } from "./reading";

/** Units as they stand in files, and the one place where imported numbers become mol L⁻¹, s and K. */

export type ImportedTimeUnit = "ms" | "s" | "min" | "h";

const TIME: readonly [RegExp, ImportedTimeUnit][] = [
  [/^(ms|msec|milliseconds?|millisekunden?)$/i, "ms"],
  [/^(s|secs?|seconds?|sek|sekunden?|secondes?|segundos?)$/i, "s"],
  [/^(mins?|minutes?|minuten?|minutos?)$/i, "min"],
  [/^(h|hrs?|hours?|std|stunden?|heures?|horas?)$/i, "h"],
];

export function timeUnitOf(text: string): ImportedTimeUnit | null {
  const bare = text.replace(/^[([]|[)\]]$/g, "").trim();
  return TIME.find(([pattern]) => pattern.test(bare))?.[1] ?? null;
}

export function concentrationUnitOf(text: string): ConcentrationUnitName | null {
  const bare = text
    .replace(/^[([]|[)\]]$/g, "")
    .replace(/[\s\u00a0\u202f·.*^]/g, "")
    .replace(/⁻/g, "-")
    .replace(/−/g, "-")
    .replace(/¹/g, "1")
    .replace(/³/g, "3")
    .replace(/[µμ]/g, "u");
  const match = /^(m|u|micro|milli)?(M|mol(?:ar)?(?:\/(?:L|l|dm3)|(?:L|l)-1|dm-3))$/.exec(bare);
  if (!match) return null;
  if (match[1] === "m" || match[1] === "milli") return "mmol/L";
  return match[1] ? "umol/L" : "mol/L";
}

/** Longer heads carry no unit: looking for one takes time that grows with the square of the length. */
export const LONGEST_HEAD = 300;

/** "t / s", "Time (min)", "[A] / mmol/L": the name and the unit in it, either of which may be empty. */
export function splitUnit(cell: string): { readonly name: string; readonly unit: string } {
  const text = cell.trim();
  if (text.length > LONGEST_HEAD) return { name: text, unit: "" };
  const bracketed = /^(.+?)\s*[([]([^()[\]]*(?:\([^()]*\)[^()[\]]*)?)[)\]]$/.exec(text);
  // "c(A)" is the concentration of A and no quantity c in ampere.
  const isConcentration = /^c(onc)?\.?$/i.test(bracketed?.[1] ?? "");
  if (bracketed?.[1] && !isConcentration && isUnit(bracketed[2] ?? ""))
    return { name: bracketed[1], unit: bracketed[2] ?? "" };
  const slash = /^(.+?)\s*\/\s*(.+)$/.exec(text);
  if (slash?.[1] && slash[2] && isUnit(slash[2])) return { name: slash[1], unit: slash[2] };
  const comma = /^(.+?)\s*[,_]\s*(.+)$/.exec(text);
  if (comma?.[1] && comma[2] && timeUnitOf(comma[2]) !== null && /^(t|time|zeit)$/i.test(comma[1])) {
    return { name: comma[1], unit: comma[2] };
  }
  return { name: text, unit: "" };
}

/** Whether a cell is a unit that stands in a table of kinetic traces. */
export function isUnit(text: string): boolean {
  const bare = text.replace(/^[([]|[)\]]$/g, "").trim();
  return (
    timeUnitOf(bare) !== null ||
    concentrationUnitOf(bare) !== null ||
    temperatureUnitOf(bare) !== null ||
    isAbsorbanceUnit(bare) ||
    /^(m|µ|μ|u)?S(\/cm|\s?cm-1|\s?cm⁻¹)?$|^(m|k|µ)?(V|Pa|bar|A)$|^(mmHg|Torr|%|nm|cm|counts?|mAU\*?min|g\/L|mg\/L)$/.test(
      bare,
    )
  );
}

/** 1, AU, a.u., Abs, OD and their thousandths. */
export function isAbsorbanceUnit(text: string): boolean {
  return /^(1|-|m?(a\.?u\.?|abs|a|od|absorbance))$/i.test(text.trim());
}

export function isThousandthOf(text: string, unit: string): boolean {
  const bare = text.replace(/^[([]|[)\]]$/g, "").trim();
  return /^m(a\.?u\.?|abs|od)$/i.test(bare) || (unit !== "" && unit !== "1" && bare === `m${unit}`);
}

export function temperatureUnitOf(text: string): "degC" | "K" | null {
  const bare = text.replace(/^[([]|[)\]]$/g, "").trim();
  if (/^(°\s?C|℃|deg\.?\s?C|degC|Celsius)$/i.test(bare)) return "degC";
  return /^(K|kelvin)$/.test(bare) ? "K" : null;
}

/** Seconds read from the file stay the very double of their literal. */
export function importedTimeToSeconds(value: number, unit: ImportedTimeUnit): number {
  return unit === "ms" ? value / 1000 : timeToSeconds(value, unit);
}

export function importedConcentrationToMolar(value: number, unit: ConcentrationUnitName): number {
  return concentrationToMolar(value, unit);
}

export const CELSIUS_ZERO_KELVIN = 273.15;
