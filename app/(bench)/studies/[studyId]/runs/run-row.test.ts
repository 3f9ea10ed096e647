import { describe, expect, it } from "vitest";
import { exampleRun } from "@/tests/example-sheet";
import { cellsOf, newRunOf, nextLabel, type RowShape, readCells } from "./run-row";

const shape: RowShape = {
  species: [
    { id: "A", symbol: "A", unit: "umol/L" },
    { id: "B", symbol: "B", unit: "mmol/L" },
  ],
  rateFactor: 1e6,
  stocked: ["A"],
};

describe("a run with volumes", () => {
  const mixed = exampleRun(0, { A: 5e-5, B: 2e-3 }, { volumes: { s: 100 } });
  it("keeps what follows from them; what no stock holds is typed", () => {
    const reading = readCells({ "c:A": "60", "c:B": "3" }, mixed, shape);
    expect(reading.faults).toEqual({
      "c:A": "[A]₀ of R01 follows from its volumes. Change them on the mixing table.",
    });
    expect(reading.edit.concentrations?.A?.molar).toBe(5e-5);
    expect(reading.edit.concentrations?.B?.molar).toBeCloseTo(3e-3, 15);
  });
});

describe("a run as a row of texts", () => {
  const run = exampleRun(
    0,
    { A: 50e-6, B: 2e-3 },
    { temperatureKelvin: 298.15, enteredRate: { molarPerSecond: 1.18e-6, standardError: 0.02e-6 } },
  );

  it("prints each value in its column's unit with its uncertainty", () => {
    expect(cellsOf(run, shape)).toMatchObject({
      label: "R01",
      "c:A": "50.0 ± 0.5",
      "c:B": "2.00 ± 0.02",
      temperature: "25.0",
      rate: "1.18 ± 0.02",
    });
  });

  it("reads back what it printed as the same run", () => {
    const { faults, edit } = readCells(cellsOf(run, shape), run, shape);
    expect(faults).toEqual({});
    expect(edit.temperatureKelvin).toBe(298.15);
    expect(edit.concentrations?.A?.molar).toBeCloseTo(50e-6, 15);
    expect(edit.concentrations?.B?.relativeUncertainty).toBeCloseTo(0.01, 12);
    expect(edit.enteredRate?.molarPerSecond).toBeCloseTo(1.18e-6, 15);
  });

  it("changes only the cells that were given", () => {
    const { edit } = readCells({ "c:B": "3,5" }, run, shape);
    expect(edit).toEqual({
      concentrations: { ...run.concentrations, B: { molar: 0.0035, relativeUncertainty: 0 } },
    });
  });

  it("takes an emptied cell for no value, never zero", () => {
    const { edit } = readCells({ "c:A": "", temperature: "", rate: "" }, run, shape);
    expect(edit.concentrations).toEqual({ B: run.concentrations.B });
    expect(edit.temperatureKelvin).toBeNull();
    expect(edit.enteredRate).toBeNull();
  });

  it.each([
    ["label", " ", "needs a label"],
    ["c:A", "fifty", "is not read"],
    ["c:A", "-5", "not negative"],
    ["c:A", "5 ± 6", "larger than the concentration"],
    ["c:gone", "5", "not part of the sheet"],
    ["temperature", "warm", "is not a number"],
    ["temperature", "-400", "absolute zero"],
    ["rate", "1.2.3", "is not read"],
    ["remark", "x".repeat(301), "At most 300"],
  ])("names %s when it holds %s", (column, text, message) => {
    expect(readCells({ [column]: text }, run, shape).faults[column]).toContain(message);
  });

  it("keeps a zero or negative entered rate as it was typed: the law says what is wrong with it", () => {
    expect(readCells({ rate: "-0.5" }, run, shape).edit.enteredRate).toEqual({
      molarPerSecond: -5e-7,
      standardError: null,
    });
  });

  it("wants a label of a new run", () => {
    const { faults } = newRunOf({ key: "new-0", runId: null, cells: { "c:A": "5" } }, "id", shape);
    expect(Object.keys(faults)).toEqual(["label"]);
  });
});

describe("nextLabel", () => {
  it.each([
    [[], "R01"],
    [["R01", "R11"], "R12"],
    [["A_9", "A_10"], "A_11"],
    [["run", "R99"], "R100"],
  ])("after %j comes %s", (labels, next) => {
    expect(nextLabel(labels)).toBe(next);
  });
});
