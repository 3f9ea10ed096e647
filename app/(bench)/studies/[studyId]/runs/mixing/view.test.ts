import { describe, expect, it } from "vitest";
import { exampleStock, mixedSheet, NO_ANALYSIS } from "../_mixing/testing-mixtures";
import { headingName, mixingGridView, volumeHeadingFault } from "./mixing-grid.view";
import { mixingView } from "./view";

describe("the mixing table", () => {
  const sheet = mixedSheet();
  const grid = mixingGridView(sheet, NO_ANALYSIS);

  it("has a column a stock, what follows from them, and the mark where a run has its own", () => {
    expect(grid.columns.map(({ id }) => id)).toEqual([
      "label",
      "v:a",
      "v:b",
      "v:w",
      "total",
      "c:A",
      "c:B",
      "strength",
      "remark",
    ]);
    const [first, ...rest] = sheet.runs;
    if (first === undefined) throw new Error("a run");
    const own = { ...sheet, runs: [{ ...first, markMicrolitre: 3300 }, ...rest] };
    expect(mixingGridView(own, NO_ANALYSIS).columns.map(({ id }) => id)).toContain("mark");
  });

  it("knows its columns by symbol, name and head, whatever unit stands beside", () => {
    const named = (heading: string) =>
      grid.columns.find(({ names }) => names.includes(headingName(heading)))?.id ?? null;
    expect(
      ["A", "stock b", "Water (µL)", "V of A / mL", "solution of a", "[A]0", "Run", "pH"].map(named),
    ).toEqual(["v:a", "v:b", "v:w", "v:a", "v:a", "c:A", "label", null]);
    expect(volumeHeadingFault("Water (mL)", "uL")).toContain("says mL and the table is in µL");
    expect(volumeHeadingFault("μl", "uL")).toBeNull();
    expect(volumeHeadingFault("Water", "uL")).toBeNull();
  });

  it("titles the page with what adds up and names what does not", () => {
    const view = mixingView(sheet, NO_ANALYSIS, grid);
    expect(view.title).toBe("One mixture adds up, R02 does not");
    expect(view.notes[0]).toEqual({
      severity: "blocks",
      message: "R02 does not add up to its mark. It cannot be mixed or printed until it does.",
    });
    expect(view.notes.at(-1)?.message).toContain("Stock A in R02 is 6 µL, where the delivery adds 1.3 %");
    expect(view.sharedNote).toContain("Stocks A and B serve every mixture");
    expect(view.volumes).toEqual([
      { name: "Mark", value: "3000 µL, made up with water" },
      { name: "To 50 µL", value: "± 0.08 µL" },
      { name: "Above", value: "± 0.50 %" },
    ]);
  });

  it("lists stocks with what they hold, ions of one salt on one line, and a dilution by its recipe", () => {
    const diluted = exampleStock("d", 3, {
      dilution: {
        fromStockId: "b",
        takenMicrolitre: { value: 1000, standardUncertainty: 0 },
        markMicrolitre: { value: 10_000, standardUncertainty: 0 },
      },
    });
    const lone = exampleStock("e", 4, { contents: { A: { value: 0.02, standardUncertainty: 0 } } });
    const full = { ...sheet, stocks: [...sheet.stocks, diluted, lone] };
    const view = mixingView(full, NO_ANALYSIS, mixingGridView(full, NO_ANALYSIS));
    expect(view.stocks.map(({ concentrations, relative }) => [concentrations.join("; "), relative])).toEqual([
      ["10.000 ± 0.050 mmol L^-1", "0.50"],
      ["20.00 ± 0.12 mmol L^-1", "0.60"],
      ["", ""],
      ["2.000 ± 0.012 mmol L^-1", "0.60"],
      ["20 mmol L^-1", ""],
    ]);
    expect(view.stocks[3]?.howKnown).toBe("1000 µL of B to 10000 µL");
    expect(view.notes.map(({ message }) => message)).toContainEqual(
      expect.stringContaining("The charges in stock E do not balance"),
    );
  });
});
