import { printNumber, superscript } from "./printed-number";
import { concentrationUnitText } from "./rate-constant-unit";
import type { ConcentrationUnit } from "./units";

/** How findings speak: names in a row, concentrations with their unit, percentages. */

/** "A", "A and B", "A, B and C"; beyond `most` names the rest is counted. */
export function inARow(names: readonly string[], most = 8): string {
  const shown =
    names.length > most ? [...names.slice(0, most - 1), `${names.length - most + 1} more`] : names;
  const last = shown.at(-1) ?? "";
  return shown.length < 2 ? last : `${shown.slice(0, -1).join(", ")} and ${last}`;
}

/** 0.0023 mol/L as "0.0023 mol L⁻¹", trailing zeros dropped. */
export function concentrationInWords(value: number, unit: ConcentrationUnit): string {
  return `${numberInWords(value)} ${concentrationUnitText(unit)
    .replace(/\^(-?\d+)/g, (_, exponent: string) => superscript(Number(exponent)))
    .replace("umol", "µmol")}`;
}

/** Four significant digits at most, trailing zeros dropped. */
export function numberInWords(value: number): string {
  return printNumber(value, 4)
    .replace(/(\.\d*?)0+(?=$|\s)/, "$1")
    .replace(/\.(?=$|\s)/, "");
}

/** 0.034 as "3.4 %". */
export function percent(part: number): string {
  const value = 100 * part;
  return `${value >= 10 ? value.toFixed(0) : value >= 1 ? value.toFixed(1) : value.toFixed(2)} %`;
}

/** "R03 has" or "R03 and R05 have". */
export function verb(count: number, singular: string, plural: string): string {
  return count === 1 ? singular : plural;
}
