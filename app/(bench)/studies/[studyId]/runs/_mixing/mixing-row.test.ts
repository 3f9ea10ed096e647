import { describe, expect, it } from "vitest";
import { exampleRun } from "@/tests/example-sheet";
import { type MixingShape, mixingCells, newMixture, readMixingCells } from "./mixing-row";

const shape: MixingShape = {
  stocks: [
    { id: "a", head: "Stock A" },
    { id: "w", head: "water" },
  ],
  unit: "mL",
};

describe("a run as a row of volumes", () => {
  const run = exampleRun(0, {}, { volumes: { a: 15, w: 2985 }, markMicrolitre: 3000, remark: "base" });

  it("stands in the unit of the table and reads back as it was", () => {
    const cells = mixingCells(run, shape);
    expect(cells).toEqual({ label: "R01", "v:a": "0.015", "v:w": "2.985", mark: "3", remark: "base" });
    const { faults, edit } = readMixingCells(cells, null, shape);
    expect(faults).toEqual({});
    expect(edit).toEqual({ label: "R01", volumes: { a: 15, w: 2985 }, markMicrolitre: 3000, remark: "base" });
  });

  it("changes only what was touched; an emptied volume leaves the run", () => {
    expect(readMixingCells({ "v:a": "0,030" }, run, shape).edit.volumes).toEqual({ a: 30, w: 2985 });
    expect(readMixingCells({ "v:a": "" }, run, shape).edit.volumes).toEqual({ w: 2985 });
    expect(readMixingCells({ remark: "again" }, run, shape).edit).toEqual({ remark: "again" });
  });

  it("says what it cannot read, cell by cell", () => {
    const { faults } = readMixingCells({ "v:a": "−1", "v:w": "much", "v:gone": "1", mark: "0" }, run, shape);
    expect(faults["v:a"]).toBe("A volume is not negative.");
    expect(faults["v:w"]).toContain("is not a number");
    expect(faults["v:gone"]).toContain("not on the list any more");
    expect(faults.mark).toContain("above 0");
  });

  it("becomes a planned run", () => {
    const made = newMixture({ key: "new-0", runId: null, cells: { label: "R02", "v:a": "1" } }, "id", shape);
    expect(made.faults).toEqual({});
    expect(made.run).toMatchObject({ id: "id", label: "R02", volumes: { a: 1000 }, concentrations: {} });
  });
});
