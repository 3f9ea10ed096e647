import { describe, expect, it } from "vitest";
import { remixed } from "@/app/_worksheet/mixing/remixed";
import { exampleRun } from "@/tests/example-sheet";
import { exampleStock, mixedSheet } from "../_mixing/testing-mixtures";
import { withoutStock, withStock } from "./change-stocks";
import { dispensingFormOf, inVolumeUnit, readDispensingForm } from "./dispensing-form";
import { EMPTY_STOCK, readStockForm, stockFormOf } from "./stock-form";

const dilution = exampleStock("d", 3, {
  dilution: {
    fromStockId: "b",
    takenMicrolitre: { value: 1000, standardUncertainty: 4 },
    markMicrolitre: { value: 10_000, standardUncertainty: 10 },
  },
});

describe("the boxes of a stock", () => {
  const sheet = mixedSheet();

  it.each([...sheet.stocks, dilution])("read back as they were filled: $name", (stock) => {
    const { id: _id, position: _position, ...rest } = stock;
    for (const unit of ["uL", "mL"] as const) {
      const mixing = { ...sheet.mixing, volumeUnit: unit };
      expect(readStockForm(stockFormOf(stock, unit), { ...sheet, mixing })).toEqual({
        status: "read",
        stock: rest,
      });
    }
  });

  it("say box by box what is wrong", () => {
    const reading = readStockForm({ ...EMPTY_STOCK, contents: { A: "10 ± 20", B: "ten" } }, sheet);
    if (reading.status === "read") throw new Error("not read");
    expect(reading.faults.name).toContain("needs a name");
    expect(reading.faults["contents.A"]).toContain("larger than the value");
    expect(reading.faults["contents.B"]).toContain("is not read");
    const diluted = readStockForm({ ...EMPTY_STOCK, name: "D", fromStockId: "b", taken: "0" }, sheet);
    if (diluted.status === "read") throw new Error("not read");
    expect(diluted.faults).toMatchObject({
      taken: "A volume is above 0.",
      mark: expect.stringContaining("missing"),
    });
  });
});

describe("mark and deliveries", () => {
  it("read back as they were, and turn with the unit", () => {
    const { mixing } = mixedSheet();
    const form = dispensingFormOf(mixing);
    expect(form).toEqual({ unit: "uL", mark: "3000", upTo: "50", absolute: "0.08", percent: "0.5" });
    expect(readDispensingForm(form)).toEqual({ status: "read", mixing });
    const turned = readDispensingForm(inVolumeUnit(form, "mL"));
    expect(turned).toEqual({ status: "read", mixing: { ...mixing, volumeUnit: "mL" } });
  });

  it("refuse an uncertainty without its range and a mark of nothing", () => {
    const reading = readDispensingForm({ unit: "uL", mark: "0", upTo: "", absolute: "1", percent: "101" });
    if (reading.status === "read") throw new Error("not read");
    expect(Object.keys(reading.faults).sort()).toEqual(["mark", "percent", "upTo"]);
  });
});

describe("stocks of a sheet", () => {
  it("are added at the end, and a changed one keeps its place and moves its runs", () => {
    const sheet = remixed(mixedSheet());
    const { id: _id, position: _position, ...made } = exampleStock("x", 0, {});
    const added = withStock(sheet, "x", made);
    if ("refused" in added) throw new Error(added.refused);
    expect(added.stocks.at(-1)).toMatchObject({ id: "x", position: 3 });
    const weaker = { ...made, contents: { A: { value: 0.005, standardUncertainty: 0 } } };
    const changed = withStock(sheet, "a", weaker);
    if ("refused" in changed) throw new Error(changed.refused);
    expect(changed.stocks[0]).toMatchObject({ id: "a", position: 0 });
    expect(remixed(changed).runs[0]?.concentrations.A?.molar).toBeCloseTo(2.5e-5, 15);
    // Above its mark: what it held last stays.
    expect(remixed(changed).runs[1]?.concentrations.A?.molar).toBe(2e-5);
  });

  it("leave only where nothing draws from them", () => {
    const sheet = mixedSheet();
    const kept = withoutStock(sheet, "a");
    expect("refused" in kept && kept.refused).toBe(
      "R01 and R02 take a volume of stock A. Empty those volumes first, or keep the stock.",
    );
    const zero = exampleRun(0, {}, { volumes: { a: 15, b: 0 } });
    const source = withoutStock({ ...sheet, runs: [zero], stocks: [...sheet.stocks, dilution] }, "b");
    expect("refused" in source && source.refused).toContain("D is diluted from stock B.");
    const left = withoutStock({ ...sheet, runs: [zero] }, "b");
    if ("refused" in left) throw new Error(left.refused);
    expect(left.stocks.map(({ id }) => id)).toEqual(["a", "w"]);
    expect(left.runs[0]?.volumes).toEqual({ a: 15 });
  });
});
