import Papa from "papaparse";
import { looksNumeric } from "./number";

/**
 * Text into cells. Empty lines are kept here and skipped by the reader, as papaparse's own `skipEmptyLines: "greedy"`
 * would lose the line numbers that every issue names.
 */

/** A blank stands for any run of blanks and tabs. */
export type Separator = "," | ";" | "\t" | "|" | " ";

export const SEPARATOR_NAMES: Record<Separator, string> = {
  ",": "comma",
  ";": "semicolon",
  "\t": "tab",
  "|": "vertical bar",
  " ": "blank",
};

export interface RowFormat {
  readonly separator: Separator;
  /** `plain`: quotation marks are ordinary characters. */
  readonly quotes: "quoting" | "plain";
}

export interface Row {
  /** 1-based line of the file on which the row begins. */
  readonly line: number;
  readonly cells: readonly string[];
  /** A quotation mark opened here is not closed where a cell ends. */
  readonly brokenQuotes: boolean;
}

/** Calls `visit` for every row in order, until it returns false. `text` has "\n" line ends. */
export function eachRow(text: string, format: RowFormat, visit: (row: Row) => boolean): void {
  if (format.separator === " ") eachBlankDividedRow(text, visit);
  else eachSeparatedRow(text, format, visit);
}

function eachSeparatedRow(text: string, format: RowFormat, visit: (row: Row) => boolean): void {
  const quoting = format.quotes === "quoting" && text.includes('"');
  let line = 1;
  Papa.parse<string[]>(text, {
    delimiter: format.separator,
    newline: "\n",
    // A character that never occurs stands for 'no quoting at all'.
    quoteChar: quoting ? '"' : "\u0001",
    skipEmptyLines: false,
    step: ({ data, errors }, parser) => {
      const cells = data.map((cell) => cell.trim());
      const proceed = visit({ line, cells, brokenQuotes: errors.some((error) => error.type === "Quotes") });
      line += 1;
      if (quoting) for (const cell of data) line += cell.split("\n").length - 1;
      if (!proceed) parser.abort();
    },
  });
}

function eachBlankDividedRow(text: string, visit: (row: Row) => boolean): void {
  let line = 1;
  for (let start = 0; start <= text.length; line++) {
    const end = text.indexOf("\n", start);
    const stop = end < 0 ? text.length : end;
    if (!visit({ line, cells: blankDivided(text.slice(start, stop)), brokenQuotes: false })) return;
    start = stop + 1;
  }
}

/**
 * Numbers are divided at every blank. A line of words is divided where two blanks or a tab stand, as programs that line
 * up their columns write it, else at every blank but those about a solidus: "t / s" is one heading.
 */
function blankDivided(line: string): string[] {
  const trimmed = line.trim();
  const apart = trimmed.split(/\s+/);
  if (apart.every(looksNumeric)) return apart;
  if (/\s{2}|\t/.test(trimmed)) return trimmed.split(/\s{2,}|\t/);
  return trimmed.split(/(?<!\/)\s+(?!\/)/);
}

/** The first rows of the text, at most `limit`. */
export function firstRows(text: string, format: RowFormat, limit: number): Row[] {
  const rows: Row[] = [];
  eachRow(text, format, (row) => {
    rows.push(row);
    return rows.length < limit;
  });
  return rows;
}

export function isBlank(row: Row): boolean {
  return row.cells.every((cell) => cell === "");
}
