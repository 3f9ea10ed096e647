import type { ReactNode } from "react";

/** What the grid is told. It owns focus, selection and the cell being edited; texts and their history stay outside. */
export interface GridColumn {
  readonly id: string;
  /** Plain name, spoken and used in messages: "[A]₀". */
  readonly label: string;
  readonly head: ReactNode;
  readonly kind: "number" | "text";
  /** Worked out, not typed: shaded, skipped by paste. */
  readonly readOnly?: boolean;
  /** Why values under such a heading may not be pasted into this column, another unit; null where they may. */
  readonly headingFault?: (heading: string) => string | null;
  /** Whether a heading that is pasted with its block names this column: such blocks go by name instead of place. */
  readonly isNamed?: (heading: string) => boolean;
  /** Smallest width, any CSS length. */
  readonly width?: string;
}

export interface GridRow {
  readonly id: string;
  /** Spoken and used in messages: "R04". */
  readonly label: string;
  readonly cells: Readonly<Record<string, string>>;
  /** Drawn in place of the text while the cell is not edited. */
  readonly drawn?: Readonly<Record<string, ReactNode>>;
  /** Columns that are worked out in this row, though they are typed in others. */
  readonly readOnly?: readonly string[];
  /** What is wrong with a cell whose text is kept as typed. */
  readonly faults?: Readonly<Record<string, string>>;
  /** Said in the row below: what is wrong, and what repairs it. */
  readonly problem?: GridProblem;
  readonly tone?: "set-aside" | "new";
  /** Heads a group: a line above this row. */
  readonly group?: ReactNode;
}

export interface GridProblem {
  readonly title: string;
  readonly detail?: string;
  readonly repairs: readonly { readonly label: string; readonly act: () => void }[];
}

/** Columns under one heading above their own, in order from the first: "Volumes", "After mixing". */
export interface GridBand {
  readonly id: string;
  /** Null over columns that belong to none. */
  readonly head: ReactNode;
  readonly columns: number;
  readonly computed?: boolean;
}

/** Whether a cell is worked out and neither typed nor pasted into. */
export function isReadOnly(row: GridRow | undefined, column: GridColumn | undefined): boolean {
  return column === undefined || column.readOnly === true || row?.readOnly?.includes(column.id) === true;
}

export interface GridPosition {
  readonly row: number;
  readonly column: number;
}

export interface GridChange {
  /** `null` for the n-th row that the step adds below, in order. */
  readonly rowId: string | null;
  readonly newRow: number;
  readonly columnId: string;
  readonly text: string;
}

/** One thing a person did: the unit of undo. */
export interface GridStep {
  readonly kind: "edit" | "paste" | "fill" | "clear";
  readonly changes: readonly GridChange[];
  /** What the step did, for the line under the grid. */
  readonly said: string;
}

export interface Rectangle {
  readonly top: number;
  readonly bottom: number;
  readonly left: number;
  readonly right: number;
}

export function rectangle(anchor: GridPosition, active: GridPosition): Rectangle {
  return {
    top: Math.min(anchor.row, active.row),
    bottom: Math.max(anchor.row, active.row),
    left: Math.min(anchor.column, active.column),
    right: Math.max(anchor.column, active.column),
  };
}
