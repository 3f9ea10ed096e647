import { type ClockReading, clockTimes, midnightIssue } from "./clock-columns";
import type { Corrections } from "./corrections";
import type { GatheredTrace } from "./gathered";
import { labelTraces } from "./labels";
import type { ColumnReading, Issue, RecipeEntry, SignalUnit, StudyContext, TraceReading } from "./reading";
import type { RecipeLine, SpeciesKey } from "./recipes";
import { importedSignal } from "./table-units";
import { timeIssues } from "./time-issues";
import { orderTimes } from "./time-order";
import {
  CELSIUS_ZERO_KELVIN,
  type ImportedTimeUnit,
  importedConcentrationToMolar,
  importedTimeToSeconds,
} from "./units";
import { counted, joined, lines, unitWords } from "./words";

/** Gathered columns into traces of runs: ordered, converted, labelled, with the recipe the file or a run gives. */

export interface TraceOptions {
  readonly columns: readonly ColumnReading[];
  readonly context: StudyContext;
  readonly corrections: Corrections;
  readonly timeUnit: ImportedTimeUnit;
  readonly clock: ClockReading;
  readonly signalUnit: SignalUnit;
  readonly recipes: readonly RecipeLine[];
  /** Row of run names above the line of names, by column. */
  readonly titles: readonly string[];
  /** How species columns of a long table are read, by species id. */
  readonly speciesColumns: ReadonlyMap<string, SpeciesKey>;
}

export function buildTraces(
  gathered: readonly GatheredTrace[],
  options: TraceOptions,
): { readonly traces: readonly TraceReading[]; readonly issues: readonly Issue[] } {
  const { columns, context, corrections } = options;
  const issues: Issue[] = [];
  const filled = gathered.filter((trace) => trace.time.length > 0);
  for (const trace of gathered) if (trace.time.length === 0) issues.push(emptyTrace(trace, columns));

  const names = nameTraces(filled, options);
  const labels = labelTraces(names, context.runs, corrections.labels ?? {});
  issues.push(...clashes(filled, labels, columns, context));

  const faultsByClock = new Map<string, { labels: string[]; issues: Issue[] }>();
  let midnights = 0;
  const traces = filled.map((trace, i): TraceReading => {
    const label = labels[i] ?? { label: "", reason: "", runId: null, repeats: null };
    const clock = timesOf(trace, options);
    midnights = Math.max(midnights, clock.midnights);
    const { readings, faults } = orderTimes(
      { time: clock.time, signal: trace.signal.view(), line: trace.line.view() },
      corrections,
    );
    const found = timeIssues(faults, {
      column: trace.column,
      traces: trace.runName === null ? "" : label.label,
      unit: options.timeUnit,
      readings: readings.time.length,
      firstTime: readings.time[0] ?? 0,
    });
    const key = JSON.stringify([trace.runName, faults.repeats, faults.falls]);
    if (found.length > 0 && !faultsByClock.has(key)) faultsByClock.set(key, { labels: [], issues: found });
    faultsByClock.get(key)?.labels.push(label.label);

    const run = context.runs.find((one) => one.id === label.runId) ?? label.repeats;
    const column = columns[trace.column];
    return {
      source: trace.source,
      column:
        trace.runName === null
          ? `column ${trace.column + 1}${column?.name ? `, ${column.name}` : ""}`.slice(0, 120)
          : `column ${trace.column + 1}, run ${trace.runName}`.slice(0, 120),
      label: label.label,
      labelReason: label.reason,
      runId: label.runId,
      timeSeconds: readings.time.map((value) => importedTimeToSeconds(value, options.timeUnit)),
      signal: readings.signal.map((value) => importedSignal(value, options.signalUnit)),
      temperatureKelvin: meanTemperature(trace, columns, corrections),
      recipe: recipeOf(trace, options, run, label.runId),
    };
  });
  for (const { issues: found } of faultsByClock.values()) issues.push(...found);
  issues.push(...midnightIssue(midnights), ...recipeIssues(filled, options));
  return { traces, issues };
}

/** Numbers as they stand, or clock times counted from the trace's zero. */
function timesOf(trace: GatheredTrace, { columns, clock }: TraceOptions) {
  const times = columns.filter((column) => column.role === "time");
  const own = times.findLast((column) => column.index < trace.column) ?? times[0];
  const form = own === undefined ? null : (clock.forms[own.index] ?? null);
  const time = trace.time.view();
  return form === null ? { time, midnights: 0 } : clockTimes(time, form, clock.zero);
}

/** Names by which runs are found: the column's, a title above a pair of columns, or the entry of the run column. */
function nameTraces(traces: readonly GatheredTrace[], options: TraceOptions) {
  const own = traces.map((trace) => trace.runName ?? options.columns[trace.column]?.name ?? "");
  const repeated = traces.length > 1 && new Set(own).size < own.length;
  return traces.map((trace, i) => {
    if (trace.runName !== null || !repeated) return { source: trace.source, name: own[i] ?? "" };
    const time = options.columns.findLast((column) => column.role === "time" && column.index < trace.column);
    const title = options.titles[trace.column] || (time ? options.titles[time.index] : "") || "";
    return { source: trace.source, name: title !== "" ? title : (own[i] ?? "") };
  });
}

