import { strToU8, zipSync } from "fflate";
import { describe, expect, it } from "vitest";
import writeXlsxFile from "write-excel-file/universal";
import { readFile } from "../read-file";
import type { FileReading, Issue, Reading } from "../reading";
import { EMPTY_STUDY } from "../testing-context";
import { testRows, testWorkbook } from "./testing-workbook";

const TABLE = [
  ["t / s", "R1", "R2"],
  [0, 0.01, 0.02],
  [1, 0.015, 0.031],
  [2.5, 0.019, 0.04],
  [4, 0.022, 0.048],
] as const;
const TIMES = [0, 1, 2.5, 4];

async function read(bytes: Uint8Array, corrections = {}): Promise<FileReading> {
  const reading = await readFile(bytes, EMPTY_STUDY, corrections);
  if (reading.status !== "read") throw new Error(`refused: ${reading.message}`);
  return reading;
}

function issue(reading: FileReading, code: string): Issue | undefined {
  return reading.issues.find((one) => one.code === code);
}

function signals(reading: FileReading) {
  return Object.fromEntries(reading.traces.map(({ label, signal }) => [label, [...signal]]));
}

describe("a workbook", () => {
  it("is read like the same table as text, row by row", async () => {
    const reading = await read(testWorkbook([{ name: "Kinetics", rows: testRows(TABLE) }]));
    expect(reading.container).toBe("workbook");
    expect(reading.sheet).toEqual({
      value: "Kinetics",
      names: ["Kinetics"],
      reason: "the only sheet",
      basis: "file",
    });
    expect(reading.headerLine.value).toBe(1);
    expect([...(reading.traces[0]?.timeSeconds ?? [])]).toEqual(TIMES);
    expect(signals(reading)).toEqual({
      R1: [0.01, 0.015, 0.019, 0.022],
      R2: [0.02, 0.031, 0.04, 0.048],
    });
    expect(reading.issues.filter(({ severity }) => severity === "blocks")).toEqual([]);
  });

  it("is read from a spreadsheet writer's own file", async () => {
    const cells = TABLE.map((row) => row.map((value) => ({ value })));
    const blob = await writeXlsxFile([{ data: cells, sheet: "Sheet A" }]).toBlob();
    const reading = await read(new Uint8Array(await blob.arrayBuffer()));
    expect(reading.sheet?.value).toBe("Sheet A");
    expect(signals(reading).R2).toEqual([0.02, 0.031, 0.04, 0.048]);
  });

  it("keeps every digit of a number as it was saved", async () => {
    const saved = ["4.5999999999999996", "1E-3", "0.30000000000000004"];
    const rows = testRows([
      ["t / s", "R1"],
      ...saved.map((literal, i) => [i, `<c r="B${i + 2}"><v>${literal}</v></c>`]),
    ]);
    const reading = await read(testWorkbook([{ name: "S", rows }]));
    expect(signals(reading)).toEqual({ R1: [4.6, 0.001, 0.30000000000000004] });
  });

  it("reads shared texts, and the values that formulas left", async () => {
    const rows = testRows([
      ['<c r="A1" t="s"><v>0</v></c>', '<c r="B1" t="s"><v>1</v></c>'],
      [0, '<c r="B2"><f>A2*2</f><v>0.25</v></c>'],
      [1, '<c r="B3"><f>A3*2</f><v>0.5</v></c>'],
    ]);
    const reading = await read(testWorkbook([{ name: "S", rows }], ["t / min", "R&amp;D 1"]));
    expect([...(reading.traces[0]?.timeSeconds ?? [])]).toEqual([0, 60]);
    expect([...(reading.traces[0]?.signal ?? [])]).toEqual([0.25, 0.5]);
    expect(issue(reading, "formulas")?.message).toBe(
      "B holds formulas; the values saved with the workbook are read.",
    );
  });

  it("stops at a formula without a value, naming the cell and the way out", async () => {
    const rows = testRows([
      ["t / s", "R1"],
      [0, 0.1],
      [1, '<c r="B3"><f>B2+1</f></c>'],
      [2, 0.3],
    ]);
    const found = issue(await read(testWorkbook([{ name: "S", rows }])), "formula-without-value");
    expect(found?.severity).toBe("blocks");
    expect(found?.message).toMatch(/^B3 holds a formula.*let it calculate, save it/);
  });

  it("names hidden columns and rows and offers to leave them out", async () => {
    const bytes = testWorkbook([
      {
        name: "S",
        head: '<cols><col min="3" max="16384" hidden="1"/></cols>',
        rows: testRows(TABLE).replace('<row r="4">', '<row r="4" hidden="1">'),
      },
    ]);
    const reading = await read(bytes);
    expect(issue(reading, "hidden-column")).toMatchObject({
      column: 2,
      repairs: [{ change: { kind: "column", column: 2, role: "left-out" } }],
    });
    expect(issue(reading, "hidden-rows")).toMatchObject({
      line: 4,
      repairs: [{ change: { kind: "leave-lines-out", lines: [4] } }],
    });
    const corrected = await read(bytes, { columns: { "2": "left-out" }, linesLeftOut: [4] });
    expect(signals(corrected)).toEqual({ R1: [0.01, 0.015, 0.022] });
  });

  it("takes the first visible sheet with a table and offers the others", async () => {
    const bytes = testWorkbook([
      { name: "Notes", rows: testRows([["read me"]]) },
      {
        name: "Old",
        state: "hidden",
        rows: testRows([
          ["t / s", "R9"],
          [0, 9],
          [1, 8],
        ]),
      },
      { name: "Runs &amp; more", rows: testRows(TABLE) },
    ]);
    const reading = await read(bytes);
    expect(reading.sheet).toMatchObject({
      value: "Runs & more",
      names: ["Notes", "Old", "Runs & more"],
      basis: "assumed",
    });
    expect(signals(await read(bytes, { sheet: "Old" }))).toEqual({ R9: [9, 8] });
  });
});

