import { describe, expect, it } from "vitest";
import { parseBlock, printBlock } from "./clipboard-block";
import { commandFor, type GridCommand, type KeyContext, moved, type PressedKey } from "./grid-keys";
import type { GridColumn, GridRow } from "./grid-shape";
import { clearStep, pasteStep } from "./grid-steps";
import { planPaste } from "./plan-paste";

const columns: readonly GridColumn[] = [
  { id: "label", label: "Run", head: null, kind: "text" },
  { id: "a", label: "[A]₀", head: null, kind: "number" },
  { id: "sum", label: "Total", head: null, kind: "number", readOnly: true },
  { id: "b", label: "[B]₀", head: null, kind: "number" },
];

function press(key: string, held: Partial<PressedKey> = {}, context: Partial<KeyContext> = {}) {
  return commandFor(
    { key, ctrlKey: false, metaKey: false, shiftKey: false, altKey: false, ...held },
    { editing: "no", column: "number", ...context },
  );
}

describe("commandFor", () => {
  it.each<[string, Partial<PressedKey>, Partial<KeyContext>, GridCommand | null]>([
    ["ArrowDown", {}, {}, { kind: "move", rows: 1, columns: 0, toEdge: false, extend: false }],
    ["ArrowRight", { ctrlKey: true }, {}, { kind: "move", rows: 0, columns: 1, toEdge: true, extend: false }],
    ["ArrowUp", { shiftKey: true }, {}, { kind: "move", rows: -1, columns: 0, toEdge: false, extend: true }],
    ["ArrowLeft", {}, { editing: "in-place" }, null],
    [
      "ArrowLeft",
      {},
      { editing: "replacing" },
      { kind: "move", rows: 0, columns: -1, toEdge: false, extend: false },
    ],
    ["Home", {}, {}, { kind: "row-end", end: "first", extend: false }],
    ["End", { shiftKey: true }, {}, { kind: "row-end", end: "last", extend: true }],
    ["Enter", {}, {}, { kind: "keep", go: "down" }],
    ["Enter", { shiftKey: true }, { editing: "in-place" }, { kind: "keep", go: "up" }],
    ["Tab", {}, { editing: "replacing" }, { kind: "keep", go: "right" }],
    ["Tab", { shiftKey: true }, {}, { kind: "keep", go: "left" }],
    ["F2", {}, {}, { kind: "edit" }],
    ["Escape", {}, { editing: "in-place" }, { kind: "abandon" }],
    ["Escape", {}, {}, null],
    ["Delete", {}, {}, { kind: "clear" }],
    ["Delete", {}, { editing: "in-place" }, null],
    ["d", { ctrlKey: true }, {}, { kind: "fill-down" }],
    ["z", { ctrlKey: true }, {}, { kind: "undo" }],
    ["Z", { ctrlKey: true, shiftKey: true }, {}, { kind: "redo" }],
    ["z", { ctrlKey: true }, { editing: "in-place" }, null],
    ["c", { ctrlKey: true }, {}, null],
    ["v", { ctrlKey: true }, {}, null],
    ["5", {}, {}, { kind: "replace", text: "5" }],
    [",", {}, {}, { kind: "replace", text: "," }],
    ["−", {}, {}, { kind: "replace", text: "−" }],
    ["x", {}, {}, null],
    ["x", {}, { column: "text" }, { kind: "replace", text: "x" }],
    ["5", {}, { column: "computed" }, null],
    ["F5", {}, {}, null],
  ])("%s %o %o", (key, held, context, command) => {
    expect(press(key, held, context)).toEqual(command);
  });
});

describe("moved", () => {
  const size = { rows: 3, columns: 4 };

  it("stops at the edges and jumps to them", () => {
    expect(
      moved(
        { row: 0, column: 0 },
        { kind: "move", rows: -1, columns: 0, toEdge: false, extend: false },
        size,
      ),
    ).toEqual({ row: 0, column: 0 });
    expect(
      moved({ row: 0, column: 1 }, { kind: "move", rows: 1, columns: 0, toEdge: true, extend: false }, size),
    ).toEqual({ row: 2, column: 1 });
    expect(
      moved({ row: 2, column: 3 }, { kind: "move", rows: 0, columns: -1, toEdge: true, extend: false }, size),
    ).toEqual({ row: 2, column: 0 });
  });

  it("takes Tab to the next row and out of the grid past the last cell", () => {
    expect(moved({ row: 0, column: 3 }, { kind: "keep", go: "right" }, size)).toEqual({
      row: 1,
      column: 0,
    });
    expect(moved({ row: 2, column: 3 }, { kind: "keep", go: "right" }, size)).toBeNull();
    expect(moved({ row: 0, column: 0 }, { kind: "keep", go: "left" }, size)).toBeNull();
  });
});

