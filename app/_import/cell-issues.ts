import type { Corrections } from "./corrections";
import type { CellFinding, Gathered } from "./gathered";
import { isGrouped, readCell } from "./number";
import type { ColumnReading, Issue, Repair } from "./reading";
import { columnName, counted, grouped, joined, plain, quoted } from "./words";

/** Cells that are no number: what stands there, where, and what can be done about it. */

/** Above this many in one column they are one issue, since nobody answers them one by one. */
const SINGLY = 4;

export interface CellPlaces {
  readonly columns: readonly ColumnReading[];
  /** "R15" for the column of one trace, else the column's name. */
  readonly nameOf: (column: number) => string;
}

export function cellIssues(found: Gathered, places: CellPlaces, corrections: Corrections): Issue[] {
  const issues: Issue[] = [];
  for (const column of places.columns) {
    const cells = found.cells.filter((cell) => cell.column === column.index);
    if (cells.length === 0) continue;
    const countOf = (kind: string) => found.counts.get(`${column.index}:${kind}`) ?? 0;
    const numbers = found.numbers[column.index] ?? 0;

    const silent = cells.filter((cell) => cell.reading.kind === "no-reading");
    if (silent.length > 0) issues.push(noReading(silent, countOf("no-reading"), places));

    const doubtful = cells.filter((cell) => cell.reading.kind === "flagged");
    if (doubtful.length > 0) issues.push(withFlags(doubtful, countOf("flagged"), places));

    const bad = cells.filter(({ reading: { kind } }) => kind !== "no-reading" && kind !== "flagged");
    const badCount = countOf("text") + countOf("out-of-range") + countOf("ambiguous");
    if (bad.length === 0) continue;
    const isTime = column.role === "time";
    if (corrections.unreadableCells === "left-out") {
      issues.push(allLeftOut(bad, badCount, column, places));
    } else if (numbers === 0 && countOf("ambiguous") === 0 && badCount > SINGLY) {
      issues.push(columnOfText(bad, badCount, column, places));
    } else if (badCount > SINGLY) issues.push(many(bad, badCount, column, places));
    else for (const cell of bad) issues.push(single(cell, isTime, places));
  }
  return issues;
}

function single(cell: CellFinding, isTime: boolean, places: CellPlaces): Issue {
  const leaveOut: Repair = isTime
    ? { label: `Leave line ${cell.line} out`, change: { kind: "leave-lines-out", lines: [cell.line] } }
    : {
        label: "Leave the cell out",
        change: { kind: "cells", cells: [{ line: cell.line, column: cell.column, as: null }] },
      };
  const readAs = (value: number): Repair => ({
    label: `Read as ${plain(value)}`,
    change: { kind: "cells", cells: [{ line: cell.line, column: cell.column, as: value }] },
  });
  const base = {
    code: "unreadable-cell",
    severity: "blocks" as const,
    line: cell.line,
    column: cell.column,
    place: `line ${cell.line}, ${places.nameOf(cell.column)}`,
  };
  if (cell.reading.kind === "ambiguous") {
    const { asDecimal, asGrouped } = cell.reading;
    return {
      ...base,
      message: `${quoted(cell.text)} can be ${plain(asDecimal)} or ${plain(asGrouped)}: its mark is not the decimal mark of the other numbers.`,
      repairs: [readAs(asDecimal), readAs(asGrouped), leaveOut],
    };
  }
  if (cell.reading.kind === "out-of-range") {
    return {
      ...base,
      message: `${quoted(cell.text)} is beyond what a reading can be here (10⁻³⁰⁸ to 10²⁰ in size); instruments write such numbers for an overflow.`,
      repairs: [leaveOut],
    };
  }
  const slip = typingSlip(cell);
  return {
    ...base,
    message: slip
      ? `${quoted(cell.text)} is not a number: ${slip.words}${fits(cell, slip.value) ? ", and it would fit between its neighbours" : ""}.`
      : `${quoted(cell.text)} is not a number.`,
    repairs: slip ? [readAs(slip.value), leaveOut] : [leaveOut],
  };
}

/** A letter where a digit belongs, or the other decimal mark: what was most likely meant. */
function typingSlip(cell: CellFinding): { readonly value: number; readonly words: string } | null {
  const text = cell.text;
  const swaps: readonly [RegExp, string, string][] = [
    [/[lI|]/g, "1", "a letter where a digit 1 seems meant"],
    [/[oO]/g, "0", "a letter O where a digit 0 seems meant"],
  ];
  for (const mark of [".", ","] as const) {
    const format = { decimalMark: mark, stated: false };
    const asItIs = readCell(text, format);
    if (asItIs.kind === "number" && /[.,]/.test(text)) {
      return {
        value: asItIs.value,
        words: `it has a decimal ${mark === "." ? "point" : "comma"}, unlike the others`,
      };
    }
    for (const [letters, digit, words] of swaps) {
      if (!/\d/.test(text) || text.replace(letters, digit) === text) continue;
      const reading = readCell(text.replace(letters, digit), format);
      if (reading.kind === "number") return { value: reading.value, words };
    }
  }
  const withoutUnit = /^([+\-−]?\d+(?:[.,]\d+)?)\s*[^\d\s.,]+$/.exec(text)?.[1];
  if (withoutUnit && !isGrouped(withoutUnit, ",") && !isGrouped(withoutUnit, ".")) {
    const reading = readCell(withoutUnit, { decimalMark: "either", stated: true });
    if (reading.kind === "number") return { value: reading.value, words: "words follow the number" };
  }
  return null;
}

