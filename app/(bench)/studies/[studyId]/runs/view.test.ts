import { describe, expect, it } from "vitest";
import { recipeLines, runMapView, shownTrace, traceFigureView } from "@/app/_findings/figures.view";
import { printConcentrations } from "@/app/_findings/print-concentrations";
import type { RunAnalysis, StudyAnalysis } from "@/app/_worksheet/analysis";
import { runMarks } from "@/app/_worksheet/run-marks";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { sparkView } from "./sparks.view";
import { runSheetView } from "./view";

const entered = { molarPerSecond: 1.2e-6, standardError: 2e-8 };
const trace = { sha256: "a".repeat(64), points: 3, uploadId: null, column: "R01" };

const sheet = exampleSheet({
  runs: [
    exampleRun(0, { A: 1e-3, B: 2e-3 }, { trace, timeZeroSeconds: 1 }),
    exampleRun(1, { A: 1e-3, B: 4e-3 }, { enteredRate: entered }),
    exampleRun(
      2,
      { A: 1e-3, B: 8e-3 },
      { enteredRate: entered, setAside: { reason: "bubble", memberId: "m", at: "2026-03-14T00:00:00Z" } },
    ),
    exampleRun(3, { A: 3e-3, B: 2e-3 }, { enteredRate: entered }),
    exampleRun(4, { A: 3e-3, B: 4e-3 }),
    exampleRun(5, { A: 9e-3, B: 2e-3 }, { enteredRate: entered, removedIn: 7 }),
  ],
});

function analysed(of: Sheet): StudyAnalysis {
  const marks = runMarks(of);
  const runs = of.runs
    .filter((run) => run.removedIn === null)
    .map(
      (run): RunAnalysis => ({
        runId: run.id,
        label: run.label,
        state: run.setAside ? "set-aside" : run.enteredRate ? "standing" : "without-rate",
        rate: run.enteredRate
          ? { kind: "entered", ...run.enteredRate }
          : { kind: "none", reason: "Too few points." },
        mark: marks.get(run.id) ?? { series: "base", level: 0, levels: 1, repeat: false },
      }),
    );
  return { hash: "", rule: null, runs, law: { status: "no-law", missing: "", fit: null }, checks: [] };
}

const traces = new Map([[trace.sha256, { timeSeconds: [1, 2, 3], signal: [0, 18, 36] }]]);

const INITIALS = new Map([["m", "AN"]]);

describe("runSheetView", () => {
  const view = runSheetView(sheet, analysed(sheet), INITIALS);

  it("titles the sheet with its finding", () => {
    expect(view.title).toBe("Five runs, two standing");
    expect(runSheetView(exampleSheet(), analysed(exampleSheet()), INITIALS).title).toBe("No runs yet");
  });

  it("groups runs by series and keeps planned ones apart", () => {
    expect(
      view.groups.map(({ name, detail, rows }) => [name, detail, rows.map(({ label }) => label)]),
    ).toEqual([
      ["Base recipe", ", centre of both series", ["R01"]],
      ["Species B varied", ", [A] held at 1.00 mmol L^-1. Solid marks", ["R02", "R03"]],
      ["Species A varied", ", [B] held at 2.00 mmol L^-1. Open marks", ["R04"]],
      ["Planned", ", no trace yet. Not part of the law", ["R05"]],
    ]);
  });

  it("says why a run is set aside or has no rate, and lists the bin", () => {
    const rows = view.groups.flatMap((group) => group.rows);
    expect(rows.find(({ label }) => label === "R03")?.remark).toBe("Set aside: bubble (AN, 14 March 2026)");
    expect(rows.find(({ label }) => label === "R01")?.remark).toBe("Too few points.");
    expect(rows.find(({ label }) => label === "R02")?.entered).toBe(
      "entered, (1.200 ± 0.020) × 10^-3 mmol L^-1 s^-1",
    );
    expect(view.bin).toEqual([{ runId: "run-5", label: "R06", note: "put there in revision 7" }]);
  });
});

describe("printConcentrations", () => {
  const species = sheet.species[0];
  if (species === undefined) throw new Error("a species");
  const runs = (...molar: number[]) =>
    molar.map((value, index) =>
      exampleRun(index, {}, { concentrations: { A: { molar: value, relativeUncertainty: 0 } } }),
    );

  it("gives a column common decimals and hides no typed digit", () => {
    expect(printConcentrations(species, runs(0.5e-3, 2e-3, 40e-3)).texts).toEqual(["0.5", "2.0", "40.0"]);
    expect(printConcentrations(species, runs(0.125e-3, 2e-3)).texts).toEqual(["0.125", "2.000"]);
  });

  it("leaves out what is not there", () => {
    expect(printConcentrations(species, [exampleRun(0, {})]).texts).toEqual([null]);
  });
});

describe("figures", () => {
  it("turns a signal into the followed species' concentration, from the time of mixing", () => {
    const [run] = sheet.runs;
    const stored = traces.get(trace.sha256);
    if (!run || !stored) throw new Error("a run with a trace");
    // 18 of absorbance at 18 000 L mol⁻¹ is 1 mmol L⁻¹.
    expect(shownTrace(sheet, run, stored)).toEqual({ x: [0, 1, 2], y: [0, 1, 2] });
    const figure = traceFigureView(sheet, analysed(sheet), traces);
    expect(figure.y).toEqual({ quantity: "[species P]", unit: "mmol L^-1" });
    expect(figure.traces.map(({ label }) => label)).toEqual(["R01"]);
  });

  it("draws the map over the two species that are varied first", () => {
    const map = runMapView(sheet, analysed(sheet));
    expect(map?.x.quantity).toBe("[B]");
    expect(map?.y.quantity).toBe("[A]");
    expect(map?.points).toHaveLength(5);
    expect(
      runMapView(exampleSheet({ species: sheet.species.slice(0, 1) }), analysed(exampleSheet())),
    ).toBeNull();
  });

  it("puts sparks on common axes and names the recipe", () => {
    const sparks = sparkView(sheet, runSheetView(sheet, analysed(sheet), INITIALS), traces);
    expect(sparks.domain).toEqual({ x: [0, 2], y: [0, 2] });
    expect(sparks.note).toBe("2 s, window marked");
    expect(recipeLines(sheet, traces)).toEqual([
      { name: "Medium", value: "water" },
      { name: "Interval", value: "1 s" },
    ]);
  });
});