function clashes(
  traces: readonly GatheredTrace[],
  labels: readonly { readonly label: string; readonly runId: string | null }[],
  columns: readonly ColumnReading[],
  context: StudyContext,
): Issue[] {
  const first = new Map<string, number>();
  const used = new Map(context.runs.map((run) => [run.label.toLowerCase(), run]));
  return traces.flatMap((trace, i): Issue[] => {
    const label = labels[i];
    if (!label) return [];
    const key = label.label.toLowerCase();
    const earlier = first.get(key);
    first.set(key, earlier ?? i);
    const existing = label.runId === null ? used.get(key) : undefined;
    if (earlier === undefined && !existing) return [];
    const where = earlier === undefined ? "" : sourceWords(traces[earlier], columns);
    return [
      {
        code: "run-taken-twice",
        severity: "blocks",
        line: null,
        column: trace.column,
        place: sourceWords(trace, columns),
        message: existing
          ? `${label.label} has a trace already, which stays. Give these readings another label.`
          : `Read as ${label.label}, which ${where} is already. Give one of them another label.`,
        repairs: [],
      },
    ];
  });
}

function sourceWords(trace: GatheredTrace | undefined, columns: readonly ColumnReading[]): string {
  if (!trace) return "";
  const name = columns[trace.column]?.name;
  return trace.runName === null
    ? `column ${trace.column + 1}${name ? ` (${name})` : ""}`
    : `run ${trace.runName}`;
}

function emptyTrace(trace: GatheredTrace, columns: readonly ColumnReading[]): Issue {
  return {
    code: "empty-column",
    severity: "note",
    line: null,
    column: trace.column,
    place: sourceWords(trace, columns),
    message: "No reading with a time stands here, so there is nothing to store.",
    repairs: [],
  };
}

function meanTemperature(
  trace: GatheredTrace,
  columns: readonly ColumnReading[],
  corrections: Corrections,
): number | null {
  if (trace.temperature.count === 0) return null;
  const mean = trace.temperature.sum / trace.temperature.count;
  const unit = columns.find((column) => column.role === "temperature")?.unit ?? "";
  const kelvin = corrections.temperatureUnit
    ? corrections.temperatureUnit === "K"
    : /^(K|kelvin)$/.test(unit) || mean > 200;
  const value = kelvin ? mean : mean + CELSIUS_ZERO_KELVIN;
  return value > 0 ? value : null;
}

function recipeOf(
  trace: GatheredTrace,
  options: TraceOptions,
  run: StudyContext["runs"][number] | null | undefined,
  runId: string | null,
): Record<string, RecipeEntry> {
  const recipe: Record<string, RecipeEntry> = {};
  for (const [id, molar] of Object.entries(run?.molar ?? {})) {
    recipe[id] = { molar, reason: `as planned for ${run?.label}` };
  }
  for (const line of options.recipes) {
    const molar = typeof line.values === "number" ? line.values : line.values.get(trace.column);
    const reason = `line ${line.line}, “${line.label}”${line.key.unitInFile ? "" : `, taken as ${unitWords(line.key.unit)}`}`;
    if (molar !== undefined) recipe[line.key.species.id] = { molar, reason };
  }
  for (const [id, { value, line }] of trace.concentrations) {
    const key = options.speciesColumns.get(id);
    if (key && value >= 0)
      recipe[id] = { molar: importedConcentrationToMolar(value, key.unit), reason: `line ${line}` };
  }
  // A run that repeats one with a trace has no volumes of its own: only the planned run itself is worked out.
  for (const id of run !== null && run?.id === runId ? (run.mixed ?? []) : []) {
    const molar = run?.molar[id];
    if (molar !== undefined)
      recipe[id] = { molar, reason: `follows from the volumes of ${run?.label}`, mixed: true };
  }
  return recipe;
}

function recipeIssues(traces: readonly GatheredTrace[], options: TraceOptions): Issue[] {
  const issues: Issue[] = options.recipes.flatMap((line): Issue[] => {
    const bad = line.unreadable;
    const base = { line: line.line, column: null, place: lines(line.line, line.line), repairs: [] };
    const name = line.key.species.symbol || line.key.species.name;
    if (bad.length > 0) {
      const words = joined(bad.slice(0, 3).map(({ column, text }) => `column ${column + 1} “${text}”`));
      return [
        {
          ...base,
          code: "recipe",
          severity: "weakens",
          message: `Starting concentrations of ${name}; not a concentration: ${words}. Fill those in by hand.`,
        },
      ];
    }
    const count =
      typeof line.values === "number" ? "one value for all traces" : counted(line.values.size, "value");
    return [
      {
        ...base,
        code: "recipe",
        severity: line.key.unitInFile ? "settled" : "note",
        message: `Starting concentrations of ${name}, ${count}, ${line.key.unitInFile ? `in ${unitWords(line.key.unit)}` : `no unit given, taken as ${unitWords(line.key.unit)}`}.`,
      },
    ];
  });
  for (const trace of traces) {
    for (const [id, entry] of trace.concentrations) {
      if (entry.varies === null) continue;
      const name = options.speciesColumns.get(id)?.species.symbol ?? id;
      issues.push({
        code: "recipe-varies",
        severity: "weakens",
        line: entry.varies,
        column: null,
        place: `line ${entry.varies}, run ${trace.runName ?? ""}`,
        message: `[${name}] changes within the run; its first value, from line ${entry.line}, is taken as the starting concentration.`,
        repairs: [],
      });
    }
  }
  return issues;
}
