import type { Corrections } from "./corrections";
import { type NumberFormat, readCell } from "./number";
import type { Guess, SpeciesContext } from "./reading";
import { isRecipeRow } from "./recipes";
import { isBlank, type Row } from "./rows";
import { isUnit } from "./units";

/**
 * Where things stand in the file: preamble, line of names, line of units, starting concentrations, first line of data.
 * Data is the longest stretch of lines whose leading column is a number; what stands above it is read upward.
 */

export interface Frame {
  readonly headerLine: Guess<number | null>;
  readonly unitLine: Guess<number | null>;
  readonly firstDataLine: Guess<number>;
  /** Rows above the data, by what they are. */
  readonly header: Row | null;
  readonly units: Row | null;
  readonly recipes: readonly Row[];
  /** The row above the names, which may hold run names over pairs of columns. */
  readonly titles: Row | null;
  /** Usual number of cells of a line of data. */
  readonly columns: number;
  readonly data: readonly Row[];
}

/** null: no line of the sample holds two numbers or a number under a name. */
export function findFrame(
  sample: readonly Row[],
  format: NumberFormat,
  species: readonly SpeciesContext[],
  stated: Pick<Corrections, "headerLine" | "unitLine" | "firstDataLine">,
): Frame | null {
  const start =
    stated.firstDataLine === undefined
      ? guessStart(sample, format, species)
      : Math.max(
          0,
          sample.findIndex((row) => row.line >= (stated.firstDataLine ?? 1)),
        );
  if (start === null) return null;
  const data = sample.slice(start).filter((row) => !isBlank(row));
  const first = data[0];
  if (!first) return null;

  const above = sample.slice(0, start);
  const guessed = readUpward(above, species);
  const rowAt = (line: number | null) => above.find((row) => row.line === line) ?? null;
  const header = stated.headerLine === undefined ? guessed.header : rowAt(stated.headerLine);
  const units = stated.unitLine === undefined ? guessed.units : rowAt(stated.unitLine);
  const titlesAbove = header
    ? above.filter((row) => row.line < header.line && !isBlank(row)).at(-1)
    : undefined;

  return {
    headerLine: guessOf(
      header,
      stated.headerLine,
      "names above the first line of numbers",
      "no line of names above the numbers",
    ),
    unitLine: guessOf(units, stated.unitLine, "nothing but units", "no line of units"),
    firstDataLine: {
      value: first.line,
      reason: stated.firstDataLine === undefined ? "first line of numbers" : "chosen by hand",
      basis: stated.firstDataLine === undefined ? "file" : "stated",
    },
    header,
    units,
    recipes: above.filter((row) => row !== header && row !== units && isRecipeRow(row, species)),
    titles: titlesAbove && titlesAbove.cells.filter((cell) => cell !== "").length > 1 ? titlesAbove : null,
    columns: usualWidth(data, header),
    data,
  };
}

function guessOf(
  row: Row | null,
  stated: number | null | undefined,
  found: string,
  missing: string,
): Guess<number | null> {
  if (stated !== undefined) return { value: row?.line ?? null, reason: "chosen by hand", basis: "stated" };
  return row
    ? { value: row.line, reason: found, basis: "file" }
    : { value: null, reason: missing, basis: "file" };
}

/** Index of the first row of the longest stretch of numbers. */
function guessStart(
  sample: readonly Row[],
  format: NumberFormat,
  species: readonly SpeciesContext[],
): number | null {
  const isWords = (row: Row) => isUnitRow(row) || isRecipeRow(row, species);
  const isNumber = (cell: string) => {
    const { kind } = readCell(cell, format);
    return kind === "number" || kind === "ambiguous" || kind === "flagged" || kind === "out-of-range";
  };
  const numeric = sample.map((row) => {
    const words = isWords(row);
    return row.cells.map((cell) => !words && isNumber(cell));
  });
  const lead = leadingColumn(numeric);
  if (lead === null) return null;
  const isData = (i: number) => numeric[i]?.[lead] === true;
  let best: { start: number; length: number } | null = null;
  let start = -1;
  let length = 0;
  for (const [i, row] of sample.entries()) {
    if (isBlank(row)) continue;
    if (isData(i)) {
      if (start < 0) start = i;
      length += 1;
      if (best === null || length > best.length) best = { start, length };
    } else if (!numeric[i]?.includes(true) && (length < 3 || !laterNumbers(numeric, i, lead))) {
      // A bad cell does not end the data, nor does a remark between its lines; a line of words among the first does.
      start = -1;
      length = 0;
    }
  }
  return best?.start ?? null;
}

function laterNumbers(numeric: readonly (readonly boolean[])[], from: number, lead: number): boolean {
  const next = numeric.slice(from + 1, from + 4);
  return next.length > 0 && next.every((row) => row[lead] === true);
}

/** The column with most numbers, the leftmost where several are within a tenth of it. */
function leadingColumn(numeric: readonly (readonly boolean[])[]): number | null {
  const counts: number[] = [];
  for (const row of numeric)
    for (const [j, flag] of row.entries()) counts[j] = (counts[j] ?? 0) + (flag ? 1 : 0);
  const most = counts.reduce((highest, count) => Math.max(highest, count ?? 0), 0);
  if (most === 0) return null;
  return counts.findIndex((count) => (count ?? 0) >= 0.9 * most);
}

function readUpward(above: readonly Row[], species: readonly SpeciesContext[]) {
  let header: Row | null = null;
  let units: Row | null = null;
  for (const row of [...above].reverse()) {
    const filled = row.cells.filter((cell) => cell !== "");
    if (filled.length === 0 || isRecipeRow(row, species)) continue;
    if (units === null && isUnitRow(row)) {
      units = row;
      continue;
    }
    if (filled.length > 1) header = row;
    break;
  }
  return { header, units };
}

/** Nothing but units. "1" is the unit of an absorbance, but a line of whole numbers alone is no line of units. */
function isUnitRow(row: Row): boolean {
  const filled = row.cells.filter((cell) => cell !== "");
  return (
    filled.length > 0 && filled.every((cell) => isUnit(cell)) && !filled.every((cell) => /^\d+$/.test(cell))
  );
}

function usualWidth(data: readonly Row[], header: Row | null): number {
  const counts = new Map<number, number>();
  for (const row of data) {
    const width = lastFilled(row.cells) + 1;
    counts.set(width, (counts.get(width) ?? 0) + 1);
  }
  const usual = [...counts].sort((a, b) => b[1] - a[1] || b[0] - a[0])[0]?.[0] ?? 1;
  // Traces of different length leave the usual line shorter than the line of names.
  return Math.max(usual, header ? lastFilled(header.cells) + 1 : 0);
}

export function lastFilled(cells: readonly string[]): number {
  return cells.findLastIndex((cell) => cell !== "");
}
