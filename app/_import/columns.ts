import { type ClockKind, clockOfColumn } from "./clock";
import type { ColumnRole, Corrections } from "./corrections";
import type { Frame } from "./frame";
import { type NumberFormat, readCell } from "./number";
import type { ColumnReading, Guess, Layout, SpeciesContext } from "./reading";
import { speciesKey } from "./recipes";
import { isUnit, splitUnit, temperatureUnitOf, timeUnitOf } from "./units";

/**
 * What each column is, from its name, its unit and how its numbers run, each with the reason shown to the person who
 * may know better. A signal belongs to the nearest time column on its left, so that one time column for all traces
 * and a time column for each are read by the same rule.
 */

interface ColumnSample {
  readonly index: number;
  readonly name: string;
  readonly unit: string;
  readonly numbers: readonly number[];
  readonly texts: number;
  readonly empty: number;
  readonly distinct: ReadonlySet<string>;
  readonly cells: readonly string[];
  readonly clock: ClockKind | null;
}

const TIME_NAME = /^(t|time|zeit|temps|tiempo|tempo|elapsed( time)?|reaction time|time.*|zeit.*|.*\btime)$/i;
const RUN_NAME =
  /^(run|runs|series|sample|trace|experiment|lauf|versuch|probe|id|label|run[ _-]?(id|no|name|label|number)?)\.?$/i;
