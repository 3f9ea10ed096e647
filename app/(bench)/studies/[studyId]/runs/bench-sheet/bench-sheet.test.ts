import { describe, expect, it } from "vitest";
import { remixed } from "@/app/_worksheet/mixing/remixed";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { exampleRun } from "@/tests/example-sheet";
import { mixedSheet, NO_ANALYSIS } from "../_mixing/testing-mixtures";
import { measuringOrder } from "./measuring-order";
import { optionsQuery, readOptions, USUAL_OPTIONS } from "./options";
import { benchSheetView } from "./view";

const species = [{ id: "A" }, { id: "B" }];
const runs = [
  exampleRun(0, { A: 5e-5, B: 4e-3 }),
  exampleRun(1, { A: 1e-4, B: 1e-3 }),
  exampleRun(2, { A: 5e-5, B: 1e-3 }),
  exampleRun(3, { A: 5e-5, B: 2e-3 }),
];
const labels = (ordered: readonly { label: string }[]) => ordered.map(({ label }) => label).join(" ");

describe("the order of measuring", () => {
  it("goes from least to most of what is varied most, then of the next", () => {
    expect(labels(measuringOrder(runs, species, "least", 1))).toBe("R03 R02 R04 R01");
    expect(labels(measuringOrder(runs, species, "table", 1))).toBe("R01 R02 R03 R04");
  });

  it("is the same shuffle for the same seed, holds every run once, and favours no place", () => {
    const drawn = (seed: number) => labels(measuringOrder(runs, species, "random", seed));
    expect(drawn(14)).toBe(drawn(14));
    const firsts = new Map<string, number>();
    for (let seed = 0; seed < 2000; seed += 1) {
      const order = drawn(seed).split(" ");
      expect(new Set(order).size).toBe(4);
      firsts.set(order[0] ?? "", (firsts.get(order[0] ?? "") ?? 0) + 1);
    }
    // 500 each expected; five standard deviations of a binomial are 97.
    for (const count of firsts.values()) expect(Math.abs(count - 500)).toBeLessThan(97);
    expect(firsts.size).toBe(4);
  });
});

describe("the choices in the address", () => {
  it("read back, and what is not read is as usual", () => {
    const options = { order: "random", seed: 14, starts: "b", blank: false, cautions: false } as const;
    expect(readOptions(Object.fromEntries(new URLSearchParams(optionsQuery(options))))).toEqual(options);
    expect(optionsQuery(USUAL_OPTIONS)).toBe("");
    expect(readOptions({ order: "up", seed: "-3", blank: ["0", "1"] })).toEqual(USUAL_OPTIONS);
  });
});

describe("the bench sheet", () => {
  const sheet: Sheet = remixed(
    mixedSheet({
      runs: [
        exampleRun(
          0,
          {},
          { volumes: { a: 15, b: 300, w: 2685 }, enteredRate: { molarPerSecond: 1e-6, standardError: null } },
        ),
        exampleRun(1, {}, { volumes: { a: 15, b: 600, w: 2385 }, remark: "more B" }),
        exampleRun(2, {}, { volumes: { a: 15, b: 150, w: 2835 } }),
        exampleRun(3, {}, { volumes: { a: 15, b: 300, w: 3000 } }),
        exampleRun(4, { A: 1e-5 }),
      ],
    }),
  );
  const view = benchSheetView(sheet, NO_ANALYSIS, USUAL_OPTIONS);

  it("lists planned mixtures that add up, with a blank before them and columns in the order of adding", () => {
    expect(view.title).toBe("The bench sheet for the next two runs");
    expect(view.paperTitle).toBe("Two runs, least to most species B");
    expect(view.columns.map(({ head, note }) => [head, note])).toEqual([
      ["water", "µL, first"],
      ["Stock B", "µL"],
      ["Stock A", "µL, starts it"],
    ]);
    expect(view.rows.map(({ label, volumes, remark }) => [label, ...volumes, remark])).toEqual([
      ["Blank", "2850", "150", "", "Zero the reading"],
      ["R03", "2835", "150", "15", ""],
      ["R02", "2385", "600", "15", "more B"],
    ]);
    expect(view.conditions).toBe(
      "25.0 °C. Mark 3000 µL. Bring each mixture to temperature before stock A starts it.",
    );
  });

  it("names what is not on it, and how much of each stock it takes", () => {
    expect(view.notes).toEqual([
      {
        severity: "blocks",
        message: "R04 does not add up and is not on this sheet. Correct the volumes on the mixing table.",
      },
      {
        severity: "note",
        message: "The runs of this sheet take 750 µL of B and 30 µL of A, without rinsing.",
      },
    ]);
  });

  it("lets another stock start the reaction, and leaves the blank out", () => {
    const other = benchSheetView(sheet, NO_ANALYSIS, { ...USUAL_OPTIONS, starts: "b", blank: false });
    expect(other.columns.at(-1)).toMatchObject({ head: "Stock B", note: "µL, starts it" });
    expect(other.rows.map(({ label }) => label)).toEqual(["R03", "R02"]);
  });
});
