import { describe, expect, it } from "vitest";
import { alkali, dye, run, solute, stock } from "./example-sheets";
import { mixRuns } from "./mix-runs";
import type { MixedRow, RunMixture } from "./mixing";

describe("refusals", () => {
  const good: RunMixture = {
    label: "good",
    portions: [{ solution: "dye", volume: 1 }],
    total: { kind: "sum" },
  };
  const bad = (changes: Partial<RunMixture>): RunMixture => ({ ...good, label: "bad", ...changes });

  it.each([
    [
      "above-the-mark",
      bad({
        portions: [
          { solution: "dye", volume: 8 },
          { solution: "alkali", volume: 3 },
        ],
        total: { kind: "mark", volume: 10 },
      }),
      /11, above the mark of 10/,
    ],
    ["volume-negative", bad({ portions: [{ solution: "dye", volume: -1 }] }), /volume of dye is −1/],
    [
      "volume-missing",
      bad({ portions: [{ solution: "dye", volume: Number.NaN }] }),
      /volume of dye is missing/,
    ],
    ["stock-missing", bad({ portions: [{ solution: "bromide", volume: 1 }] }), /draws from bromide/],
    ["no-total", bad({ total: null }), /no total volume/],
    ["no-total", bad({ portions: [] }), /no total volume/],
    ["no-total", bad({ portions: [], total: { kind: "mark", volume: 0 } }), /mark of 0/],
    ["volume-negative", bad({ total: { kind: "mark", volume: -5 } }), /total volume is −5/],
    [
      "uncertainty-negative",
      bad({ portions: [{ solution: "dye", volume: 1, standardUncertainty: -0.1 }] }),
      /not a number from 0 up/,
    ],
    [
      "device-missing",
      bad({ portions: [{ solution: "dye", volume: 1, device: "burette" }] }),
      /burette, which is not among the devices/,
    ],
    ["stock-refused", bad({ portions: [{ solution: "spoilt", volume: 1 }] }), /spoilt/],
    ["made-from-itself", bad({ portions: [{ solution: "loop", volume: 1 }] }), /made from itself/],
    ["name-twice", { ...good, total: null }, /More than one run is called good/],
  ])("%s names the row and the way out, and leaves the other rows alone", (code, row, message) => {
    const mixing = mixRuns({
      solutions: [
        dye,
        alkali,
        stock("spoilt", solute("X", -1)),
        {
          kind: "mixture",
          name: "loop",
          portions: [{ solution: "spool", volume: 1 }],
          total: { kind: "sum" },
        },
        {
          kind: "mixture",
          name: "spool",
          portions: [{ solution: "loop", volume: 1 }],
          total: { kind: "sum" },
        },
      ],
      runs: [good, row],
    });
    expect(mixing.runs[1]).toMatchObject({ status: "refused", label: row.label, code });
    const found = mixing.runs[1];
    expect(found?.status === "refused" && found.message).toMatch(message);
    expect(found?.status === "refused" && found.message).toMatch(/\.$/);
    expect(run(mixing, "good").concentrations.D).toBe(25e-6);
  });

  it("of solutions and devices reach the rows made from them, with the reason at the root", () => {
    const mixing = mixRuns({
      devices: [{ name: "pipette", relative: Number.NaN }],
      solutions: [
        stock("A", solute("A", 1, 0, { A: 0 })),
        { kind: "mixture", name: "A/2", portions: [{ solution: "A", volume: 1 }], total: null },
        { kind: "mixture", name: "A/4", portions: [{ solution: "A/2", volume: 1 }], total: { kind: "sum" } },
        stock("A", solute("A", 2)),
      ],
      runs: [
        { label: "R01", portions: [{ solution: "A/4", volume: 1 }], total: { kind: "sum" } },
        {
          label: "R02",
          portions: [{ solution: null, volume: 1, device: "pipette" }],
          total: { kind: "sum" },
        },
      ],
    });
    const code = (row: MixedRow | { readonly status: "refused"; readonly code: string }) =>
      row.status === "refused" ? row.code : "mixed";
    expect(mixing.solutions.map(code)).toEqual([
      "bad-concentration",
      "no-total",
      "stock-refused",
      "name-twice",
    ]);
    expect(mixing.runs.map(code)).toEqual(["stock-refused", "device-missing"]);
    const [first] = mixing.runs;
    expect(first?.status === "refused" && first.message).toMatch(
      /^Run R01 .*Solution A\/2 has no total volume/,
    );
    expect(mixing.refusedDevices.map((row) => row.label)).toEqual(["pipette"]);
  });
});
