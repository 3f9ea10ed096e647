import type { Encoding } from "./decode";
import type { DecimalMark } from "./number";
import type { Guess, Issue } from "./reading";
import type { RowFormat } from "./rows";

/**
 * The table inside a file as text, whatever it came in. A workbook and a JCAMP-DX file say themselves how their cells
 * are divided and what their decimal mark is; a file of text is guessed at. One reader takes it from here.
 */
export interface TableText {
  readonly status: "text";
  readonly text: string;
  readonly encoding: Guess<Encoding>;
  readonly container: Container;
  /** null: to be guessed from the text. */
  readonly format: (RowFormat & { readonly decimalMark: DecimalMark }) | null;
  /** The sheet that was read, of a workbook. */
  readonly sheet: SheetChoice | null;
  /** What the container itself has to say. */
  readonly issues: readonly Issue[];
}

export type Container = "text" | "workbook" | "jcamp-dx";

export interface SheetChoice extends Guess<string> {
  /** Names of all sheets, in the workbook's order. */
  readonly names: readonly string[];
}

export type TableTextReading = TableText | { readonly status: "refused"; readonly message: string };

/** Cells of a container are divided by tabs, and marks in them are characters like others. */
export const CONTAINER_FORMAT = { separator: "\t", quotes: "plain", decimalMark: "." } as const;
