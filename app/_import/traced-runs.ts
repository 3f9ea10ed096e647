import type { TracedRun } from "@/db/run/add-traces";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import { ENCODING_NAMES } from "./decode";
import type { FileReading } from "./reading";
import { SEPARATOR_NAMES } from "./rows";

/** Starting concentrations by the trace's source and species id, in mol L⁻¹; what is not there was left open. */
export type Recipes = Readonly<Record<string, Readonly<Record<string, number>>>>;

/** A reading as the runs that the store keeps. */
export function tracedRuns(reading: FileReading, recipes: Recipes, sheet: Sheet): TracedRun[] {
  return reading.traces.map((trace) => {
    const planned = sheet.runs.find((run) => run.id === trace.runId);
    return {
      label: trace.label,
      column: trace.column,
      plannedRunId: trace.runId,
      temperatureKelvin: trace.temperatureKelvin ?? planned?.temperatureKelvin ?? null,
      concentrations: concentrations(recipes[trace.source] ?? {}, planned),
      trace: { timeSeconds: trace.timeSeconds, signal: trace.signal },
    };
  });
}

/** A planned concentration that was left as it was keeps its uncertainty; one that was typed is taken as exact. */
function concentrations(
  recipe: Readonly<Record<string, number>>,
  planned: SheetRun | undefined,
): SheetRun["concentrations"] {
  return Object.fromEntries(
    Object.entries(recipe).map(([speciesId, molar]) => {
      const known = planned?.concentrations[speciesId];
      return [speciesId, known?.molar === molar ? known : { molar, relativeUncertainty: 0 }];
    }),
  );
}

const LONGEST_WORDS = 2000;

/** How the file was read, for the audit trail: enough to read it again by hand. */
export function readingInWords(reading: FileReading): string {
  const { corrections } = reading;
  const byHand =
    Object.keys(corrections).length > 0 ? `, corrected by hand: ${JSON.stringify(corrections)}` : "";
  const words = [
    ENCODING_NAMES[reading.encoding.value],
    `separator ${SEPARATOR_NAMES[reading.separator.value]}`,
    `decimal mark ${reading.decimalMark.value ?? "unknown"}`,
    reading.headerLine.value === null ? "no line of names" : `names on line ${reading.headerLine.value}`,
    reading.unitLine.value === null ? "no line of units" : `units on line ${reading.unitLine.value}`,
    `data on lines ${reading.dataLines.value.from} to ${reading.dataLines.value.to}`,
    `time in ${reading.timeUnit.value}`,
    `signal ${reading.signalUnit.value}`,
    `columns: ${reading.columns.map((column) => `${column.index + 1} ${column.role}`).join(", ")}`,
  ].join("; ");
  return `${words}${byHand}`.slice(0, LONGEST_WORDS);
}
