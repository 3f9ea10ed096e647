import { expect, test } from "vitest";
import { printStandardLines, readStandardLines } from "./standard-lines";

function ids() {
  let count = 0;
  return () => `new-${++count}`;
}

test("lines of a notebook or a spreadsheet are read, and come back as they were written", () => {
  const read = readStandardLines(
    "Level\tc / µM\tA\nBlank\t0\t0,011\t0,013\nS1 5.0 ± 0.1 0.100 0.109 0.108\n10 0.189 0.191",
    "umol/L",
    [],
    ids(),
  );
  if (read.status !== "read") throw new Error(JSON.stringify(read.faults));
  expect(read.standards).toMatchObject([
    { label: "Blank", isBlank: true, concentration: { value: 0 }, signals: [0.011, 0.013] },
    {
      label: "S1",
      isBlank: false,
      concentration: { value: expect.closeTo(5e-6, 18), standardUncertainty: expect.closeTo(1e-7, 18) },
      signals: [0.1, 0.109, 0.108],
    },
    { label: "S2", concentration: { value: expect.closeTo(1e-5, 18) }, signals: [0.189, 0.191] },
  ]);
  const again = readStandardLines(
    printStandardLines([...read.standards], "umol/L"),
    "umol/L",
    read.standards,
    ids(),
  );
  expect(again).toEqual({ status: "read", standards: read.standards });
});

test("a known label keeps its id and whether it is set aside", () => {
  const setAside = { reason: "bends away", memberId: "m", at: "2026-03-12T09:00:00.000Z" };
  const first = readStandardLines("S7 75 1.306", "umol/L", [], ids());
  if (first.status !== "read") throw new Error("it reads");
  const known = first.standards.map((one) => ({ ...one, setAside }));
  const second = readStandardLines("S7 75 1.306 1.313", "umol/L", known, ids());
  expect(second).toMatchObject({ standards: [{ id: "new-1", setAside, signals: [1.306, 1.313] }] });
});

test("every line that is not read is named with what is wrong", () => {
  const read = readStandardLines("S1 5 0.1\nS2 -4 0.2\nS3 6 0.1x\nS1 7 0.2\nS4", "umol/L", [], ids());
  expect(read).toMatchObject({
    status: "faults",
    faults: [
      { line: 2, message: expect.stringContaining("S2 has no concentration of 0 or more") },
      { line: 3, message: "S3: reading 1, “0.1x”, is no number." },
      { line: 4, message: "S1 stands here twice. Write all its readings on one line." },
      { line: 5, message: expect.stringContaining("S4 has no concentration") },
    ],
  });
});

test("a standard is never taken for a heading", () => {
  const read = readStandardLines("Level\tc1\tA1\nStandard 1\t5\t0.1\nConc. 2\t6\t0.2", "umol/L", [], ids());
  expect(read).toMatchObject({ standards: [{ label: "Standard 1" }, { label: "Conc. 2" }] });
  expect(readStandardLines("Blank", "umol/L", [], ids())).toMatchObject({ faults: [{ line: 1 }] });
});
