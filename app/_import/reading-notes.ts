import type { ColumnGuess } from "./columns";
import type { Corrections } from "./corrections";
import type { Frame } from "./frame";
import type { Issue } from "./reading";
import type { RecipeLine } from "./recipes";
import type { Row } from "./rows";
import { lines, quoted } from "./words";

/** What a person should know of a reading beside its faults: columns left out, cells corrected by hand, the preamble. */

/** Columns that were left out or read as something else than a signal, said so that nobody misses one. */
export function columnIssues(guessed: ColumnGuess): Issue[] {
  return guessed.columns.flatMap((column): Issue[] => {
    if (column.basis === "stated" || column.reason === "empty") return [];
    if (column.role !== "left-out" && column.role !== "temperature") return [];
    const isTemperature = column.role === "temperature";
    return [
      {
        code: isTemperature ? "temperature-column" : "column-left-out",
        severity: "note",
        line: null,
        column: column.index,
        place: `column ${column.index + 1}`,
        message: isTemperature
          ? `Read as cell temperature and stored with each run as its mean: ${column.reason}.`
          : `${column.name === "" ? "This column is" : `“${column.name}” is`} left out: ${column.reason}. The raw file keeps it.`,
        repairs: [
          { label: "Read as a signal", change: { kind: "column", column: column.index, role: "signal" } },
        ],
      },
    ];
  });
}

export function cellsCorrected(corrections: Corrections, nameOf: (column: number) => string): Issue[] {
  const flags: Issue[] =
    corrections.flaggedCells === undefined
      ? []
      : [
          {
            code: "flags-settled",
            severity: "settled",
            line: null,
            column: null,
            place: "file",
            message: `Cells with a mark beside the number are ${corrections.flaggedCells === "read" ? "read without it" : "left out"}, by hand; the raw file keeps them.`,
            repairs: [],
          },
        ];
  const cells = (corrections.cells ?? []).map(
    (cell): Issue => ({
      code: "cell-corrected",
      severity: "settled",
      line: cell.line,
      column: cell.column,
      place: `line ${cell.line}, ${nameOf(cell.column)}`,
      message: `${cell.as === null ? "Left out" : `Read as ${cell.as}`}, by hand; the raw file keeps what stands there.`,
      repairs: [{ label: "Undo", change: { kind: "forget-cell", line: cell.line, column: cell.column } }],
    }),
  );
  return [...flags, ...cells];
}

export function preambleIssues(
  frame: Frame,
  sample: readonly Row[],
  recipes: readonly RecipeLine[],
): Issue[] {
  const top = Math.min(frame.headerLine.value ?? Number.POSITIVE_INFINITY, frame.firstDataLine.value);
  const preamble = sample.filter(
    (row) =>
      row.line < top &&
      !recipes.some((line) => line.line === row.line) &&
      row.cells.some((cell) => cell !== ""),
  );
  const first = preamble[0];
  if (!first) return [];
  return [
    {
      code: "preamble",
      severity: "settled",
      line: first.line,
      column: null,
      place: lines(first.line, preamble.at(-1)?.line ?? first.line),
      message: `Preamble, kept with the raw file: ${quoted(first.cells.filter((cell) => cell !== "").join(" "))}.`,
      repairs: [],
    },
  ];
}