const COUNTER_NAME = /^(#|no\.?|nr\.?|n|index|idx|i|line|point|row|scan|cycle)$/i;
const TEMPERATURE_NAME = /^(T|[Tt]emp.*|.*[Tt]emperatur.*|[Tt][ _-]?cell|[Cc]ell[ _-]?[Tt])$/;

export interface ColumnGuess {
  readonly columns: readonly ColumnReading[];
  readonly layout: Guess<Layout>;
}

export function guessColumns(
  frame: Frame,
  format: NumberFormat,
  species: readonly SpeciesContext[],
  stated: Corrections["columns"],
): ColumnGuess {
  const samples = Array.from({ length: frame.columns }, (_, j) => sampleOf(frame, format, j));
  const run = samples.find((column) => RUN_NAME.test(column.name) && repeats(column));
  const runByText = run ?? (stated === undefined ? runOfText(samples) : undefined);
  const statedRun = Object.values(stated ?? {}).includes("run");
  const long = statedRun || (runByText !== undefined && samples.length >= 3);
  const times = timeColumns(samples, long ? runByText?.index : undefined);

  const columns = samples.map((column): ColumnReading => {
    const base = { index: column.index, name: column.name, unit: column.unit, clock: column.clock };
    const chosen = stated?.[String(column.index)];
    if (chosen) return { ...base, role: chosen, reason: "chosen by hand", basis: "stated" };
    const [role, reason, basis] = roleOf(column, times, long ? runByText : undefined, long, species);
    return { ...base, role, reason, basis: basis ?? "file" };
  });
  return { columns: long ? oneSignal(columns, stated) : columns, layout: layoutOf(columns) };
}

function layoutOf(columns: readonly ColumnReading[]): Guess<Layout> {
  if (columns.some((column) => column.role === "run")) {
    return { value: "long", reason: "a column names the run of each line", basis: "file" };
  }
  const times = columns.filter((column) => column.role === "time").length;
  return times > 1
    ? { value: "paired", reason: `${times} columns of time`, basis: "file" }
    : { value: "wide", reason: "one column of time", basis: "file" };
}

/** A long table has one signal; further columns of numbers are left out until somebody says which it is. */
function oneSignal(columns: readonly ColumnReading[], stated: Corrections["columns"]): ColumnReading[] {
  const kept =
    columns.find((column) => column.role === "signal" && stated?.[String(column.index)] === "signal") ??
    columns.find((column) => column.role === "signal");
  return columns.map((column) =>
    column.role === "signal" && column !== kept && column.basis !== "stated"
      ? {
          ...column,
          role: "left-out",
          reason: `a table with a run column has one signal, and column ${(kept?.index ?? 0) + 1} comes first`,
          basis: "assumed",
        }
      : column,
  );
}

function roleOf(
  column: ColumnSample,
  times: ReadonlyMap<number, string>,
  run: ColumnSample | undefined,
  long: boolean,
  species: readonly SpeciesContext[],
): [ColumnRole, string, Guess<unknown>["basis"]?] {
  if (column === run) return ["run", `named “${column.name}”, and its entries repeat`];
  const time = times.get(column.index);
  if (time !== undefined) return ["time", time];
  if (column.numbers.length === 0 && column.texts === 0) return ["left-out", "empty"];
  if (column.clock !== null) return ["left-out", `clock times, beside another column of time`];
  if (column.texts > column.numbers.length) {
    return ["left-out", `text, no numbers: “${[...column.distinct][0] ?? ""}”`];
  }
  if (COUNTER_NAME.test(column.name) && isCounter(column.numbers)) {
    return ["left-out", `“${column.name}” counts the lines`];
  }
  if (temperatureUnitOf(column.unit) !== null) {
    return ["temperature", `unit “${column.unit}”`];
  }
  if (TEMPERATURE_NAME.test(column.name)) return ["temperature", `named “${column.name}”`];
  if (long) {
    const key = speciesKey(column.unit === "" ? column.name : `${column.name} / ${column.unit}`, species);
    if (key?.explicit)
      return [`species:${key.species.id}`, `“${column.name}” is ${key.species.symbol || key.species.name}`];
  }
  const named = column.name === "" ? "numbers beside a column of time" : `named “${column.name}”`;
  return ["signal", named];
}

/** Entries come back on several lines, as the name of a run does and a counter does not. */
function repeats(column: ColumnSample): boolean {
  return column.distinct.size > 0 && column.distinct.size * 2 <= column.cells.length;
}

/** Time columns with the reason; by name or unit first, else the first column of rising numbers. */
function timeColumns(
  samples: readonly ColumnSample[],
  runColumn: number | undefined,
): ReadonlyMap<number, string> {
  const numeric = samples.filter(
    (column) => column.numbers.length > column.texts && column.index !== runColumn,
  );
  const named = numeric.filter(
    (column) =>
      temperatureUnitOf(column.unit) === null &&
      (TIME_NAME.test(column.name) || timeUnitOf(column.unit) !== null),
  );
  // Beside another time, "T" is the temperature.
  const lower = named.filter((column) => column.name !== "T");
  const times = lower.length > 0 ? lower : named;
  if (times.length > 0) {
    const used = runColumn === undefined ? times : times.slice(0, 1);
    return new Map(
      used.map((column) => [
        column.index,
        timeUnitOf(column.unit) === null
          ? `named “${column.name}”`
          : `named “${column.name}”, unit “${column.unit}”`.replace("named “”, ", ""),
      ]),
    );
  }
  const clocks = samples.filter((column) => column.clock !== null && column.index !== runColumn);
  if (clocks.length > 0) {
    const used = runColumn === undefined ? clocks : clocks.slice(0, 1);
    return new Map(used.map((column) => [column.index, `clock times, “${column.cells[0] ?? ""}”`]));
  }
  const rising = numeric.filter((column) => isRising(column.numbers) && !COUNTER_NAME.test(column.name));
  const first = runColumn === undefined ? (rising[0] ?? numeric[0]) : (numeric[0] ?? rising[0]);
  if (!first) return new Map();
  const repeated = numeric.filter(
    (column, i) => i % 2 === 0 && column.name === first.name && isRising(column.numbers),
  );
  const same = repeated.filter((column) => equalStart(column.numbers, first.numbers));
  const paired = numeric.length >= 4 && numeric.length % 2 === 0 && same.length === numeric.length / 2;
  if (paired && runColumn === undefined) {
    return new Map(
      same.map((column) => [column.index, "the same rising numbers stand in every second column"]),
    );
  }
  const reason = rising.includes(first)
    ? "the first column whose numbers rise"
    : "the first column of numbers";
  return new Map([[first.index, reason]]);
}

/** A column of words that repeat, beside two columns of numbers or clocks: it may name the run of each line. */
function runOfText(samples: readonly ColumnSample[]): ColumnSample | undefined {
  const numbers = samples.filter(
    (column) => column.numbers.length > column.texts || column.clock !== null,
  ).length;
  if (numbers < 2) return undefined;
  return samples.find((column) => {
    return (
      column.clock === null &&
      column.texts > column.numbers.length &&
      column.distinct.size > 1 &&
      repeats(column)
    );
  });
}

function sampleOf(frame: Frame, format: NumberFormat, index: number): ColumnSample {
  const head = splitUnit(frame.header?.cells[index] ?? "");
  const unitCell = frame.units?.cells[index] ?? "";
  const numbers: number[] = [];
  const cells: string[] = [];
  const distinct = new Set<string>();
  let texts = 0;
  let empty = 0;
  for (const row of frame.data) {
    const cell = row.cells[index] ?? "";
    const reading = readCell(cell, format);
    if (reading.kind === "number") numbers.push(reading.value);
    else if (reading.kind === "ambiguous") numbers.push(reading.asDecimal);
    else if (reading.kind === "flagged") numbers.push(reading.asNumber);
    else if (reading.kind === "empty") empty += 1;
    else if (reading.kind === "text") texts += 1;
    if (cell !== "") {
      cells.push(cell);
      if (distinct.size < 3000) distinct.add(cell);
    }
  }
  const bareUnit = unitCell.replace(/^[([]|[)\]]$/g, "").trim();
  const nameIsUnit =
    head.unit === "" && frame.units === null && isUnit(head.name) && timeUnitOf(head.name) !== null;
  return {
    index,
    name: nameIsUnit ? "" : head.name,
    unit: bareUnit !== "" ? bareUnit : nameIsUnit ? head.name : head.unit,
    numbers,
    texts,
    empty,
    distinct,
    cells,
    clock: numbers.length > texts ? null : clockOfColumn(cells),
  };
}

function isRising(numbers: readonly number[]): boolean {
  if (numbers.length === 0) return false;
  if (numbers.length === 1) return true;
  let rises = 0;
  for (let i = 1; i < numbers.length; i++) if ((numbers[i] ?? 0) >= (numbers[i - 1] ?? 0)) rises += 1;
  return rises >= 0.95 * (numbers.length - 1) && (numbers.at(-1) ?? 0) > (numbers[0] ?? 0);
}

function isCounter(numbers: readonly number[]): boolean {
  return numbers.every((value, i) => i === 0 || value - (numbers[i - 1] ?? 0) === 1);
}

function equalStart(a: readonly number[], b: readonly number[]): boolean {
  return a.length > 1 && a.slice(0, 5).every((value, i) => value === b[i]);
}
