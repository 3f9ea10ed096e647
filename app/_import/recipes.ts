import { looksNumeric, type NumberFormat, readCell } from "./number";
import type { ConcentrationUnitName, SpeciesContext } from "./reading";
import type { Row } from "./rows";
import { concentrationUnitOf, importedConcentrationToMolar, LONGEST_HEAD, splitUnit } from "./units";

/**
 * Starting concentrations that a file carries above its data: "[A] / mmol/L;0.5;1.0;2.0", a value over each trace, or
 * one value for all of them. The species is known by its symbol or its name.
 */

export interface SpeciesKey {
  readonly species: SpeciesContext;
  readonly unit: ConcentrationUnitName;
  /** False: the file names none and the unit of the set-up is taken. */
  readonly unitInFile: boolean;
  /** Written as a concentration, "[A]" or "c(A)", and not as a bare word that could mean something else. */
  readonly explicit: boolean;
}

/** The species that a label names, or null. */
export function speciesKey(label: string, species: readonly SpeciesContext[]): SpeciesKey | null {
  if (label.length > LONGEST_HEAD) return null;
  const { name, unit } = splitUnit(label.replace(/[:=]\s*$/, ""));
  const withoutZero = name
    .trim()
    .replace(/(_?0|₀|_?\{0\}|\s+(initial|start|at start))$/i, "")
    .trim();
  const wrapped =
    /^\[(.+)\]$/.exec(withoutZero) ?? /^c(?:onc)?\.?\s?[([_]\s?([^)\]]+)[)\]]?$/i.exec(withoutZero);
  const innermost = (wrapped?.[1] ?? withoutZero).replace(/(_?0|₀)$/, "").trim();
  for (const word of [wrapped?.[1]?.trim(), innermost, withoutZero, name.trim()]) {
    if (!word) continue;
    const found =
      species.find((one) => one.symbol !== "" && one.symbol === word) ??
      species.find((one) => one.name !== "" && one.name.toLowerCase() === word.toLowerCase());
    if (!found) continue;
    const inFile = concentrationUnitOf(unit);
    if (unit !== "" && inFile === null) return null;
    return {
      species: found,
      unit: inFile ?? found.unit,
      unitInFile: inFile !== null,
      explicit: wrapped !== null || inFile !== null || found.symbol !== word,
    };
  }
  return null;
}

/** A line that begins with a species and holds nothing else but numbers. */
export function isRecipeRow(row: Row, species: readonly SpeciesContext[]): boolean {
  const [key, ...rest] = row.cells.filter((cell) => cell !== "");
  if (key === undefined || rest.length === 0 || speciesKey(key, species) === null) return false;
  const values = rest.filter((cell, i) => !(i === 0 && concentrationUnitOf(cell) !== null));
  return values.length > 0 && values.every(looksNumeric);
}

export interface RecipeLine {
  readonly line: number;
  readonly key: SpeciesKey;
  readonly label: string;
  /** mol L⁻¹ by 0-based column, or for every trace. */
  readonly values: ReadonlyMap<number, number> | number;
  /** Cells that are no concentration. */
  readonly unreadable: readonly { readonly column: number; readonly text: string }[];
}

export function readRecipeRow(
  row: Row,
  species: readonly SpeciesContext[],
  format: NumberFormat,
): RecipeLine | null {
  const keyColumn = row.cells.findIndex((cell) => cell !== "");
  const label = row.cells[keyColumn] ?? "";
  let key = speciesKey(label, species);
  if (key === null) return null;
  const values = new Map<number, number>();
  const unreadable: { column: number; text: string }[] = [];
  for (const [column, cell] of row.cells.entries()) {
    if (column <= keyColumn || cell === "") continue;
    const unit = values.size === 0 && unreadable.length === 0 ? concentrationUnitOf(cell) : null;
    if (unit !== null) {
      key = { ...key, unit, unitInFile: true };
      continue;
    }
    const reading = readCell(cell, format);
    if (reading.kind === "number" && reading.value >= 0) {
      values.set(column, importedConcentrationToMolar(reading.value, key.unit));
    } else unreadable.push({ column, text: cell });
  }
  const single = values.size === 1 && unreadable.length === 0 ? [...values.values()][0] : undefined;
  return { line: row.line, key, label, values: single ?? values, unreadable };
}
