import type { GrowingArray } from "./growing-array";
import type { CellReading } from "./number";

/** What one pass over the lines of data found. */

/** One trace as it stands in the file: may repeat times or fall back. `line` tells where each reading came from. */
export interface GatheredTrace {
  readonly source: string;
  /** 0-based column of the signal. */
  readonly column: number;
  /** The entry of the run column, in a long table. */
  readonly runName: string | null;
  readonly time: GrowingArray;
  readonly signal: GrowingArray;
  readonly line: GrowingArray;
  /** From the species columns of a long table; the file's unit. */
  readonly concentrations: Map<string, { value: number; line: number; varies: number | null }>;
  readonly temperature: { sum: number; count: number };
  empty: number;
}

export interface CellFinding {
  readonly line: number;
  readonly column: number;
  readonly text: string;
  readonly reading: Exclude<CellReading, { kind: "number" | "empty" }>;
  readonly before: number | null;
  after: number | null;
}

export interface LineFinding {
  readonly line: number;
  readonly text: string;
  readonly cells: number;
}

export interface Gathered {
  readonly traces: readonly GatheredTrace[];
  readonly cells: readonly CellFinding[];
  /** How many cells of a column are no number, by column and kind; `cells` holds the first of them only. */
  readonly counts: ReadonlyMap<string, number>;
  /** Numbers read, by column. */
  readonly numbers: readonly (number | undefined)[];
  readonly longLines: readonly LineFinding[];
  readonly longLineCount: number;
  readonly shortLines: readonly LineFinding[];
  readonly shortLineCount: number;
  readonly timeless: readonly LineFinding[];
  readonly timelessCount: number;
  /** Blank lines and lines of words within the data. */
  readonly wordLines: readonly LineFinding[];
  readonly wordLineCount: number;
  readonly blankLineCount: number;
  /** What stands below the last line of data. */
  readonly tail: readonly LineFinding[];
  readonly tailCount: number;
  /** Lines whose first word is that of a statistic of the columns: mean, standard deviation. */
  readonly summaries: readonly LineFinding[];
  readonly summaryCount: number;
  readonly brokenQuotes: number | null;
  readonly lastDataLine: number;
  readonly lines: number;
  readonly tooManyPoints: boolean;
}
