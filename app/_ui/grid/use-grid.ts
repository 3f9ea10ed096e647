"use client";

import {
  type ClipboardEvent,
  type KeyboardEvent,
  type MouseEvent,
  useCallback,
  useEffect,
  useRef,
  useState,
} from "react";
import { parseBlock, printBlock } from "./clipboard-block";
import { commandFor, type GridCommand, type KeyContext, moved } from "./grid-keys";
import {
  type GridColumn,
  type GridPosition,
  type GridRow,
  type GridStep,
  isReadOnly,
  rectangle,
} from "./grid-shape";
import { clearStep, copiedBlock, editStep, fillDownStep, pasteStep } from "./grid-steps";

export interface EditedCell {
  readonly text: string;
  readonly how: Exclude<KeyContext["editing"], "no">;
}

interface GridInput {
  readonly columns: readonly GridColumn[];
  readonly rows: readonly GridRow[];
  readonly editable: boolean;
  readonly roomForNewRows: number;
  readonly onStep: (step: GridStep) => void;
  readonly onUndo: () => void;
  readonly onRedo: () => void;
  readonly onSay: (sentence: string) => void;
}

/** Focus, selection and the edited cell; every finished act goes out as one step. */
export function useGrid(input: GridInput) {
  const { columns, rows, editable } = input;
  const [active, setActive] = useState<GridPosition>({ row: 0, column: 0 });
  const [anchor, setAnchor] = useState<GridPosition>({ row: 0, column: 0 });
  const [edited, drawEdited] = useState<EditedCell | null>(null);
  // Enter, a click elsewhere and losing focus all keep; whichever comes first finds the text, the others nothing.
  const open = useRef<EditedCell | null>(null);
  const table = useRef<HTMLTableElement>(null);
  const wantsFocus = useRef(false);
  // The cell that has focus. A new row is drawn anew once it was kept; what is typed next must still land in it.
  const focused = useRef<Element | null>(null);
  const tappedAgain = useRef(false);
  // Rows come and go from outside; a position past the end rests on the last row.
  const row = Math.min(active.row, Math.max(0, rows.length - 1));
  const at: GridPosition = { row, column: active.column };

  useEffect(() => {
    const lost = focused.current?.isConnected === false && document.activeElement === document.body;
    if ((wantsFocus.current || lost) && edited === null) {
      wantsFocus.current = false;
      table.current
        ?.querySelector<HTMLElement>(`[data-row="${row}"][data-column="${active.column}"]`)
        ?.focus({ preventScroll: false });
    }
    const now = document.activeElement;
    focused.current = table.current?.contains(now) ? now : null;
  });

  const goTo = useCallback((position: GridPosition, extend = false) => {
    wantsFocus.current = true;
    setActive(position);
    if (!extend) setAnchor(position);
  }, []);

  function setEdited(cell: EditedCell | null): void {
    open.current = cell;
    drawEdited(cell);
  }

  function keep(): void {
    const cell = open.current;
    if (cell === null) return;
    setEdited(null);
    const step = editStep(rows, columns, at, cell.text);
    if (step) input.onStep(step);
  }

  function begin(text: string, how: EditedCell["how"]): void {
    if (!editable || isReadOnly(rows[at.row], columns[at.column])) return;
    setAnchor(at);
    setEdited({ text, how });
  }

  /** True when the key was taken. */
  function run(command: GridCommand): boolean {
    switch (command.kind) {
      case "keep":
      case "move":
      case "row-end": {
        const target = moved(at, command, { rows: rows.length, columns: columns.length });
        keep();
        if (target === null) return false;
        goTo(target, command.kind !== "keep" && command.extend);
        return true;
      }
      case "abandon":
        setEdited(null);
        goTo(at);
        return true;
      case "select-all":
        setAnchor({ row: 0, column: 0 });
        goTo({ row: rows.length - 1, column: columns.length - 1 }, true);
        return true;
      case "edit":
        begin(textAt(rows, columns, at), "in-place");
        return true;
      case "replace":
        begin(command.text, "replacing");
        return true;
      default:
        return editable ? runChange(command) : true;
    }
  }

  function runChange(command: Extract<GridCommand, { kind: "clear" | "fill-down" | "undo" | "redo" }>): true {
    const selected = rectangle(anchor, at);
    if (command.kind === "undo") input.onUndo();
    else if (command.kind === "redo") input.onRedo();
    else {
      const step =
        command.kind === "clear" ? clearStep(rows, columns, selected) : fillDownStep(rows, columns, selected);
      if (step) input.onStep(step);
    }
    return true;
  }

  function onKeyDown(event: KeyboardEvent): void {
    const column = columns[at.column];
    const command = commandFor(event, {
      editing: edited?.how ?? "no",
      column: isReadOnly(rows[at.row], column) ? "computed" : (column?.kind ?? "text"),
    });
    if (command === null) return;
    if (run(command)) {
      event.preventDefault();
      event.stopPropagation();
    }
  }

  function onCopy(event: ClipboardEvent): void {
    if (edited !== null) return;
    event.preventDefault();
    event.clipboardData.setData("text/plain", printBlock(copiedBlock(rows, columns, rectangle(anchor, at))));
    if (event.type === "cut") runChange({ kind: "clear" });
  }

  function onPaste(event: ClipboardEvent): void {
    if (edited !== null || !editable) return;
    event.preventDefault();
    const block = parseBlock(event.clipboardData.getData("text/plain"));
    const planned = pasteStep(rows, columns, rectangle(anchor, at), block, input.roomForNewRows);
    if ("refused" in planned) {
      input.onSay(planned.refused);
      return;
    }
    setAnchor(planned.selected.from);
    setActive(planned.selected.to);
    wantsFocus.current = true;
    input.onStep(planned.step);
  }

  function onMouseDown(event: MouseEvent): void {
    const position = positionOf(event.target);
    if (position === null || event.target instanceof HTMLInputElement) return;
    event.preventDefault();
    tappedAgain.current = position.row === at.row && position.column === at.column;
    keep();
    goTo(position, event.shiftKey);
  }

  /** Without a keyboard: a second tap on the active cell opens it. */
  function onClick(event: MouseEvent): void {
    const touched = event.nativeEvent instanceof PointerEvent && event.nativeEvent.pointerType === "touch";
    if (touched && tappedAgain.current) onDoubleClick(event);
  }

  function onMouseOver(event: MouseEvent): void {
    const position = positionOf(event.target);
    if (position !== null && event.buttons === 1 && edited === null) goTo(position, true);
  }

  function onDoubleClick(event: MouseEvent): void {
    const position = positionOf(event.target);
    if (position === null || !editable || isReadOnly(rows[position.row], columns[position.column])) return;
    if (open.current === null) setEdited({ text: textAt(rows, columns, position), how: "in-place" });
  }

  return {
    table,
    active: at,
    selected: rectangle(anchor, at),
    edited,
    setEditedText: (text: string) => {
      if (open.current !== null) setEdited({ ...open.current, text });
    },
    keep,
    attributes: {
      role: "grid",
      "aria-multiselectable": true,
      ...(editable ? {} : { "aria-readonly": true }),
      onKeyDown,
      onCopy,
      onCut: editable ? onCopy : undefined,
      onPaste,
      onMouseDown,
      onMouseOver,
      onClick,
      onDoubleClick,
    },
  };
}

/** The cell under the pointer, told by the marks that every cell carries. */
function positionOf(target: EventTarget): GridPosition | null {
  const cell = target instanceof Element ? target.closest<HTMLElement>("td[data-row]") : null;
  if (cell === null) return null;
  return { row: Number(cell.dataset.row), column: Number(cell.dataset.column) };
}

export type GridState = ReturnType<typeof useGrid>;

export function textAt(rows: readonly GridRow[], columns: readonly GridColumn[], at: GridPosition): string {
  return rows[at.row]?.cells[columns[at.column]?.id ?? ""] ?? "";
}
