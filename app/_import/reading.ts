import type { TimeUnit } from "@/db/sheet/sheet.schema";
import type { Change } from "./change";
import type { ClockKind } from "./clock";
import type { Container, SheetChoice } from "./container";
import type { ColumnRole, Corrections } from "./corrections";
import type { Encoding } from "./decode";
import type { DecimalMark } from "./number";
import type { Separator } from "./rows";
import type { ImportedTimeUnit } from "./units";

/** What the reader made of a file: every guess with its reason, the traces, and what stands in the way. */

export interface Guess<T> {
  readonly value: T;
  /** Why, as half a sentence that a person can check against the file. */
  readonly reason: string;
  /** `file`: the file shows it; `assumed`: nothing in the file says so; `stated`: a person said so. */
  readonly basis: "file" | "assumed" | "stated";
}

/** Needed from the study to read a file for it. */
export interface StudyContext {
  readonly timeUnit: TimeUnit;
  /** null while the set-up does not say what the signal is. */
  readonly signal:
    | null
    | { readonly kind: "concentration"; readonly unit: ConcentrationUnitName }
    | { readonly kind: "calibrated"; readonly quantity: string; readonly unit: string };
  /** Species of the law: their starting concentrations belong to every run. */
  readonly species: readonly SpeciesContext[];
  readonly runs: readonly RunContext[];
  /** Rows of the run sheet, those in the bin too: they count against what a study holds. */
  readonly runRows: number;
  /** Points that the study's traces hold already. */
  readonly points: number;
}

export type ConcentrationUnitName = "mol/L" | "mmol/L" | "umol/L";

export interface SpeciesContext {
  readonly id: string;
  readonly symbol: string;
  readonly name: string;
  readonly unit: ConcentrationUnitName;
}

export interface RunContext {
  readonly id: string;
  readonly label: string;
  readonly hasTrace: boolean;
  /** mol L⁻¹ by species id. */
  readonly molar: Readonly<Record<string, number>>;
  /** Species whose concentration follows from the run's volumes: nothing that a file says goes over it. */
  readonly mixed?: readonly string[];
}

/** `thousandths`: milli-units of the signal's unit in the set-up, mAU for AU. */
export type SignalUnit = ConcentrationUnitName | "as-set-up" | "thousandths";

export type Layout = "wide" | "paired" | "long";

export interface ColumnReading {
  /** 0-based. */
  readonly index: number;
  readonly name: string;
  readonly unit: string;
  readonly role: ColumnRole;
  /** How a column of clock times is written; null where it holds numbers or words. */
  readonly clock: ClockKind | null;
  readonly reason: string;
  readonly basis: Guess<unknown>["basis"];
}

export interface TraceReading {
  /** "c3" for column 3 (0-based), "r:name" for a run of a long table: stable under corrections. */
  readonly source: string;
  /** Words for the run's record: "column 4, A_15". */
  readonly column: string;
  readonly label: string;
  readonly labelReason: string;
  /** Planned run that takes the trace, or null for a new run. */
  readonly runId: string | null;
  /** Strictly increasing. Same length as `signal`. */
  readonly timeSeconds: Float64Array;
  /** In the set-up's unit; mol L⁻¹ where the signal is a concentration. */
  readonly signal: Float64Array;
  readonly temperatureKelvin: number | null;
  /** Starting concentrations that the file or a run of the study gives, mol L⁻¹, by species id. */
  readonly recipe: Readonly<Record<string, RecipeEntry>>;
}

export interface RecipeEntry {
  readonly molar: number;
  readonly reason: string;
  /** Follows from the volumes of the planned run and is not typed. */
  readonly mixed?: true;
}

export type IssueSeverity = "blocks" | "weakens" | "note" | "settled";

export interface Issue {
  readonly code: string;
  readonly severity: IssueSeverity;
  /** 1-based; null where the whole file is meant. */
  readonly line: number | null;
  /** 0-based; null where the whole line or file is meant. */
  readonly column: number | null;
  /** "line 108, R15", as shown before the message. */
  readonly place: string;
  readonly message: string;
  readonly repairs: readonly Repair[];
}

export interface Repair {
  readonly label: string;
  readonly change: Change;
}

/** A line of the file as shown in the preview. */
export interface ShownLine {
  readonly line: number;
  readonly kind: "preamble" | "header" | "unit" | "recipe" | "data" | "skipped";
  readonly cells: readonly string[];
}

export interface FileReading {
  readonly status: "read";
  readonly lines: number;
  readonly container: Container;
  /** The sheet that was read, of a workbook. */
  readonly sheet: SheetChoice | null;
  readonly encoding: Guess<Encoding>;
  readonly separator: Guess<Separator>;
  readonly quotes: "quoting" | "plain";
  /** null: cannot be told from the file and must be said. */
  readonly decimalMark: Guess<DecimalMark | null>;
  readonly headerLine: Guess<number | null>;
  readonly unitLine: Guess<number | null>;
  readonly dataLines: Guess<{ readonly from: number; readonly to: number }>;
  readonly layout: Guess<Layout>;
  readonly columns: readonly ColumnReading[];
  readonly timeUnit: Guess<ImportedTimeUnit>;
  readonly signalUnit: Guess<SignalUnit>;
  readonly traces: readonly TraceReading[];
  /** Severity first, then line. */
  readonly issues: readonly Issue[];
  readonly shownLines: readonly ShownLine[];
  readonly corrections: Corrections;
}

export type Reading = FileReading | { readonly status: "refused"; readonly message: string };
