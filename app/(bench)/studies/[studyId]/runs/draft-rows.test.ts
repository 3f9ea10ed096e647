import { describe, expect, it } from "vitest";
import type { GridChange } from "@/app/_ui/grid/grid-shape";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import {
  adoptRows,
  applyStep,
  type Draft,
  draftFaults,
  emptyDraft,
  type KeptRowTexts,
  keepableRows,
  restoreCells,
  rowOrder,
  withoutKept,
  withoutRows,
} from "./draft-rows";
import { runGridView } from "./run-grid.view";
import { readCells } from "./run-row";

const sheet = exampleSheet({
  runs: [exampleRun(0, { A: 1e-3, B: 2e-3 }), exampleRun(1, { A: 1e-3, B: 4e-3 })],
});
const { rows, shape } = runGridView(sheet, {
  hash: "",
  rule: null,
  runs: [],
  law: { status: "no-law", missing: "", fit: null },
  checks: [],
});
const view: KeptRowTexts = { rows, faultsOf: (cells) => readCells(cells, null, shape).faults };

function edit(rowId: string | null, columnId: string, text: string, newRow = -1): GridChange {
  return { rowId, newRow, columnId, text };
}

function step(draft: Draft, ...changes: GridChange[]) {
  return applyStep(draft, { kind: "edit", changes, said: "" }, view);
}

describe("the draft of the run grid", () => {
  it("keeps an edited row at once", () => {
    const { draft, touched } = step(emptyDraft, edit("run-0", "c:B", "2.5"));
    expect(keepableRows(draft, touched, view)).toEqual([
      { key: "run-0", runId: "run-0", cells: { "c:B": "2.5" } },
    ]);
  });

  it("keeps a bad cell as typed, names it, and holds its row back", () => {
    const { draft, touched } = step(emptyDraft, edit("run-0", "c:B", "two"), edit("run-1", "c:B", "5"));
    expect(draft.texts["run-0"]?.["c:B"]).toBe("two");
    expect(draftFaults(draft, view)["run-0"]?.["c:B"]).toContain("is not read");
    expect(keepableRows(draft, touched, view).map(({ key }) => key)).toEqual(["run-1"]);
  });

  it("gives a new row the next label and opens another blank row", () => {
    const { draft, touched } = step(emptyDraft, edit("new-0", "c:A", "3"));
    expect(draft.texts["new-0"]).toEqual({ "c:A": "3", label: "R03" });
    expect(draft.newKeys).toEqual(["new-0", "new-1"]);
    expect(keepableRows(draft, touched, view)).toEqual([
      { key: "new-0", runId: null, cells: { "c:A": "3", label: "R03" } },
    ]);
  });

  it("turns the rows of a pasted block into new runs", () => {
    // The blank row is the last one shown; a block of three pasted into it adds two rows below.
    const { draft, touched } = step(
      emptyDraft,
      edit("new-0", "label", "R07"),
      edit("new-0", "c:A", "1"),
      edit(null, "label", "R08", 0),
      edit(null, "c:A", "2", 0),
      edit(null, "c:A", "3", 1),
    );
    expect(keepableRows(draft, touched, view).map(({ cells }) => cells.label)).toEqual(["R07", "R08", "R09"]);
    expect(draft.newKeys).toHaveLength(4);
  });

  it("refuses a label that another run has", () => {
    const { draft, touched } = step(emptyDraft, edit("run-1", "label", "R01"));
    expect(draftFaults(draft, view)["run-1"]?.label).toContain("Another run is called R01");
    expect(keepableRows(draft, touched, view)).toEqual([]);
  });

  it("takes a step back to the texts before it", () => {
    const first = step(emptyDraft, edit("run-0", "c:B", "two"));
    const second = step(first.draft, edit("run-0", "c:B", "three"));
    const back = restoreCells(second.draft, second.before);
    expect(back.texts["run-0"]?.["c:B"]).toBe("two");
    expect(restoreCells(back, first.before).texts["run-0"]).toEqual({});
  });

  it("leaves a blank new row alone, and drops rows that were kept", () => {
    const { draft } = step(emptyDraft, edit("new-0", "c:A", "3"));
    const left = withoutRows(draft, ["new-0"]);
    expect(left.newKeys).toEqual(["new-1"]);
    expect(left.texts).toEqual({});
    expect(draftFaults(left, view)).toEqual({});
  });
});

describe("a new row that is kept while the next cell is typed", () => {
  const typed = step(emptyDraft, edit("new-0", "label", "R03"), edit("new-0", "c:A", "1")).draft;
  const further = step(typed, edit("new-0", "c:A", "1,5"), edit("new-0", "c:B", "10")).draft;

  it("loses the cells that were kept, and none that was typed since", () => {
    const kept = typed.texts["new-0"] ?? {};
    expect(withoutKept(further, "new-0", kept).texts["new-0"]).toEqual({ "c:A": "1,5", "c:B": "10" });
    expect(withoutKept(typed, "new-0", kept)).toEqual(withoutRows(typed, ["new-0"]));
  });

  it("goes on as an edit of the run that it became", () => {
    const adopted = adoptRows(further, { "new-0": "run-9" });
    expect(adopted.newKeys).toEqual(["new-1"]);
    expect(adopted.texts).toEqual({ "run-9": { label: "R03", "c:A": "1,5", "c:B": "10" } });
  });

  it("stays in its place, also behind an earlier row that is not read", () => {
    const two = step(typed, edit("new-1", "label", "R04")).draft;
    const ids = { "new-1": "run-9" };
    const [first] = view.rows;
    if (first === undefined) throw new Error("the view has rows");
    const later = { ...view, rows: [...view.rows, { ...first, runId: "run-9" }] };
    expect(rowOrder(adoptRows(two, ids), later, ids)).toEqual([
      { key: "run-0", runId: "run-0" },
      { key: "run-1", runId: "run-1" },
      { key: "new-0", runId: null },
      { key: "new-1", runId: "run-9" },
      { key: "new-2", runId: null },
    ]);
  });
});
