import { describe, expect, test } from "vitest";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { runMarks, variedSpecies } from "./run-marks";

const design = exampleSheet({
  runs: [
    exampleRun(0, { A: 50e-6, B: 0.5e-3 }),
    exampleRun(1, { A: 50e-6, B: 1e-3 }),
    exampleRun(2, { A: 50e-6, B: 2e-3 }),
    exampleRun(3, { A: 50e-6, B: 4e-3 }),
    exampleRun(4, { A: 20e-6, B: 2e-3 }),
    exampleRun(5, { A: 100e-6, B: 2e-3 }),
    exampleRun(6, { A: 50.1e-6, B: 2e-3 }),
  ],
});

describe("run marks", () => {
  test("the recipe from which most runs differ in one species is the base", () => {
    expect(runMarks(design).get("run-2")).toEqual({ series: "base", level: 0, levels: 1, repeat: false });
  });

  test("the species varied first makes the first series, with the base's level among its levels", () => {
    const marks = runMarks(design);
    expect(marks.get("run-0")).toEqual({ series: "first", level: 0, levels: 4, repeat: false });
    expect(marks.get("run-3")).toEqual({ series: "first", level: 3, levels: 4, repeat: false });
    expect(marks.get("run-5")).toEqual({ series: "second", level: 2, levels: 3, repeat: false });
    expect(variedSpecies(design)).toEqual(["B", "A"]);
  });

  test("a recipe that differs by pipetting scatter alone is a repeat with the same mark", () => {
    expect(runMarks(design).get("run-6")).toEqual({ series: "base", level: 0, levels: 1, repeat: true });
  });

  test("setting a run aside moves no mark, putting it into the bin takes it off the sheet", () => {
    const aside = { reason: "bubble", memberId: "m", at: "2026-01-05T10:00:00Z" };
    const without = (change: object) =>
      exampleSheet({ runs: design.runs.map((run) => (run.id === "run-0" ? { ...run, ...change } : run)) });
    expect(runMarks(without({ setAside: aside }))).toEqual(runMarks(design));
    expect(runMarks(without({ removedIn: 3 })).has("run-0")).toBe(false);
    expect(runMarks(without({ removedIn: 3 })).get("run-3")).toMatchObject({ level: 2, levels: 3 });
  });

  test("an empty sheet has no marks", () => {
    expect(runMarks(exampleSheet()).size).toBe(0);
  });
});