describe("a workbook that cannot be read", () => {
  const refusal = async (bytes: Uint8Array) => {
    const reading: Reading = await readFile(bytes, EMPTY_STUDY, {});
    return reading.status === "refused" ? reading.message : "not refused";
  };

  it("is refused when it inflates beyond a table's size, whatever it declares", async () => {
    const bomb = zipSync({ "xl/workbook.xml": new Uint8Array(200 * 1024 * 1024) }, { level: 9 });
    expect(bomb.length).toBeLessThan(1024 * 1024);
    const before = process.memoryUsage().rss;
    expect(await refusal(bomb)).toMatch(/unpacks to more than is read here/);
    expect(process.memoryUsage().rss - before).toBeLessThan(300 * 1024 * 1024);
    // The sizes that the archive states of itself, in its directory and before each part, made small.
    const lying = bomb.slice();
    const view = new DataView(lying.buffer);
    const directory = lying.length - 22 - (46 + "xl/workbook.xml".length);
    view.setUint32(22, 1000, true);
    view.setUint32(directory + 24, 1000, true);
    expect(await refusal(lying)).toMatch(/unpacks to more than is read here/);
  });

  it("is refused when it is cut off, is another archive, or holds no numbers", async () => {
    const whole = testWorkbook([{ name: "S", rows: testRows(TABLE) }]);
    expect(await refusal(whole.subarray(0, whole.length - 400))).toMatch(/damaged|ZIP archive/);
    expect(await refusal(zipSync({ "a.txt": strToU8("1,2") }))).toMatch(/ZIP archive/);
    expect(await refusal(testWorkbook([{ name: "Words", rows: testRows([["a", "b"]]) }]))).toMatch(
      /No sheet of the workbook holds a table of numbers; it has “Words”/,
    );
    const broken = zipSync({
      "xl/workbook.xml": strToU8('<workbook><sheets><sheet name="S" r:id="rId1"/></sheets>'),
    });
    expect(await refusal(broken)).toMatch(/damaged/);
  });
});
