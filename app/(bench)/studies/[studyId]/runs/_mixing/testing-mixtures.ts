import type { StudyAnalysis } from "@/app/_worksheet/analysis";
import type { Sheet, SheetStock } from "@/db/sheet/sheet.schema";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";

/** A⁻ at 10 mmol/L and B at 20 mmol/L with their counter-ion, and water; made up to 3000 µL. */
export function mixedSheet(change: Partial<Sheet> = {}): Sheet {
  const plain = exampleSheet();
  const species = plain.species.map((one) => ({
    ...one,
    charge: one.id === "P" ? 1 : one.id === "A" ? -1 : 0,
  }));
  return {
    ...plain,
    species,
    stocks: [
      exampleStock("a", 0, {
        contents: {
          A: { value: 0.01, standardUncertainty: 5e-5 },
          P: { value: 0.01, standardUncertainty: 5e-5 },
        },
      }),
      exampleStock("b", 1, { contents: { B: { value: 0.02, standardUncertainty: 1.2e-4 } } }),
      exampleStock("w", 2, { symbol: "", name: "water" }),
    ],
    mixing: {
      volumeUnit: "uL",
      markMicrolitre: 3000,
      deliveries: [
        { upToMicrolitre: 50, absoluteMicrolitre: 0.08, relative: 0 },
        { upToMicrolitre: null, absoluteMicrolitre: 0, relative: 0.005 },
      ],
    },
    runs: [
      exampleRun(
        0,
        {},
        { volumes: { a: 15, b: 300, w: 2685 }, enteredRate: { molarPerSecond: 1e-6, standardError: null } },
      ),
      exampleRun(1, { A: 2e-5, B: 1e-3 }, { volumes: { a: 6, b: 294, w: 2994 } }),
    ],
    ...change,
  };
}

export function exampleStock(id: string, position: number, change: Partial<SheetStock>): SheetStock {
  return {
    id,
    symbol: id.toUpperCase(),
    name: `solution of ${id}`,
    position,
    contents: {},
    dilution: null,
    lot: "",
    madeOn: "",
    howKnown: "",
    ...change,
  };
}

export const NO_ANALYSIS: StudyAnalysis = {
  hash: "",
  rule: null,
  runs: [],
  law: { status: "no-law", missing: "", fit: null },
  checks: [],
};
