import type { CellCorrection, ColumnRole, Corrections } from "./corrections";

/** One act of a person on the corrections; issues offer them as repairs. */
export type Change =
  | {
      readonly kind: "set";
      readonly values: Omit<Corrections, "columns" | "labels" | "cells" | "linesLeftOut">;
    }
  | { readonly kind: "column"; readonly column: number; readonly role: ColumnRole }
  | { readonly kind: "label"; readonly source: string; readonly label: string }
  | { readonly kind: "cells"; readonly cells: readonly CellCorrection[] }
  | { readonly kind: "forget-cell"; readonly line: number; readonly column: number }
  | { readonly kind: "leave-lines-out"; readonly lines: readonly number[] }
  | { readonly kind: "take-line-in"; readonly line: number };

/** The corrections after one change. Another sheet is read afresh; another separator makes other columns, so what was said of columns and cells goes. */
export function applyChange(current: Corrections, change: Change): Corrections {
  switch (change.kind) {
    case "set": {
      // Another sheet is another table.
      if ("sheet" in change.values) return change.values;
      if ("arrangement" in change.values) {
        const { columns, labels, cells, linesLeftOut, lastDataLine, ...rest } = current;
        return { ...rest, ...change.values };
      }
      const { columns, labels, cells, ...rest } = current;
      const kept = "separator" in change.values || "quotes" in change.values ? rest : current;
      return { ...kept, ...change.values };
    }
    case "column":
      return { ...current, columns: { ...current.columns, [String(change.column)]: change.role } };
    case "label":
      return { ...current, labels: { ...current.labels, [change.source]: change.label } };
    case "cells": {
      const isReplaced = (cell: CellCorrection) =>
        change.cells.some((other) => other.line === cell.line && other.column === cell.column);
      const others = (current.cells ?? []).filter((cell) => !isReplaced(cell));
      return { ...current, cells: [...others, ...change.cells] };
    }
    case "forget-cell":
      return {
        ...current,
        cells: (current.cells ?? []).filter(
          (cell) => cell.line !== change.line || cell.column !== change.column,
        ),
      };
    case "leave-lines-out":
      return { ...current, linesLeftOut: [...new Set([...(current.linesLeftOut ?? []), ...change.lines])] };
    case "take-line-in":
      return {
        ...current,
        linesLeftOut: (current.linesLeftOut ?? []).filter((line) => line !== change.line),
      };
  }
}
