import type { RandomDraws } from "kinetics-core/random";

/** What one replicate measured, by name; NaN where there is nothing to measure. Every replicate of a cell has the same names. */
export type Outcome = Readonly<Record<string, number>>;

/** The replicates of one cell, a column a name, in the order of the replicates. */
export type Columns = Readonly<Record<string, Float64Array>>;

export interface CellResult<Cell> {
  readonly cell: Cell;
  readonly replicates: number;
  readonly columns: Columns;
}

export interface SectionReport {
  /** Tables in Markdown. */
  readonly markdown: string;
  /** The tables' figures, for a program to read. */
  readonly figures: unknown;
  /** One sentence a cell or bound that failed. */
  readonly failures: readonly string[];
}

/** One table of simulations with known truth, over cells of `grid.ts`. */
export interface Section<Cell extends { readonly name: string }> {
  readonly name: string;
  readonly title: string;
  readonly cells: readonly Cell[];
  /** Replicates a cell unless the command line says otherwise, with the reason where they are not 3,000. */
  readonly replicates: number;
  readonly reason: string | null;
  /** Does what is the same for all replicates of a cell once, and returns the simulation of one. */
  prepare(cell: Cell): (draws: RandomDraws) => Outcome;
  report(results: readonly CellResult<Cell>[]): SectionReport;
}

/** A section whose cells nobody outside needs to know: what the workers and the command line handle. */
export interface AnySection {
  readonly name: string;
  readonly title: string;
  readonly cellNames: readonly string[];
  readonly replicates: number;
  readonly reason: string | null;
  prepare(cell: number): (draws: RandomDraws) => Outcome;
  report(columns: readonly Columns[], replicates: number): SectionReport;
}

export function anySection<Cell extends { readonly name: string }>(section: Section<Cell>): AnySection {
  const { name, title, cells, replicates, reason } = section;
  return {
    name,
    title,
    cellNames: cells.map((cell) => cell.name),
    replicates,
    reason,
    prepare: (index) => {
      const cell = cells[index];
      if (cell === undefined) throw new RangeError(`${name} has no cell ${index}`);
      return section.prepare(cell);
    },
    report: (columns, count) =>
      section.report(cells.map((cell, i) => ({ cell, replicates: count, columns: columns[i] ?? {} }))),
  };
}
