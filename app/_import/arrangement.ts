import { clockKind } from "./clock";
import { type NumberFormat, readCell } from "./number";
import type { Issue } from "./reading";
import { eachRow, type Row, type RowFormat } from "./rows";
import { splitUnit, timeUnitOf } from "./units";
import { counted, quoted } from "./words";

/**
 * Tables that do not run down in one piece, written anew as ones that do: blocks below one another become a long table
 * with the block's name on every line, and a table whose times run along a row is turned. Blocks keep their line
 * numbers, so that every issue still names the line of the file; a turned table cannot.
 */
export interface Arranged {
  /** Cells divided by tabs, marks in them plain characters. */
  readonly text: string;
  readonly issue: Issue;
}

interface Block {
  readonly name: string;
  readonly rows: readonly Row[];
}

/** A row of times, with a name and at least so many of them, is no row of readings. */
const LEAST_TIMES = 4;

/** The table turned, where its first row of numbers is named as a time; `forced`: whatever it is named. */
export function turnedTable(rows: readonly Row[], format: NumberFormat, forced: boolean): Arranged | null {
  const filled = rows.filter((row) => row.cells.some((cell) => cell !== ""));
  const isSeries = ({ cells }: Row) =>
    cells.slice(1).filter((cell) => isNumber(cell, format)).length >= LEAST_TIMES &&
    !isNumber(cells[0] ?? "", format);
  const first = filled.findIndex(isSeries);
  const series = filled.slice(Math.max(0, first));
  const [times] = series;
  if (first < 0 || times === undefined || series.length < 2) return null;
  if (!forced && !(series.every(isSeries) && isTimeName(times.cells[0] ?? ""))) return null;
  const width = Math.max(...series.map(({ cells }) => cells.length));
  const lines = Array.from({ length: width }, (_, j) => series.map(({ cells }) => cells[j] ?? "").join("\t"));
  return {
    text: lines.join("\n"),
    issue: {
      code: "turned",
      severity: "note",
      line: null,
      column: null,
      place: "file",
      message: `The times run along line ${times.line}: rows and columns were exchanged, so that lines here are the columns of the file.`,
      repairs: [
        { label: "Read as it stands", change: { kind: "set", values: { arrangement: "as-it-stands" } } },
      ],
    },
  };
}

/**
 * Blocks below one another, told by a time that starts again after a line that is no data; `forced`: wherever the time
 * starts again. null where there are not two.
 */
export function blocksInOne(
  text: string,
  rowFormat: RowFormat,
  format: NumberFormat,
  place: { readonly firstDataLine: number; readonly headerLine: number | null; readonly forced: boolean },
): Arranged | null {
  const lines: string[] = [];
  const blocks = blocksOf(text, rowFormat, format, place);
  if (blocks.length < 2 || blocks.some(({ rows }) => rows.length < 2)) return null;
  const width = Math.max(...blocks.flatMap(({ rows }) => rows.map(({ cells }) => cells.length)));
  const nameOfLine = new Map(
    blocks.flatMap(({ name, rows }) => rows.map(({ line }) => [line, name] as const)),
  );
  eachRow(text, rowFormat, (row) => {
    while (lines.length < row.line - 1) lines.push("");
    const padded = [...row.cells, ...new Array<string>(Math.max(0, width - row.cells.length)).fill("")];
    const name = nameOfLine.get(row.line);
    if (name !== undefined) lines.push([...padded, name].join("\t"));
    else if (row.line === place.headerLine) lines.push([...padded, "run"].join("\t"));
    else lines.push(row.line < place.firstDataLine ? row.cells.join("\t") : "");
    return true;
  });
  const starts = blocks.slice(1).map(({ rows }) => rows[0]?.line ?? 0);
  return {
    text: lines.join("\n"),
    issue: {
      code: "blocks",
      severity: "note",
      line: starts[0] ?? null,
      column: null,
      place: `line ${starts[0]}`,
      message: `Time starts again ${counted(starts.length, "time")}: read as ${blocks.length} runs below one another, ${blocks
        .slice(0, 3)
        .map(({ name }) => quoted(name))
        .join(", ")}${blocks.length > 3 ? " and so on" : ""}.`,
      repairs: [
        { label: "Read as it stands", change: { kind: "set", values: { arrangement: "as-it-stands" } } },
      ],
    },
  };
}

