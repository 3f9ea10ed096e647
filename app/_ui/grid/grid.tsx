"use client";

import { Fragment, memo, type ReactNode, useEffect, useId, useRef } from "react";
import { Button } from "../button";
import { SeverityMark } from "../check";
import { type GridBand, type GridColumn, type GridRow, type GridStep, isReadOnly } from "./grid-shape";
import { type EditedCell, type GridState, textAt, useGrid } from "./use-grid";

/**
 * A table that is filled like a spreadsheet: one tab stop, arrows, typing over, block paste. Texts are kept outside;
 * `onStep` gets one finished act at a time. A cell that is wrong keeps its text, and the row below says what is wrong.
 */
export function Grid({
  label,
  columns,
  bands,
  rows,
  editable,
  roomForNewRows = 0,
  onStep,
  onUndo,
  onRedo,
  onSay,
  speak,
  status,
}: {
  label: string;
  columns: readonly GridColumn[];
  /** Headings over several columns; together as many columns as there are. */
  bands?: readonly GridBand[];
  rows: readonly GridRow[];
  editable: boolean;
  roomForNewRows?: number;
  onStep: (step: GridStep) => void;
  onUndo: () => void;
  onRedo: () => void;
  /** A refused paste, to be shown in `status`. */
  onSay: (sentence: string) => void;
  /** What the text being typed amounts to, for the line under the grid. */
  speak?: (rowId: string, columnId: string, text: string) => string;
  /** The line under the grid while nothing is being typed. */
  status?: ReactNode;
}) {
  const grid = useGrid({ columns, rows, editable, roomForNewRows, onStep, onUndo, onRedo, onSay });
  const made = useId();
  const activeRow = rows[grid.active.row];
  const activeColumn = columns[grid.active.column];
  return (
    <div className="min-w-0">
      <div className="grid-frame">
        <table
          ref={grid.table}
          className="edit-grid"
          aria-label={label}
          aria-rowcount={rows.length + 1}
          aria-colcount={columns.length}
          {...grid.attributes}
        >
          <thead>
            {bands !== undefined && (
              <tr className="band-row">
                {bands.map(({ id, head, columns: width, computed }) =>
                  head === null ? (
                    <td key={id} colSpan={width} />
                  ) : (
                    <th
                      key={id}
                      scope="colgroup"
                      colSpan={width}
                      className={computed ? "computed" : undefined}
                    >
                      {head}
                    </th>
                  ),
                )}
              </tr>
            )}
            <tr>
              {columns.map((column) => (
                <th
                  key={column.id}
                  scope="col"
                  className={headClass(column)}
                  style={column.width === undefined ? undefined : { minWidth: column.width }}
                >
                  {column.head}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row, index) => (
              <Fragment key={row.id}>
                {row.group !== undefined && (
                  <tr className="group-row">
                    <td colSpan={columns.length}>{row.group}</td>
                  </tr>
                )}
                <Row
                  row={row}
                  index={index}
                  columns={columns}
                  problemId={`${made}-${row.id}`}
                  activeColumn={grid.active.row === index ? grid.active.column : null}
                  selected={
                    index >= grid.selected.top && index <= grid.selected.bottom
                      ? `${grid.selected.left}-${grid.selected.right}`
                      : null
                  }
                  edited={grid.active.row === index ? grid.edited : null}
                  grid={grid}
                />
                {row.problem !== undefined && (
                  <tr className="problem-row">
                    <td colSpan={columns.length} id={`${made}-${row.id}`}>
                      <SeverityMark severity="blocks">{row.problem.title}</SeverityMark>{" "}
                      {row.problem.detail !== undefined && <span className="ml-2">{row.problem.detail}</span>}
                      {row.problem.repairs.length > 0 && (
                        <div className="mt-1.5 flex flex-wrap gap-2">
                          {row.problem.repairs.map((repair) => (
                            <Button key={repair.label} size="small" onClick={repair.act}>
                              {repair.label}
                            </Button>
                          ))}
                        </div>
                      )}
                    </td>
                  </tr>
                )}
              </Fragment>
            ))}
          </tbody>
        </table>
      </div>
      <div className="grid-status" role="status" aria-live="polite">
        {grid.edited !== null && activeRow && activeColumn ? (
          <p>
            <b>
              {activeRow.label}, {activeColumn.label}.
            </b>{" "}
            {speak?.(activeRow.id, activeColumn.id, grid.edited.text)} <kbd>Enter</kbd> keeps it,{" "}
            <kbd>Esc</kbd> returns to {textAt(rows, columns, grid.active) || "an empty cell"}.
          </p>
        ) : (
          status
        )}
      </div>
    </div>
  );
}