function fits(cell: CellFinding, value: number): boolean {
  if (cell.before === null || cell.after === null) return false;
  const low = Math.min(cell.before, cell.after);
  const high = Math.max(cell.before, cell.after);
  const slack = high - low;
  return value >= low - slack && value <= high + slack;
}

function many(bad: readonly CellFinding[], count: number, column: ColumnReading, places: CellPlaces): Issue {
  const first = bad[0];
  const commas = bad.filter((cell) => /^[+\-−]?\d+,\d+$/.test(cell.text)).length;
  const points = bad.filter((cell) => /^[+\-−]?\d+\.\d+$/.test(cell.text)).length;
  const marks: Repair[] = [];
  if (commas > bad.length / 2)
    marks.push({
      label: "Read the comma as decimal mark",
      change: { kind: "set", values: { decimalMark: "," } },
    });
  if (points > bad.length / 2)
    marks.push({
      label: "Read the point as decimal mark",
      change: { kind: "set", values: { decimalMark: "." } },
    });
  if (commas + points > bad.length / 2) {
    marks.push({
      label: "Read both as decimal marks",
      change: { kind: "set", values: { decimalMark: "either" } },
    });
  }
  return {
    code: "unreadable-cells",
    severity: "blocks",
    line: first?.line ?? null,
    column: column.index,
    place: `line ${first?.line}, ${places.nameOf(column.index)}`,
    message: `${counted(count, "cell")} of ${columnName(column.index, column.name)} cannot be read as numbers: ${samples(bad, count)}.`,
    repairs: [
      ...marks,
      { label: "Leave these cells out", change: { kind: "set", values: { unreadableCells: "left-out" } } },
      { label: "Leave the column out", change: { kind: "column", column: column.index, role: "left-out" } },
    ],
  };
}

function columnOfText(
  bad: readonly CellFinding[],
  count: number,
  column: ColumnReading,
  places: CellPlaces,
): Issue {
  return {
    code: "column-of-text",
    severity: "blocks",
    line: bad[0]?.line ?? null,
    column: column.index,
    place: places.nameOf(column.index),
    message: `${columnName(column.index, column.name).replace(/^c/, "C")} holds text and not one number: ${samples(bad, count)}. A ${column.role === "time" ? "time" : "signal"} needs numbers.`,
    repairs: [
      { label: "Leave the column out", change: { kind: "column", column: column.index, role: "left-out" } },
    ],
  };
}

function allLeftOut(
  bad: readonly CellFinding[],
  count: number,
  column: ColumnReading,
  places: CellPlaces,
): Issue {
  return {
    code: "cells-left-out",
    severity: "weakens",
    line: bad[0]?.line ?? null,
    column: column.index,
    place: places.nameOf(column.index),
    message: `${counted(count, "cell")} that cannot be read ${count === 1 ? "is" : "are"} left out: ${samples(bad, count)}. The raw file keeps ${count === 1 ? "it" : "them"}.`,
    repairs: [],
  };
}

function withFlags(cells: readonly CellFinding[], count: number, places: CellPlaces): Issue {
  const first = cells[0];
  const column = first?.column ?? 0;
  return {
    code: "flagged-cells",
    severity: "blocks",
    line: first?.line ?? null,
    column,
    place: `line ${first?.line}, ${places.nameOf(column)}`,
    message: `${counted(count, "cell")} ${count === 1 ? "carries" : "carry"} a mark beside the number: ${samples(cells, count)}. Whoever set it doubted the reading, or could not measure it.`,
    repairs: [
      {
        label: count === 1 ? "Leave the cell out" : "Leave these cells out",
        change: { kind: "set", values: { flaggedCells: "left-out" } },
      },
      {
        label: count === 1 ? "Read the number" : "Read the numbers",
        change: { kind: "set", values: { flaggedCells: "read" } },
      },
    ],
  };
}

function noReading(cells: readonly CellFinding[], count: number, places: CellPlaces): Issue {
  const first = cells[0];
  const column = first?.column ?? 0;
  return {
    code: "no-reading",
    severity: "weakens",
    line: first?.line ?? null,
    column,
    place: count === 1 ? `line ${first?.line}, ${places.nameOf(column)}` : places.nameOf(column),
    message:
      count === 1
        ? `${quoted(first?.text ?? "")} is a word for 'no reading': the cell is left out.`
        : `${grouped(count)} cells hold a word for 'no reading' and are left out: ${samples(cells, count)}.`,
    repairs: [],
  };
}

function samples(cells: readonly CellFinding[], count: number): string {
  const shown = cells.slice(0, 3).map((cell) => `line ${cell.line} ${quoted(cell.text)}`);
  return joined(shown, count > shown.length ? `${grouped(count - shown.length)} more` : null);
}