/**
 * Where the first of several blocks begins, told from the first rows of the file; null where they show one table. The
 * longest stretch of numbers is not asked for: it may be the third block, and those above it are no preamble.
 */
export function firstBlock(
  rows: readonly Row[],
  format: NumberFormat,
): { readonly firstDataLine: number; readonly headerLine: number | null } | null {
  const stretches: { start: number; first: number; last: number; count: number }[] = [];
  let isOpen = false;
  for (const [i, { cells }] of rows.entries()) {
    const filled = cells.filter((cell) => cell !== "");
    const value =
      filled.length >= 2 && filled.every((cell) => isNumber(cell, format)) ? leadOf(filled, format) : null;
    if (value === null) isOpen = false;
    else if (isOpen) {
      const stretch = stretches.at(-1);
      if (stretch !== undefined) {
        stretch.last = value;
        stretch.count += 1;
      }
    } else {
      stretches.push({ start: i, first: value, last: value, count: 1 });
      isOpen = true;
    }
  }
  const long = stretches.filter(({ count }) => count >= 2);
  const [first] = long;
  const restarts = long.slice(1).every((one, i) => one.first < (long[i]?.last ?? Number.NEGATIVE_INFINITY));
  if (first === undefined || long.length < 2 || !restarts) return null;
  const header = rows
    .slice(0, first.start)
    .findLast(({ cells }) => cells.filter((cell) => cell !== "").length > 1);
  return { firstDataLine: rows[first.start]?.line ?? 1, headerLine: header?.line ?? null };
}

function leadOf(filled: readonly string[], format: NumberFormat): number | null {
  const reading = readCell(filled[0] ?? "", format);
  return reading.kind === "number" ? reading.value : null;
}

function blocksOf(
  text: string,
  rowFormat: RowFormat,
  format: NumberFormat,
  place: { readonly firstDataLine: number; readonly headerLine: number | null; readonly forced: boolean },
): Block[] {
  const blocks: { name: string; rows: Row[] }[] = [];
  let heading: Row[] = [];
  let before: number | null = null;
  eachRow(text, rowFormat, (row) => {
    const lead = row.cells.find((cell) => cell !== "") ?? "";
    const reading = readCell(lead, format);
    const isData = row.line >= place.firstDataLine && (reading.kind === "number" || clockKind(lead) !== null);
    if (!isData) {
      if (lead !== "") heading.push(row);
      else if (blocks.length === 0) heading = [];
      return true;
    }
    const value = reading.kind === "number" ? reading.value : null;
    const falls = before !== null && value !== null && value < before;
    if (blocks.length === 0 || heading.length > 0 || (place.forced && falls)) {
      blocks.push({ name: blockName(heading, blocks.length), rows: [] });
    }
    heading = [];
    before = value;
    blocks.at(-1)?.rows.push(row);
    return true;
  });
  return withDistinctNames(blocks);
}

/** A line of one cell is a title; else the name of the column beside the time tells the blocks apart. */
function blockName(heading: readonly Row[], index: number): string {
  const filled = heading.map(({ cells }) => cells.filter((cell) => cell !== ""));
  const title = filled.findLast((cells) => cells.length === 1)?.[0];
  const column = filled.findLast((cells) => cells.length > 1)?.[1];
  const name = title ?? (column === undefined ? undefined : splitUnit(column).name);
  return name === undefined || name === "" ? `block ${index + 1}` : name.slice(0, 40);
}

/** Headings that repeat say nothing of the run: such blocks are numbered. */
function withDistinctNames(blocks: readonly Block[]): Block[] {
  const names = blocks.map(({ name }) => name);
  return new Set(names).size === names.length
    ? [...blocks]
    : blocks.map((block, i) => ({ ...block, name: `block ${i + 1}` }));
}

function isNumber(cell: string, format: NumberFormat): boolean {
  const { kind } = readCell(cell, format);
  return kind === "number" || kind === "ambiguous" || kind === "no-reading";
}

function isTimeName(cell: string): boolean {
  const { name, unit } = splitUnit(cell);
  return (
    timeUnitOf(unit) !== null ||
    timeUnitOf(name) !== null ||
    /^(t|time|zeit|temps|elapsed.*|time.*)$/i.test(name)
  );
}
