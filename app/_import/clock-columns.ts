import { type ClockForm, elapsedSeconds, isMinutesSeconds, readClock } from "./clock";
import type { Corrections } from "./corrections";
import type { Frame } from "./frame";
import type { ColumnReading, Issue } from "./reading";
import { columnName, counted, quoted } from "./words";

/** How the time columns that hold clocks are read, and what a person should know or say about it. */
export interface ClockReading {
  /** By column; null where the column is no clock or no time. */
  readonly forms: readonly (ClockForm | null)[];
  /** Whether a trace counts from its own first reading, or keeps what a stopwatch says. */
  readonly zero: ClockZero;
  readonly issues: readonly Issue[];
}

export type ClockZero = "first-reading" | "as-written";

/** Below this a clock that starts a table is a stopwatch: few measure between midnight and one. */
const STOPWATCH_SECONDS = 3600;

export function clockColumns(
  columns: readonly ColumnReading[],
  frame: Frame,
  corrections: Corrections,
): ClockReading {
  const clocks = columns.filter((column) => column.role === "time" && column.clock !== null);
  const [first] = clocks;
  if (first === undefined) return { forms: [], zero: "as-written", issues: [] };
  const cellsOf = (column: ColumnReading) =>
    frame.data.map((row) => row.cells[column.index] ?? "").filter((cell) => cell !== "");

  const forms = columns.map((column): ClockForm | null => {
    if (column.role !== "time" || column.clock === null) return null;
    if (column.clock !== "two-parts") return column.clock;
    return corrections.clockForm ?? statedBy(column) ?? impliedBy(cellsOf(column)) ?? "minutes-seconds";
  });
  const open = clocks.find(
    (column) =>
      column.clock === "two-parts" &&
      corrections.clockForm === undefined &&
      statedBy(column) === null &&
      impliedBy(cellsOf(column)) === null,
  );
  const example = cellsOf(first)[0] ?? "";
  const form = forms[first.index] ?? "clock";
  const start = readClock(example, form) ?? 0;
  const zero =
    corrections.clockZero ??
    (form !== "moment" && start < STOPWATCH_SECONDS ? "as-written" : "first-reading");
  const question = open === undefined ? [] : [twoParts(open, cellsOf(open)[0] ?? "")];
  const note = open === undefined ? [zeroNote(first, example, form, zero)] : [];
  return { forms, zero, issues: [...question, ...note] };
}

/** The times of one trace in seconds from its zero. */
export function clockTimes(
  clock: Float64Array,
  form: ClockForm,
  zero: ClockZero,
): { readonly time: Float64Array; readonly midnights: number } {
  const { time, midnights } = elapsedSeconds(clock, form);
  const start = clock[0] ?? 0;
  return { time: zero === "as-written" ? time.map((value) => value + start) : time, midnights };
}

export function midnightIssue(midnights: number): Issue[] {
  if (midnights === 0) return [];
  return [
    {
      code: "midnight",
      severity: "note",
      line: null,
      column: null,
      place: "file",
      message: `The clock passes midnight ${counted(midnights, "time")}; a day is added each time.`,
      repairs: [],
    },
  ];
}

/** A heading such as "mm:ss" or a unit of minutes. */
function statedBy({ name, unit }: ColumnReading): ClockForm | null {
  const heading = `${name} ${unit}`.toLowerCase();
  if (/m+:s+|min:s/.test(heading)) return "minutes-seconds";
  return /h+:m+|h:min/.test(heading) ? "hours-minutes" : null;
}

function impliedBy(cells: readonly string[]): ClockForm | null {
  return isMinutesSeconds(cells) ? "minutes-seconds" : null;
}

function twoParts(column: ColumnReading, example: string): Issue {
  return {
    code: "clock-form",
    severity: "blocks",
    line: null,
    column: column.index,
    place: columnName(column.index, column.name),
    message: `${quoted(example)} can be hours and minutes or minutes and seconds. Which is it?`,
    repairs: [
      {
        label: "Read as minutes and seconds",
        change: { kind: "set", values: { clockForm: "minutes-seconds" } },
      },
      { label: "Read as hours and minutes", change: { kind: "set", values: { clockForm: "hours-minutes" } } },
    ],
  };
}

function zeroNote(column: ColumnReading, example: string, form: ClockForm, zero: ClockZero): Issue {
  const counts = zero === "first-reading";
  const written =
    form === "moment"
      ? []
      : [
          {
            label: counts ? "Keep the times as written" : "Count from the first reading",
            change: {
              kind: "set" as const,
              values: { clockZero: counts ? ("as-written" as const) : ("first-reading" as const) },
            },
          },
        ];
  return {
    code: "clock-times",
    severity: counts ? "weakens" : "note",
    line: null,
    column: column.index,
    place: columnName(column.index, column.name),
    message: counts
      ? `Times of day or date: each trace counts from its own first reading (${quoted(example)}). If mixing was earlier, give the run its time zero.`
      : `Read as a stopwatch, from ${quoted(example)} on: time zero is 0:00.`,
    repairs: written,
  };
}
