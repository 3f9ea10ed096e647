import { POINTS_PER_STUDY } from "@/db/limits";
import { type Arranged, blocksInOne, firstBlock, turnedTable } from "./arrangement";
import { cellIssues } from "./cell-issues";
import { clockColumns } from "./clock-columns";
import { type ColumnGuess, guessColumns } from "./columns";
import { CONTAINER_FORMAT, type TableText, type TableTextReading } from "./container";
import type { Corrections } from "./corrections";
import { guessDecimalMark } from "./decimal-mark";
import { type Frame, findFrame } from "./frame";
import { gather } from "./gather";
import type { Gathered } from "./gathered";
import { brokenQuotes, lineIssues } from "./line-issues";
import type { DecimalMark, NumberFormat } from "./number";
import type { FileReading, Guess, Issue, IssueSeverity, Reading, StudyContext } from "./reading";
import { cellsCorrected, columnIssues, preambleIssues } from "./reading-notes";
import { type RecipeLine, readRecipeRow, speciesKey } from "./recipes";
import { firstRows, type Row, type RowFormat, SEPARATOR_NAMES, type Separator } from "./rows";
import { guessSeparator } from "./separator";
import { shownLines } from "./shown-lines";
import { tableText } from "./table-text";
import { signalUnitOfTable, timeUnitOfTable } from "./table-units";
import { traceChecks } from "./trace-checks";
import { buildTraces } from "./traces";
import { columnName, joined, quoted } from "./words";

/**
 * A file or a paste into traces of runs. Reading is a pure function of the bytes, the study and the corrections, so
 * that a preview, the same preview with one thing changed, and what is stored in the end cannot differ.
 */

const SAMPLE_ROWS = 2000;
const MOST_COLUMNS = 2002;

export async function readFile(
  bytes: Uint8Array,
  context: StudyContext,
  corrections: Corrections,
): Promise<Reading> {
  return readTable(await tableText(bytes, corrections), context, corrections);
}

