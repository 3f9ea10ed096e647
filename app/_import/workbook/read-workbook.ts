import readXlsxFile from "read-excel-file/universal";
import { CONTAINER_FORMAT, type SheetChoice, type TableTextReading } from "../container";
import { looksNumeric } from "../number";
import type { Issue } from "../reading";
import { joined, quoted } from "../words";
import { dateText } from "./date-text";
import {
  columnLetters,
  type SheetEntry,
  type SheetMarks,
  sheetEntries,
  sheetMarks,
  textOf,
} from "./sheet-marks";
import { repacked, unpackWorkbook } from "./unpack";

/**
 * An XLSX workbook into the text of one of its sheets: a line for each row, so that line numbers are row numbers. The
 * values are those saved with the workbook; formulas are never computed.
 */

const MOST_SHEETS = 200;

export function isWorkbook(bytes: Uint8Array): boolean {
  if (![0x50, 0x4b, 0x03, 0x04].every((byte, i) => bytes[i] === byte)) return false;
  // The directory at the end names every part; the first part alone may be anything.
  const ends = [bytes.subarray(0, 4096), bytes.subarray(-65_536)];
  return ends.some((end) => /xl\/|\[Content_Types\]/.test(new TextDecoder("windows-1252").decode(end)));
}

export async function readWorkbook(bytes: Uint8Array, wanted: string | undefined): Promise<TableTextReading> {
  const unpacked = unpackWorkbook(bytes);
  if (unpacked.status !== "unpacked") return refused(unpacked.status === "too-large" ? TOO_LARGE : DAMAGED);
  const { parts } = unpacked;
  const entries = sheetEntries(parts);
  if (entries.length === 0) return refused(parts.has("mimetype") ? NOT_XLSX : NO_SHEETS);
  if (entries.length > MOST_SHEETS) return refused(TOO_LARGE);

  const sheets = await cellsOf(parts);
  if (sheets === null) return refused(DAMAGED);
  const chosen = choose(entries, sheets, wanted);
  if (chosen === null) {
    return refused(
      `No sheet of the workbook holds a table of numbers; it has ${joined(entries.map(({ name }) => quoted(name)))}. A column of times and a column of readings are needed.`,
    );
  }
  const entry = entries.find(({ name }) => name === chosen.value);
  const marks = sheetMarks(entry?.part ? textOf(parts, entry.part) : "");
  const rows = sheets.get(chosen.value) ?? [];
  return {
    status: "text",
    text: rows.map((cells) => cells.join("\t")).join("\n"),
    encoding: { value: "utf-8", reason: "a workbook says its characters itself", basis: "file" },
    container: "workbook",
    format: CONTAINER_FORMAT,
    sheet: chosen,
    issues: marksIssues(marks, rows),
  };
}

/** Every sheet as rows of texts, by name; null where the archive is no workbook after all. */
async function cellsOf(parts: ReadonlyMap<string, Uint8Array>): Promise<Map<string, string[][]> | null> {
  try {
    // Numbers stay as they were saved, so that they are read to the double of the literal like any other.
    const read = await readXlsxFile(repacked(parts), { parseNumber: (literal) => literal });
    return new Map(read.map(({ sheet, data }) => [sheet, data.map((row) => row.map(cellText))]));
  } catch {
    // The reader throws on what breaks the format, in many ways with one meaning for whoever sent the file.
    return null;
  }
}

function cellText(cell: unknown): string {
  if (cell === null || cell === undefined) return "";
  if (cell instanceof Date) return dateText(cell);
  if (typeof cell === "boolean") return cell ? "TRUE" : "FALSE";
  return String(cell).replace(/\s+/g, " ").trim();
}

function choose(
  entries: readonly SheetEntry[],
  sheets: ReadonlyMap<string, readonly (readonly string[])[]>,
  wanted: string | undefined,
): SheetChoice | null {
  const names = entries.map(({ name }) => name);
  if (wanted !== undefined && names.includes(wanted)) {
    return { value: wanted, names, reason: "chosen by hand", basis: "stated" };
  }
  const tables = entries.filter(({ name }) => holdsTable(sheets.get(name) ?? []));
  const first = tables.find(({ hidden }) => !hidden) ?? tables[0];
  if (first === undefined) return null;
  const others = tables.length - 1;
  const reason =
    names.length === 1
      ? "the only sheet"
      : `the first ${first.hidden ? "" : "visible "}sheet with a table of numbers, of ${names.length} sheets`;
  return { value: first.name, names, reason, basis: others === 0 ? "file" : "assumed" };
}

