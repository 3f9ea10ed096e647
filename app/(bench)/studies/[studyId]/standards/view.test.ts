import { describe, expect, it } from "vitest";
import type { StudyAnalysis } from "@/app/_worksheet/analysis";
import { recalibrated } from "@/app/_worksheet/standards/recalibrated";
import { readStandardLines } from "@/app/_worksheet/standards/standard-lines";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { standardsView } from "./view";

/** Invented: six standards on a line and two that bend away, three readings each, mmol/L. */
const LINES = `Blank 0 0.011 0.013 0.012
S1 5.0±0.1 0.100 0.109 0.108
S2 10.0±0.1 0.189 0.191 0.189
S3 20.0±0.1 0.371 0.367 0.372
S4 30.0±0.1 0.532 0.556 0.544
S5 40.0±0.1 0.736 0.730 0.729
S6 55.0±0.2 1.001 1.003 0.996
S7 75.0±0.3 1.306 1.313 1.315
S8 100.0±0.4 1.683 1.681 1.690`;

const NOBODY: StudyAnalysis = {
  hash: "",
  rule: null,
  runs: [],
  law: { status: "no-law", missing: "", fit: null },
  checks: [],
};

function sheetOf(change: Partial<Sheet> = {}): Sheet {
  let made = 0;
  const read = readStandardLines(LINES, "mmol/L", [], () => `s${++made}`);
  if (read.status === "faults") throw new Error(JSON.stringify(read.faults));
  const setAside = { reason: "bends away", memberId: "m", at: "2026-03-12T09:00:00.000Z" };
  const standards = read.standards.map((one) =>
    one.label === "S7" || one.label === "S8" ? { ...one, setAside } : one,
  );
  const sheet = exampleSheet({ standards, ...change });
  return { ...sheet, calibration: { ...sheet.calibration, stockRelative: 0.0035 } };
}

const view = (sheet: Sheet, reading = "") => standardsView(sheet, NOBODY, reading);

describe("the standards station", () => {
  it("says what the line gives, with the stock in its uncertainty", () => {
    const { slope, slopeUnit, lead, budget, limits } = view(sheetOf());
    // NumPy 2.4, polyfit over the 18 readings: 17.9355, u 0.0836; with 0.35 % of stock 0.1045.
    expect([slope, slopeUnit]).toEqual(["17.94 ± 0.10", "L mol^-1"]);
    expect(lead).toBe("Six standards in the line, three readings each. Two set aside.");
    expect(budget.map(({ source }) => source)).toEqual(["Fit of the line", "Standard stock, 0.35 %"]);
    expect(limits.find(({ name }) => name === "Scatter")?.text).toContain("16 degrees of freedom");
  });

  it("prints readings as typed and residuals of all but the blank, those set aside too", () => {
    const rows = view(sheetOf()).rows;
    expect(rows.map(({ state }) => state).join(" ")).toBe(
      "blank used used used used used used set-aside set-aside",
    );
    expect(rows[1]).toMatchObject({
      concentration: "5.00 ± 0.10",
      readings: ["0.100", "0.109", "0.108"],
      mean: "0.1057",
      residual: "0.0041",
    });
    expect(rows[0]).toMatchObject({ residual: "", remark: "Not in the line" });
    // NumPy 2.4, polyfit over the 18 readings: 1.684667 − 1.805438.
    expect(rows[8]).toMatchObject({ residual: "−0.1208", remark: "Set aside: bends away" });
  });

  it("draws every reading, and the line over all of them", () => {
    const { figure, residuals } = view(sheetOf());
    expect(figure?.points).toHaveLength(24);
    expect(figure?.points.filter(({ isUsed }) => isUsed)).toHaveLength(18);
    expect(figure?.range).toEqual({
      from: expect.closeTo(5, 9),
      to: expect.closeTo(55, 9),
      words: "in use, 5.00 to 55.0",
    });
    expect(figure?.line?.x.at(-1)).toBeCloseTo(100, 9);
    expect(residuals?.points.map(({ name }) => name).slice(0, 4)).toEqual(["S1", "S1", "S1", "S2"]);
  });

  it("reads a concentration back, and says why where it cannot", () => {
    // NumPy 2.4: 29.9469, u 0.2546 of readings and line, 0.2753 with the stock.
    expect(view(sheetOf(), "0.547 0.551").reading).toMatchObject({
      answer: "29.95 ± 0.28 mmol L^-1",
      detail: expect.stringMatching(/^Mean of 2 readings\. .*standard stock \(0\.10\)/),
    });
    expect(view(sheetOf(), "0.547 half").reading).toMatchObject({
      answer: "Not read",
      detail: expect.stringContaining("“half”"),
    });
    expect(view(sheetOf({ standards: [] }), "0.5").reading).toMatchObject({ answer: "No line" });
    expect(view(sheetOf(), " ").reading).toBeNull();
  });

  it("offers the line where a factor is typed, and says that it is followed", () => {
    const typed = sheetOf();
    expect(view(typed).follow).toMatchObject({
      status: "typed",
      sentence: expect.stringContaining("ε·l would be 17.94 ± 0.10 instead of"),
    });
    if (typed.signal?.kind !== "calibrated") throw new Error("it is calibrated");
    const followed = recalibrated({ ...typed, signal: { ...typed.signal, source: "standards" } });
    expect(view(followed).follow.status).toBe("follows");
    expect(view({ ...typed, signal: null }).follow.status).toBe("not-linear");
  });

  it("says which runs leave the straight part", () => {
    const runs = [
      exampleRun(0, { A: 0.002, B: 1 }),
      exampleRun(1, { A: 0.07, B: 1 }),
      exampleRun(2, { B: 1 }),
    ];
    expect(
      view(sheetOf({ runs })).runs.map(({ label, largest, severity }) => [label, largest, severity]),
    ).toEqual([
      ["R01", "2.00 mmol L^-1", "holds"],
      ["R02", "70.0 mmol L^-1", "weakens"],
      ["R03", expect.any(String), "weakens"],
    ]);
  });

  it("is empty without standards, and names what is missing where they make no line", () => {
    expect(view(sheetOf({ standards: [] }))).toMatchObject({
      title: "No standards yet",
      figure: null,
      problem: "",
    });
    const [, one] = sheetOf().standards;
    if (one === undefined) throw new Error("there is one");
    const lone = view(sheetOf({ standards: [one] }));
    expect(lone.title).toBe("The standards make no line with an uncertainty yet");
    expect(lone.problem).not.toBe("");
  });
});