/** The reading of a table, whatever it came in. */
export function readTable(table: TableTextReading, context: StudyContext, corrections: Corrections): Reading {
  if (table.status === "refused") return table;
  const { text } = table;
  const stated = statedFormat(table, corrections);
  const quotes = quotesOf(text, stated);
  const { separator, issues: separatorIssues } = separatorOf(text, quotes.value, stated);
  const rowFormat: RowFormat = { separator: separator.value, quotes: quotes.value };
  const sample = firstRows(text, rowFormat, SAMPLE_ROWS);
  const mark = decimalMarkOf(sample, separator.value, stated);
  const numberFormat: NumberFormat = {
    decimalMark: mark.guess.value ?? "either",
    stated: stated.decimalMark !== undefined,
  };
  /** The same bytes, written anew as one table that runs down; what was guessed of the file itself stays. */
  const rearranged = (arranged: Arranged): Reading => {
    const format = { ...CONTAINER_FORMAT, decimalMark: numberFormat.decimalMark };
    const reading = readTable(
      { ...table, text: arranged.text, format, issues: [...table.issues, arranged.issue] },
      context,
      { ...corrections, arrangement: "as-it-stands" },
    );
    return reading.status === "refused"
      ? reading
      : { ...reading, separator, quotes: quotes.value, decimalMark: mark.guess, corrections };
  };
  const isOpen = corrections.arrangement === undefined && mark.guess.value !== null;
  if (corrections.arrangement === "turned" || (isOpen && sample.length < SAMPLE_ROWS)) {
    const turned = turnedTable(sample, numberFormat, corrections.arrangement === "turned");
    if (turned !== null) return rearranged(turned);
  }
  const block = isOpen ? firstBlock(sample, numberFormat) : null;
  if (block !== null) {
    const blocks = blocksInOne(text, rowFormat, numberFormat, { ...block, forced: false });
    if (blocks !== null) return rearranged(blocks);
  }
  const frame = findFrame(sample, numberFormat, context.species, corrections);
  if (frame === null) return refused(sample);
  if (frame.columns > MOST_COLUMNS) {
    return {
      status: "refused",
      message: `Line ${frame.data[0]?.line} has ${frame.columns} cells; at most ${MOST_COLUMNS} columns are read. Split the file.`,
    };
  }
  const guessed = guessColumns(frame, numberFormat, context.species, corrections.columns);
  const clock = clockColumns(guessed.columns, frame, corrections);
  const timeUnit = timeUnitOfTable(guessed.columns, context.timeUnit, corrections.timeUnit);
  const signalUnit = signalUnitOfTable(guessed.columns, context.signal, corrections.signalUnit);
  const found = gather(text, {
    rowFormat,
    numberFormat,
    roles: guessed.columns.map((column) => column.role),
    clocks: clock.forms,
    firstDataLine: frame.firstDataLine.value,
    lastDataLine: corrections.lastDataLine,
    corrections,
    pointsLeft: Math.max(0, POINTS_PER_STUDY - context.points),
  });
  const recipes = frame.recipes.flatMap((row): RecipeLine[] => {
    const line = readRecipeRow(row, context.species, numberFormat);
    return line === null ? [] : [line];
  });
  const built = buildTraces(found.traces, {
    columns: guessed.columns,
    context,
    corrections,
    timeUnit: timeUnit.value,
    clock,
    signalUnit: signalUnit.guess.value,
    recipes,
    titles: frame.titles?.cells ?? [],
    speciesColumns: speciesColumns(guessed, context),
  });
  if (corrections.arrangement === "blocks" || (isOpen && mayBeBlocks(found, built.issues))) {
    const blocks = blocksInOne(text, rowFormat, numberFormat, {
      firstDataLine: frame.firstDataLine.value,
      headerLine: frame.headerLine.value,
      forced: corrections.arrangement === "blocks",
    });
    if (blocks !== null) return rearranged(blocks);
  }
  const labelOf = new Map(built.traces.map((trace) => [trace.source, trace.label]));
  const nameOf = (column: number) =>
    labelOf.get(`c${column}`) ?? columnName(column, guessed.columns[column]?.name ?? "");
  const total = countLines(text);
  const issues = [
    ...table.issues,
    ...quotes.issues,
    ...separatorIssues,
    ...mark.issues,
    ...clock.issues,
    ...signalUnit.issues,
    ...columnIssues(guessed),
    ...cellIssues(found, { columns: guessed.columns, nameOf }, corrections),
    ...cellsCorrected(corrections, nameOf),
    ...lineIssues(found, frame.columns, total, corrections, separator.value),
    ...built.issues,
    ...preambleIssues(frame, sample, recipes),
    ...traceChecks(built.traces, context, found.tooManyPoints),
  ].sort((a, b) => RANK[a.severity] - RANK[b.severity] || (a.line ?? 0) - (b.line ?? 0));

  return {
    status: "read",
    lines: total,
    container: table.container,
    sheet: table.sheet,
    encoding: table.encoding,
    separator,
    quotes: rowFormat.quotes,
    decimalMark: mark.guess,
    headerLine: frame.headerLine,
    unitLine: frame.unitLine,
    dataLines: dataLines(frame, found, corrections),
    layout: guessed.layout,
    columns: guessed.columns,
    timeUnit,
    signalUnit: signalUnit.guess,
    traces: built.traces,
    issues,
    shownLines: shownLines({ text, rowFormat, frame, recipes, found, total, issues }),
    corrections,
  };
}

/** A time that starts again, and lines between the data that are none. */
function mayBeBlocks(found: Gathered, issues: readonly Issue[]): boolean {
  return (
    found.wordLineCount + found.blankLineCount > 0 &&
    issues.some(({ code }) => code === "falling-time" || code === "repeated-time")
  );
}

/** A container's own format stands before anything that could be said or guessed of it, but for the decimal mark of texts. */
function statedFormat(table: TableText, corrections: Corrections): Corrections {
  if (table.format === null) return corrections;
  return {
    ...corrections,
    ...table.format,
    decimalMark: corrections.decimalMark ?? table.format.decimalMark,
  };
}

const RANK: Record<IssueSeverity, number> = { blocks: 0, weakens: 1, note: 2, settled: 3 };

