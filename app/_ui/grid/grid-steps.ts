import type { Block } from "./clipboard-block";
import {
  type GridChange,
  type GridColumn,
  type GridPosition,
  type GridRow,
  type GridStep,
  isReadOnly,
  type Rectangle,
} from "./grid-shape";
import { planPaste } from "./plan-paste";

/** What an act on the grid changes: only cells whose text differs, none that is computed. `null` where nothing does. */
export function editStep(
  rows: readonly GridRow[],
  columns: readonly GridColumn[],
  at: GridPosition,
  text: string,
): GridStep | null {
  const row = rows[at.row];
  const column = columns[at.column];
  if (!row || !column) return null;
  return stepOf(
    "edit",
    changesOf(rows, columns, [{ ...at, text: text.trim() }]),
    `${row.label}, ${column.label}: ${text.trim() || "emptied"}.`,
  );
}

export function clearStep(
  rows: readonly GridRow[],
  columns: readonly GridColumn[],
  selected: Rectangle,
): GridStep | null {
  const changes = changesOf(
    rows,
    columns,
    [...positions(selected)].map((at) => ({ ...at, text: "" })),
  );
  return stepOf("clear", changes, `${cells(changes.length)} emptied.`);
}

/** Ctrl+D: the first selected row goes into the rows below it; with one row selected, the row above comes down. */
export function fillDownStep(
  rows: readonly GridRow[],
  columns: readonly GridColumn[],
  selected: Rectangle,
): GridStep | null {
  const source = selected.top === selected.bottom ? selected.top - 1 : selected.top;
  if (source < 0) return null;
  const wanted = [...positions({ ...selected, top: source + 1 })].map((at) => ({
    ...at,
    text: rows[source]?.cells[columns[at.column]?.id ?? ""] ?? "",
  }));
  const changes = changesOf(rows, columns, wanted);
  return stepOf(
    "fill",
    changes,
    `${cells(changes.length)} filled down from ${rows[source]?.label ?? "above"}.`,
  );
}

export function copiedBlock(
  rows: readonly GridRow[],
  columns: readonly GridColumn[],
  selected: Rectangle,
): Block {
  return rows
    .slice(selected.top, selected.bottom + 1)
    .map((row) =>
      columns.slice(selected.left, selected.right + 1).map((column) => row.cells[column.id] ?? ""),
    );
}

/** A single copied cell fills the whole selection; a block goes down from the selection's first cell. */
export function pasteStep(
  rows: readonly GridRow[],
  columns: readonly GridColumn[],
  selected: Rectangle,
  block: Block,
  roomForNewRows: number,
): { step: GridStep; selected: { from: GridPosition; to: GridPosition } } | { refused: string } {
  const from = { row: selected.top, column: selected.left };
  const [single] = block[0] ?? [];
  if (block.length === 1 && block[0]?.length === 1 && single !== undefined) {
    const changes = changesOf(
      rows,
      columns,
      [...positions(selected)].map((at) => ({ ...at, text: single })),
    );
    const to = { row: selected.bottom, column: selected.right };
    return {
      step: { kind: "paste", changes, said: `${cells(changes.length)} pasted.` },
      selected: { from, to },
    };
  }
  const plan = planPaste(block, { columns, rowCount: rows.length, from, roomForNewRows });
  if (plan.status === "refused") return { refused: plan.message };
  const changes = changesOf(rows, columns, plan.cells);
  const workedOut = plan.cells.filter(
    ({ row, column, text }) => text !== "" && isReadOnly(rows[row], columns[column]),
  );
  const skippedComputed = plan.skippedComputedCells + workedOut.length;
  const said = [
    `${cells(changes.length)} pasted`,
    plan.newRows > 0 ? `${plan.newRows} new ${plan.newRows === 1 ? "run" : "runs"}` : "",
    plan.skippedHeadLines > 0
      ? `${plan.skippedHeadLines === 1 ? "a line" : `${plan.skippedHeadLines} lines`} of headings skipped`
      : "",
    plan.skippedHeadings.length > 0
      ? `${plan.skippedHeadings.map((heading) => `“${heading}”`).join(", ")} not among the columns and skipped`
      : "",
    skippedComputed > 0 ? `${cells(skippedComputed)} of computed columns skipped` : "",
  ].filter((part) => part !== "");
  const lastRow = Math.max(from.row, ...plan.cells.map(({ row }) => row));
  const lastColumn = Math.max(from.column, ...plan.cells.map(({ column }) => column));
  return {
    step: { kind: "paste", changes, said: `${said.join(", ")}.` },
    selected: { from, to: { row: lastRow, column: lastColumn } },
  };
}

function* positions(selected: Rectangle): Generator<GridPosition> {
  for (let row = selected.top; row <= selected.bottom; row += 1) {
    for (let column = selected.left; column <= selected.right; column += 1) yield { row, column };
  }
}

function changesOf(
  rows: readonly GridRow[],
  columns: readonly GridColumn[],
  wanted: readonly (GridPosition & { readonly text: string })[],
): GridChange[] {
  return wanted.flatMap(({ row, column, text }) => {
    const target = columns[column];
    const present = rows[row];
    if (!target || isReadOnly(present, target) || (present?.cells[target.id] ?? "") === text) return [];
    return [{ rowId: present?.id ?? null, newRow: row - rows.length, columnId: target.id, text }];
  });
}

function stepOf(kind: GridStep["kind"], changes: readonly GridChange[], said: string): GridStep | null {
  return changes.length === 0 ? null : { kind, changes, said };
}

function cells(count: number): string {
  return `${count} ${count === 1 ? "cell" : "cells"}`;
}
