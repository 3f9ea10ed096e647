import { describe, expect, it } from "vitest";
import { previewOf } from "@/app/_import/preview";
import { readTable } from "@/app/_import/read-file";
import { textTable } from "@/app/_import/table-text";
import { EMPTY_STUDY } from "@/app/_import/testing-context";
import { recipeRow } from "./recipe-row";
import {
  headline,
  megabytes,
  prefilled,
  type ReadPreview,
  shortHash,
  storedFacts,
  traceFigure,
} from "./view";

function preview(text: string): ReadPreview {
  const made = previewOf(readTable(textTable(new TextEncoder().encode(text), {}), EMPTY_STUDY, {}));
  if (made.status !== "read") throw new Error(made.message);
  return made;
}

const CLEAN = "[A] / mmol/L;0.5;1.0\nt / s;R1;R2\n0;0.010;0.020\n1;0.015;0.031\n2;0.019;0.040\n";

describe("headline", () => {
  it("states what was read and what is open", () => {
    expect(headline(preview(CLEAN))).toBe("Two traces read, nothing to settle");
    expect(headline(preview("t / s;R1\n0;0.010\n1;0.0l5\n2;0.019\n"))).toBe(
      "One trace read, one question to settle",
    );
    expect(headline(preview("t / s;R1\n0;0.010\n1;NaN\n2;0.019\n3;0.02\n"))).toBe(
      "One trace read, one thing to know",
    );
  });
});

describe("what will be stored", () => {
  it("counts traces, points and time", () => {
    expect(storedFacts(preview(CLEAN).traces)).toEqual([
      { name: "Traces", text: "2, for R1 and R2" },
      { name: "Points", text: "3 each, 6 in all" },
      { name: "Time", text: "0 to 2 s" },
    ]);
  });

  it("draws the traces in the unit of the set-up", () => {
    const { traces } = preview(CLEAN);
    expect(traceFigure(traces, { kind: "concentration", unit: "mmol/L" }).traces[0]?.y).toEqual([10, 15, 19]);
    expect(traceFigure(traces, EMPTY_STUDY.signal).y).toEqual({ quantity: "absorbance", unit: "" });
  });

  it("prints sizes and hashes", () => {
    expect([171, 19_600, 30_000_000].map(megabytes)).toEqual(["171\u202fB", "19.6\u202fkB", "30.0\u202fMB"]);
    expect(shortHash(`${"9f3c71d0".padEnd(60, "0")}a86e`)).toBe("9f3c 71d0 … a86e");
  });
});

describe("starting concentrations", () => {
  const { traces } = preview(CLEAN);
  const trace = traces[0];
  if (!trace) throw new Error("a trace is read");
  const { species } = EMPTY_STUDY;

  it("shows what the file gives and keeps its very number while it is untouched", () => {
    const row = recipeRow(trace, species, {});
    expect(row.texts).toEqual({ a: "0.5", b: "" });
    expect(row.molar).toEqual({ a: trace.recipe.a?.molar });
    expect(prefilled(0.0005, { id: "a", symbol: "A", name: "", unit: "umol/L" })).toBe("500");
  });

  it("takes what is typed, decimal comma too, and keeps the text of what cannot be read", () => {
    const row = recipeRow(trace, species, { [trace.source]: { a: "0,75", b: "two" } });
    expect(row.molar).toEqual({ a: 0.00075 });
    expect(row.texts.b).toBe("two");
    expect(row.faults.b).toContain("“two” is not a number");
    expect(recipeRow(trace, species, { [trace.source]: { a: "-1" } }).faults.a).toContain("not negative");
  });

  it("leaves a concentration open when its box is emptied", () => {
    expect(recipeRow(trace, species, { [trace.source]: { a: "" } }).molar).toEqual({});
  });
});
