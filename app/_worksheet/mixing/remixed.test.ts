import { describe, expect, it } from "vitest";
import type { Sheet, SheetStock } from "@/db/sheet/sheet.schema";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { deliveryUncertainty } from "./mixing-input";
import { remixed, sharedThroughStocks } from "./remixed";

const stock = (id: string, change: Partial<SheetStock>): SheetStock => ({
  id,
  symbol: id,
  name: `stock ${id}`,
  position: 0,
  contents: {},
  dilution: null,
  lot: "",
  madeOn: "",
  howKnown: "",
  ...change,
});

/** A at 25 µmol/L and B at 0.2 mol/L, in equal volumes: both are halved (common practice). */
function halved(change: Partial<Sheet> = {}): Sheet {
  return exampleSheet({
    stocks: [
      stock("a", { contents: { A: { value: 25e-6, standardUncertainty: 0.25e-6 } } }),
      stock("b", { contents: { B: { value: 0.2, standardUncertainty: 0.001 } } }),
      stock("w", { symbol: "", name: "water" }),
    ],
    mixing: {
      volumeUnit: "mL",
      markMicrolitre: null,
      deliveries: [{ upToMicrolitre: null, absoluteMicrolitre: 0, relative: 0.004 }],
    },
    runs: [exampleRun(0, {}, { volumes: { a: 1000, b: 1000 } }), exampleRun(1, { A: 1e-5, B: 0.1 })],
    ...change,
  });
}

describe("concentrations from volumes", () => {
  it("are halved by equal volumes, with the uncertainty of the deliveries as the run's own", () => {
    const [run] = remixed(halved()).runs;
    expect(run?.concentrations.A?.molar).toBeCloseTo(12.5e-6, 18);
    expect(run?.concentrations.B?.molar).toBeCloseTo(0.1, 15);
    // c = C·V_A/(V_A + V_B): half of each delivery's 0.4 % moves it.
    expect(run?.concentrations.A?.relativeUncertainty).toBeCloseTo(0.004 / Math.SQRT2, 12);
  });

  it("leave typed runs alone and change nothing when applied again", () => {
    const once = remixed(halved());
    expect(once.runs[1]?.concentrations).toEqual(halved().runs[1]?.concentrations);
    expect(remixed(once)).toEqual(once);
  });

  it("follow a dilution, a mark and pure solvent", () => {
    const sheet = halved();
    const diluted = stock("d", {
      dilution: {
        fromStockId: "b",
        takenMicrolitre: { value: 1000, standardUncertainty: 4 },
        markMicrolitre: { value: 10_000, standardUncertainty: 10 },
      },
    });
    const [run] = remixed({
      ...sheet,
      stocks: [...sheet.stocks, diluted],
      runs: [exampleRun(0, {}, { volumes: { a: 500, d: 1000, w: 500 }, markMicrolitre: 2000 })],
    }).runs;
    expect(run?.concentrations.A?.molar).toBeCloseTo(6.25e-6, 18);
    expect(run?.concentrations.B?.molar).toBeCloseTo(0.01, 15);
  });

  it("stay as they were where the volumes are above the mark", () => {
    const over = exampleRun(0, { A: 2e-6, B: 0.02 }, { volumes: { a: 1500, b: 1000 }, markMicrolitre: 2000 });
    expect(remixed(halved({ runs: [over] })).runs[0]).toEqual(over);
  });

  it("share the errors of their stocks, named for the budget, with the runs that drew from them", () => {
    const shared = sharedThroughStocks(halved(), halved().runs);
    expect(shared.map(({ source, species, relative }) => ({ source, species, relative }))).toEqual([
      { source: "Stock a", species: ["A"], relative: expect.closeTo(0.01, 12) },
      { source: "Stock b", species: ["B"], relative: expect.closeTo(0.005, 12) },
    ]);
  });
});

describe("the uncertainty of a delivery", () => {
  const deliveries = [
    { upToMicrolitre: 50, absoluteMicrolitre: 0.08, relative: 0 },
    { upToMicrolitre: null, absoluteMicrolitre: 0, relative: 0.005 },
  ];
  it("is that of the first entry that reaches so far", () => {
    expect(deliveryUncertainty(15, { deliveries })).toBeCloseTo(0.08, 12);
    expect(deliveryUncertainty(300, { deliveries })).toBeCloseTo(1.5, 12);
    expect(deliveryUncertainty(300, { deliveries: [] })).toBe(0);
  });
});