/** Two rows with two numbers each. */
function holdsTable(rows: readonly (readonly string[])[]): boolean {
  let found = 0;
  for (const row of rows) {
    if (row.filter((cell) => looksNumeric(cell) || /^\d+:\d\d/.test(cell)).length >= 2) found += 1;
    if (found >= 2) return true;
  }
  return false;
}

function marksIssues(marks: SheetMarks, rows: readonly (readonly string[])[]): Issue[] {
  const issues: Issue[] = [];
  const base = { line: null, column: null, repairs: [] };
  const missing = marks.withoutValue;
  if (missing.length > 0) {
    issues.push({
      ...base,
      code: "formula-without-value",
      severity: "blocks",
      place: `cell ${missing[0]}`,
      message: `${listed(missing)} ${missing.length === 1 ? "holds a formula" : "hold formulas"} whose value was not saved, and formulas are not computed here. Open the workbook, let it calculate, save it and choose it again; or copy the cells and paste them.`,
    });
  }
  if (marks.formulaColumns.length > 0 && missing.length === 0) {
    issues.push({
      ...base,
      code: "formulas",
      severity: "note",
      place: `column ${columnLetters(marks.formulaColumns[0] ?? 0)}`,
      message: `${joined(marks.formulaColumns.slice(0, 8).map(columnLetters))} ${marks.formulaColumns.length === 1 ? "holds" : "hold"} formulas; the values saved with the workbook are read.`,
    });
  }
  const width = rows.reduce((widest, row) => Math.max(widest, row.length), 0);
  const hidden = marks.hiddenColumns.filter(
    (column) => column < width && rows.some((row) => (row[column] ?? "") !== ""),
  );
  for (const column of hidden.slice(0, 20)) {
    issues.push({
      ...base,
      code: "hidden-column",
      severity: "weakens",
      column,
      place: `column ${columnLetters(column)}`,
      message: `Column ${columnLetters(column)} is hidden in the workbook and is read like the others. Leave it out if it should not count.`,
      repairs: [{ label: "Leave out", change: { kind: "column", column, role: "left-out" } }],
    });
  }
  const hiddenRows = marks.hiddenRows.filter((row) => (rows[row - 1] ?? []).some((cell) => cell !== ""));
  if (hiddenRows.length > 0) {
    issues.push({
      ...base,
      code: "hidden-rows",
      severity: "weakens",
      line: hiddenRows[0] ?? null,
      place: `row ${hiddenRows[0]}`,
      message: `${listed(hiddenRows.map((row) => `row ${row}`))} ${hiddenRows.length === 1 ? "is" : "are"} hidden in the workbook and read like the others.`,
      repairs: [
        { label: "Leave them out", change: { kind: "leave-lines-out", lines: hiddenRows.slice(0, 2000) } },
      ],
    });
  }
  return issues;
}

function listed(words: readonly string[]): string {
  const rest = words.length - 4;
  const list = joined(words.slice(0, 4), rest > 0 ? `${rest} more` : null);
  return list.charAt(0).toUpperCase() + list.slice(1);
}

function refused(message: string): TableTextReading {
  return { status: "refused", message };
}

const TOO_LARGE =
  "This workbook unpacks to more than is read here. Keep the sheet with the readings, without pictures and further sheets, or save that sheet as CSV.";
const DAMAGED =
  "This workbook cannot be unpacked: the file is damaged, incomplete or locked by a password. Open it in a spreadsheet, save it again without a password, or save the sheet as CSV.";
const NO_SHEETS =
  "This is a ZIP archive or a packed document. Take the table out of it; if it is a spreadsheet, save the sheet as CSV.";
const NOT_XLSX =
  "This is a spreadsheet of another format (ODS), which is not read here. Save it as XLSX or CSV and choose that file.";