function headClass(column: GridColumn): string {
  return [column.kind === "number" ? "num" : "", column.readOnly ? "computed" : ""].filter(Boolean).join(" ");
}

interface RowProps {
  row: GridRow;
  index: number;
  columns: readonly GridColumn[];
  problemId: string;
  activeColumn: number | null;
  /** "left-right" of the selection in this row: a string, so that untouched rows compare equal. */
  selected: string | null;
  edited: EditedCell | null;
  grid: GridState;
}

/** Drawn again only when this row changed: hundreds of rows stay quick to walk through. */
const Row = memo(DrawnRow, (before, after) => {
  const still =
    before.activeColumn === null && after.activeColumn === null && before.selected === after.selected;
  return (
    still && before.row === after.row && before.index === after.index && before.columns === after.columns
  );
});

function DrawnRow({ row, index, columns, problemId, activeColumn, selected, edited, grid }: RowProps) {
  const [left, right] = (selected ?? "").split("-").map(Number);
  const inSelection = (column: number) =>
    left !== undefined && right !== undefined && selected !== null && column >= left && column <= right;
  return (
    <tr aria-rowindex={index + 2} className={rowClass(row)}>
      {columns.map((column, position) => {
        const text = row.cells[column.id] ?? "";
        const fault = row.faults?.[column.id];
        const isActive = activeColumn === position;
        const isEdited = isActive && edited !== null;
        const isSelected = inSelection(position);
        return (
          <td
            key={column.id}
            {...GRID_CELL}
            data-row={index}
            data-column={position}
            tabIndex={
              (activeColumn ?? (index === 0 && grid.active.row === 0 ? 0 : null)) === position ? 0 : -1
            }
            aria-colindex={position + 1}
            {...(isSelected ? SELECTED : NOT_SELECTED)}
            {...(isReadOnly(row, column) ? READ_ONLY : {})}
            aria-invalid={fault === undefined ? undefined : true}
            aria-describedby={fault === undefined || row.problem === undefined ? undefined : problemId}
            className={cellClass(column, {
              fault: fault !== undefined,
              isComputed: isReadOnly(row, column),
              isEdited,
              isSelected,
              isActive,
            })}
          >
            {isEdited ? (
              <CellInput
                column={column}
                cell={edited}
                label={`${column.label} of ${row.label}`}
                grid={grid}
              />
            ) : (
              (row.drawn?.[column.id] ?? text)
            )}
          </td>
        );
      })}
    </tr>
  );
}

// Table elements may take the roles of a grid (ARIA in HTML); the linter knows a narrower rule.
const GRID_CELL = { role: "gridcell" } as const;
const READ_ONLY = { "aria-readonly": true } as const;
const SELECTED = { "aria-selected": true } as const;
const NOT_SELECTED = { "aria-selected": false } as const;

function rowClass(row: GridRow): string {
  return [row.tone ?? "", row.problem === undefined ? "" : "has-problem"].filter(Boolean).join(" ");
}

function cellClass(
  column: GridColumn,
  state: { fault: boolean; isComputed: boolean; isEdited: boolean; isSelected: boolean; isActive: boolean },
): string {
  return [
    column.kind === "number" ? "num" : "",
    state.isComputed ? "computed" : "",
    state.fault ? "fault" : "",
    state.isEdited ? "edited" : "",
    state.isSelected && !state.isActive ? "selected" : "",
  ]
    .filter(Boolean)
    .join(" ");
}

function CellInput({
  column,
  cell,
  label,
  grid,
}: {
  column: GridColumn;
  cell: EditedCell;
  label: string;
  grid: GridState;
}) {
  const input = useRef<HTMLInputElement>(null);
  useEffect(() => {
    // Opened by a key or a double click: the caret belongs behind the text.
    input.current?.focus();
    input.current?.setSelectionRange(input.current.value.length, input.current.value.length);
  }, []);
  return (
    <input
      ref={input}
      aria-label={label}
      autoComplete="off"
      inputMode={column.kind === "number" ? "decimal" : "text"}
      value={cell.text}
      onChange={(event) => grid.setEditedText(event.target.value)}
      onBlur={grid.keep}
    />
  );
}