/** An unclosed quotation mark near the top swallows the table: the preview shows it read plainly, and asks. */
function quotesOf(
  text: string,
  corrections: Corrections,
): { readonly value: RowFormat["quotes"]; readonly issues: readonly Issue[] } {
  if (corrections.quotes) return { value: corrections.quotes, issues: [] };
  if (!text.includes('"') || guessSeparator(text, "quoting").guess.basis === "file") {
    return { value: "quoting", issues: [] };
  }
  const { value: separator, basis } = guessSeparator(text, "plain").guess;
  const head = firstRows(text, { separator, quotes: "quoting" }, SAMPLE_ROWS);
  const broken = head.find((row) => row.brokenQuotes);
  if (basis !== "file" || !broken) return { value: "quoting", issues: [] };
  return { value: "plain", issues: [brokenQuotes(broken.line)] };
}

function separatorOf(
  text: string,
  quotes: RowFormat["quotes"],
  corrections: Corrections,
): { separator: Guess<Separator>; issues: Issue[] } {
  if (corrections.separator) {
    return {
      separator: { value: corrections.separator, reason: "chosen by hand", basis: "stated" },
      issues: [],
    };
  }
  const { guess, rivals } = guessSeparator(text, quotes);
  if (rivals.length === 0) return { separator: guess, issues: [] };
  const all = [guess.value, ...rivals];
  return {
    separator: guess,
    issues: [
      {
        code: "separator",
        severity: "blocks",
        line: null,
        column: null,
        place: "file",
        message: `The columns can be divided by ${joined(all.map((one) => SEPARATOR_NAMES[one]))} equally well. Which is it?`,
        repairs: all.map((one) => ({
          label: `Divide by ${SEPARATOR_NAMES[one]}`,
          change: { kind: "set", values: { separator: one } },
        })),
      },
    ],
  };
}

function decimalMarkOf(
  sample: readonly Row[],
  separator: Separator,
  corrections: Corrections,
): { guess: Guess<DecimalMark | null>; issues: Issue[] } {
  if (corrections.decimalMark) {
    return {
      guess: { value: corrections.decimalMark, reason: "chosen by hand", basis: "stated" },
      issues: [],
    };
  }
  const { guess, question } = guessDecimalMark(sample, separator);
  if (question === null) return { guess, issues: [] };
  return {
    guess,
    issues: [
      {
        code: "decimal-mark",
        severity: "blocks",
        line: question.line,
        column: question.column < 0 ? null : question.column,
        place: `line ${question.line}`,
        message: question.message,
        repairs: question.choices.map(({ mark, label }) => ({
          label,
          change: { kind: "set", values: { decimalMark: mark } },
        })),
      },
    ],
  };
}

function refused(sample: readonly Row[]): Reading {
  const first = sample.find((row) => row.cells.some((cell) => cell !== ""));
  return {
    status: "refused",
    message: `No line of numbers was found; the file begins with ${quoted(first?.cells.join(" ") ?? "")}. A table with a column of times and a column of readings is needed.`,
  };
}

function speciesColumns(guessed: ColumnGuess, context: StudyContext) {
  return new Map(
    guessed.columns.flatMap((column) => {
      if (!column.role.startsWith("species:")) return [];
      const id = column.role.slice("species:".length);
      const species = context.species.find((one) => one.id === id);
      if (!species) return [];
      const label = column.unit === "" ? column.name : `${column.name} / ${column.unit}`;
      const named = speciesKey(label, [species]);
      return [[id, named ?? { species, unit: species.unit, unitInFile: false, explicit: false }] as const];
    }),
  );
}

function dataLines(frame: Frame, found: Gathered, corrections: Corrections): FileReading["dataLines"] {
  const stated = corrections.firstDataLine !== undefined || corrections.lastDataLine !== undefined;
  return {
    value: { from: frame.firstDataLine.value, to: Math.max(found.lastDataLine, frame.firstDataLine.value) },
    reason: stated ? "chosen by hand" : "from the first to the last line of numbers",
    basis: stated ? "stated" : "file",
  };
}

function countLines(text: string): number {
  let count = 1;
  for (let i = text.indexOf("\n"); i >= 0; i = text.indexOf("\n", i + 1)) count += 1;
  return text.endsWith("\n") ? count - 1 : count;
}