describe("parseBlock", () => {
  it("reads what spreadsheets put on the clipboard", () => {
    expect(parseBlock("R01\t1,5\t2\r\nR02\t3\t\r\n")).toEqual([
      ["R01", "1,5", "2"],
      ["R02", "3", ""],
    ]);
    expect(parseBlock('"two\nlines"\t"say ""x"""')).toEqual([["two\nlines", 'say "x"']]);
    expect(parseBlock("R01;1,5\nR02;2,5")).toEqual([
      ["R01", "1,5"],
      ["R02", "2,5"],
    ]);
    expect(parseBlock("")).toEqual([]);
  });

  it("gives back what it printed", () => {
    const block = [
      ["a\tb", "1.5"],
      ['"', "line\nend"],
    ];
    expect(parseBlock(printBlock(block))).toEqual(block);
  });
});

describe("planPaste", () => {
  const target = { columns, rowCount: 2, from: { row: 1, column: 0 }, roomForNewRows: 10 };

  it("fills from the active cell, skips computed columns and adds rows", () => {
    expect(
      planPaste(
        [
          ["R02", "1,5", "9", "2"],
          ["R03", "2", "9", "3"],
        ],
        target,
      ),
    ).toEqual({
      status: "planned",
      cells: [
        { row: 1, column: 0, text: "R02" },
        { row: 1, column: 1, text: "1,5" },
        { row: 1, column: 3, text: "2" },
        { row: 2, column: 0, text: "R03" },
        { row: 2, column: 1, text: "2" },
        { row: 2, column: 3, text: "3" },
      ],
      newRows: 1,
      skippedHeadLines: 0,
      skippedComputedCells: 2,
      skippedHeadings: [],
    });
  });

  it("recognises and skips headers and a line of units", () => {
    const plan = planPaste(
      [
        ["Run", "[A]0", "Total", "[B]0"],
        ["", "mmol/L", "", "mmol/L"],
        ["R02", "1", "", "2"],
      ],
      target,
    );
    expect(plan).toMatchObject({ status: "planned", skippedHeadLines: 2, newRows: 0 });
  });

  it("pastes nothing under a heading that the column refuses", () => {
    const choosy = columns.map((column) =>
      column.id === "a"
        ? { ...column, headingFault: (heading: string) => (heading.includes("mol/L") ? "Says mol/L." : null) }
        : column,
    );
    const block = [
      ["Run", "[A]0 / mol/L"],
      ["R02", "1"],
    ];
    const plan = planPaste(block, { ...target, columns: choosy });
    expect(plan.status === "refused" && plan.message).toMatch(/^Says mol\/L\. Nothing was pasted;/);
    expect(planPaste(block, target).status).toBe("planned");
  });

  it("does not take a column of words for headers: bad cells land as typed", () => {
    expect(
      planPaste(
        [
          ["R02", "low"],
          ["R03", "high"],
        ],
        target,
      ),
    ).toMatchObject({ skippedHeadLines: 0, newRows: 1 });
  });

  it("refuses a block that is too wide, whole", () => {
    const plan = planPaste([["1", "2"]], { ...target, from: { row: 0, column: 3 } });
    expect(plan).toMatchObject({ status: "refused" });
    expect(plan.status === "refused" && plan.message).toContain(
      "2 columns wide and 1 column is left from [B]₀ on",
    );
  });

  it("refuses more rows than a study holds", () => {
    const rows = Array.from({ length: 12 }, (_, index) => [`R${index}`]);
    expect(planPaste(rows, target).status).toBe("refused");
  });

  it("goes by the names of a heading line, in whatever order, and says which it does not know", () => {
    const named = columns.map((column) => ({
      ...column,
      isNamed: (heading: string) => heading.toLowerCase() === column.id,
    }));
    const plan = planPaste(
      [
        ["B", "Temp", "Label", "Sum"],
        ["2,5", "25", "R07", "10"],
        ["3,5", "25", "R08", "10"],
      ],
      { columns: named, rowCount: 1, from: { row: 0, column: 3 }, roomForNewRows: 5 },
    );
    expect(plan).toEqual({
      status: "planned",
      cells: [
        { row: 0, column: 3, text: "2,5" },
        { row: 0, column: 0, text: "R07" },
        { row: 1, column: 3, text: "3,5" },
        { row: 1, column: 0, text: "R08" },
      ],
      newRows: 1,
      skippedHeadLines: 1,
      skippedComputedCells: 2,
      skippedHeadings: ["Temp"],
    });
  });
});

describe("cells that one row works out", () => {
  const rows: readonly GridRow[] = [
    { id: "1", label: "R01", cells: { a: "1", b: "2" }, readOnly: ["a"] },
    { id: "2", label: "R02", cells: { a: "3", b: "4" } },
  ];
  it("are neither emptied, filled nor pasted over, and pasting counts them", () => {
    const both = { top: 0, bottom: 1, left: 1, right: 1 };
    expect(clearStep(rows, columns, both)?.changes.map(({ rowId }) => rowId)).toEqual(["2"]);
    const pasted = pasteStep(
      rows,
      columns,
      { ...both, right: 3 },
      [
        ["7", "", "8"],
        ["9", "", "10"],
      ],
      0,
    );
    if ("refused" in pasted) throw new Error(pasted.refused);
    expect(pasted.step.changes.map(({ rowId, columnId }) => rowId + columnId)).toEqual(["1b", "2a", "2b"]);
    expect(pasted.step.said).toContain("1 cell of computed columns skipped");
  });
});
