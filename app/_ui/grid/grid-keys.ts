import type { GridPosition } from "./grid-shape";

/** What a key means in the grid: a table without DOM, so that every key has its test. */
export type GridCommand =
  | {
      readonly kind: "move";
      readonly rows: number;
      readonly columns: number;
      readonly toEdge: boolean;
      readonly extend: boolean;
    }
  | { readonly kind: "row-end"; readonly end: "first" | "last"; readonly extend: boolean }
  | { readonly kind: "keep"; readonly go: "down" | "up" | "right" | "left" }
  | { readonly kind: "edit" }
  | { readonly kind: "replace"; readonly text: string }
  | { readonly kind: "abandon" }
  | { readonly kind: "clear" }
  | { readonly kind: "fill-down" }
  | { readonly kind: "select-all" }
  | { readonly kind: "undo" }
  | { readonly kind: "redo" };

export interface PressedKey {
  readonly key: string;
  readonly ctrlKey: boolean;
  readonly metaKey: boolean;
  readonly shiftKey: boolean;
  readonly altKey: boolean;
}

export interface KeyContext {
  /** `replacing` began by typing over the cell, `in-place` by F2: arrows then belong to the caret. */
  readonly editing: "no" | "replacing" | "in-place";
  readonly column: "number" | "text" | "computed";
}

const ARROWS: Readonly<Record<string, readonly [rows: number, columns: number]>> = {
  ArrowUp: [-1, 0],
  ArrowDown: [1, 0],
  ArrowLeft: [0, -1],
  ArrowRight: [0, 1],
};

/** `null` leaves the key to the browser: caret movement, typing, copy and paste events, keys of the page. */
export function commandFor(pressed: PressedKey, { editing, column }: KeyContext): GridCommand | null {
  const { key, shiftKey } = pressed;
  const control = pressed.ctrlKey || pressed.metaKey;
  if (pressed.altKey) return null;
  if (key === "Enter") return { kind: "keep", go: shiftKey ? "up" : "down" };
  if (key === "Tab") return control ? null : { kind: "keep", go: shiftKey ? "left" : "right" };
  if (key === "Escape") return editing === "no" ? null : { kind: "abandon" };
  const arrow = ARROWS[key];
  if (arrow && editing !== "in-place") {
    return {
      kind: "move",
      rows: arrow[0],
      columns: arrow[1],
      toEdge: control,
      extend: shiftKey && editing === "no",
    };
  }
  if (editing !== "no") return null;
  if (control) return controlCommand(key.toLowerCase(), shiftKey);
  if (key === "Home" || key === "End")
    return { kind: "row-end", end: key === "Home" ? "first" : "last", extend: shiftKey };
  if (column === "computed") return null;
  if (key === "F2") return { kind: "edit" };
  if (key === "Delete" || key === "Backspace") return { kind: "clear" };
  const begins = column === "number" ? /^[\d+\-−.,]$/ : /^\S$/u;
  return begins.test(key) ? { kind: "replace", text: key } : null;
}

function controlCommand(key: string, shift: boolean): GridCommand | null {
  switch (key) {
    case "d":
      return { kind: "fill-down" };
    case "a":
      return { kind: "select-all" };
    case "z":
      return { kind: shift ? "redo" : "undo" };
    case "y":
      return { kind: "redo" };
    default:
      return null;
  }
}

/** Where the active cell goes; `null` when Tab passes the last or first cell and leaves the grid. */
export function moved(
  from: GridPosition,
  command: Extract<GridCommand, { kind: "move" | "row-end" | "keep" }>,
  { rows, columns }: { readonly rows: number; readonly columns: number },
): GridPosition | null {
  const lastRow = rows - 1;
  const lastColumn = columns - 1;
  if (command.kind === "row-end") return { row: from.row, column: command.end === "first" ? 0 : lastColumn };
  if (command.kind === "move") {
    return {
      row: clamp(
        command.toEdge && command.rows !== 0 ? command.rows * rows : from.row + command.rows,
        lastRow,
      ),
      column: clamp(
        command.toEdge && command.columns !== 0 ? command.columns * columns : from.column + command.columns,
        lastColumn,
      ),
    };
  }
  switch (command.go) {
    case "down":
      return { row: clamp(from.row + 1, lastRow), column: from.column };
    case "up":
      return { row: clamp(from.row - 1, lastRow), column: from.column };
    case "right":
      if (from.column < lastColumn) return { row: from.row, column: from.column + 1 };
      return from.row < lastRow ? { row: from.row + 1, column: 0 } : null;
    case "left":
      if (from.column > 0) return { row: from.row, column: from.column - 1 };
      return from.row > 0 ? { row: from.row - 1, column: lastColumn } : null;
  }
}

function clamp(index: number, last: number): number {
  return Math.max(0, Math.min(last, index));
}
