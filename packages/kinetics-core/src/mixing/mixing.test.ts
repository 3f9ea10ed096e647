import { describe, expect, it } from "vitest";
import {
  concentrationBudget,
  concentrationCovariance,
  forRateLaw,
  type MixedRow,
  type Mixing,
  type MixingInput,
  mixRuns,
  type RunMixture,
  type Solute,
  type Stock,
} from "./index";

function solute(
  name: string,
  molar: number,
  relative = 0,
  species: Solute["species"] = { [name]: 1 },
): Solute {
  return { name, concentration: { value: molar, standardUncertainty: relative * molar }, species };
}

function stock(name: string, ...solutes: readonly Solute[]): Stock {
  return { kind: "stock", name, solutes };
}

function run(mixing: Mixing, label: string): MixedRow {
  const row = mixing.runs.find((one) => one.label === label);
  if (row?.status !== "mixed") throw new Error(row?.message ?? `no run ${label}`);
  return row;
}

const dye = stock("dye", solute("D", 25e-6));
const alkali = stock("alkali", solute("NaOH", 0.2, 0, { "Na+": 1, "OH-": 1 }));

describe("concentrations at mixing time", () => {
  it("equal volumes of 25 µmol/L and 0.2 mol/L give 12.5 µmol/L and 0.1 mol/L (common practice)", () => {
    const mixing = mixRuns({
      solutions: [dye, alkali],
      runs: [
        {
          label: "R01",
          portions: [
            { solution: "dye", volume: 5 },
            { solution: "alkali", volume: 5 },
          ],
          total: { kind: "sum" },
        },
      ],
    });
    expect(mixing.species).toEqual(["D", "Na+", "OH-"]);
    expect(run(mixing, "R01").concentrations).toEqual({ D: 12.5e-6, "Na+": 0.1, "OH-": 0.1 });
    expect(run(mixing, "R01").totalVolume).toBe(10);
  });

  it("made up to the mark the solvent is what is left, and summed it is a portion", () => {
    const portions = [
      { solution: "dye", volume: 2 },
      { solution: "alkali", volume: 1 },
    ];
    const mixing = mixRuns({
      solutions: [dye, alkali],
      runs: [
        { label: "mark", portions, total: { kind: "mark", volume: 10 } },
        { label: "sum", portions: [...portions, { solution: null, volume: 7 }], total: { kind: "sum" } },
        { label: "blank", portions: [], total: { kind: "mark", volume: 10 } },
      ],
    });
    expect(run(mixing, "mark").concentrations.D).toBeCloseTo(5e-6, 18);
    expect(run(mixing, "sum").concentrations).toEqual(run(mixing, "mark").concentrations);
    expect(run(mixing, "blank").concentrations).toEqual({ D: 0, "Na+": 0, "OH-": 0 });
  });

  it("goes through dilution steps and mixed reagents", () => {
    const mixing = mixRuns({
      solutions: [
        // Order does not matter: a later one may be drawn from.
        {
          kind: "mixture",
          name: "D/100",
          portions: [{ solution: "D/10", volume: 10 }],
          total: { kind: "mark", volume: 100 },
        },
        dye,
        {
          kind: "mixture",
          name: "D/10",
          portions: [{ solution: "dye", volume: 10 }],
          total: { kind: "mark", volume: 100 },
        },
      ],
      runs: [
        {
          label: "R01",
          portions: [
            { solution: "D/100", volume: 1 },
            { solution: "dye", volume: 1 },
          ],
          total: { kind: "sum" },
        },
      ],
    });
    expect(run(mixing, "R01").concentrations.D).toBeCloseTo((0.25e-6 + 25e-6) / 2, 15);
    expect(mixing.solutions.map((row) => row.label)).toEqual(["D/100", "dye", "D/10"]);
  });
});

/** Two stocks of one solute, a chain, devices in steps, runs and marks. */
const chained: MixingInput = {
  devices: [
    { name: "pipette", relative: 0.004 },
    { name: "flask", relative: 0.002 },
  ],
  solutions: [
    stock("A", solute("A", 0.1, 0.01)),
    stock("B", solute("B", 0.5, 0.015), solute("salt", 1, 0.02, { "K+": 1, "Cl-": 1 })),
    {
      kind: "mixture",
      name: "A/10",
      portions: [{ solution: "A", volume: 10, standardUncertainty: 0.03, device: "pipette" }],
      total: { kind: "mark", volume: 100, standardUncertainty: 0.1, device: "flask" },
    },
  ],
  runs: [
    {
      label: "R01",
      portions: [
        { solution: "A", volume: 2, standardUncertainty: 0.01, device: "pipette" },
        { solution: "B", volume: 3, standardUncertainty: 0.01, device: "pipette" },
        { solution: null, volume: 5, standardUncertainty: 0.02 },
      ],
      total: { kind: "sum" },
    },
    {
      label: "R02",
      portions: [
        { solution: "A/10", volume: 4, standardUncertainty: 0.012, device: "pipette" },
        { solution: "A", volume: 1, standardUncertainty: 0.01 },
        { solution: "B", volume: 2, standardUncertainty: 0.01, device: "pipette" },
      ],
      total: { kind: "mark", volume: 25, standardUncertainty: 0.03, device: "flask" },
    },
  ],
};

describe("uncertainty", () => {
  const mixing = mixRuns(chained);

  /** Concentrations with one number of the input moved. */
  function movedBy(change: (input: MixingInput) => MixingInput, label: string, species: string): number {
    return run(mixRuns(change(chained)), label).concentrations[species] ?? Number.NaN;
  }

  function scaledVolumes(runs: readonly RunMixture[], factors: (label: string, place: number) => number) {
    return runs.map((one) => ({
      ...one,
      portions: one.portions.map((portion, place) => ({
        ...portion,
        volume: portion.volume * factors(one.label, place),
      })),
    }));
  }

  function effect(name: string, label: string, species: string): number {
    const found = run(mixing, label).effects.filter((one) => mixing.sources[one.source]?.name === name);
    return Math.hypot(...found.map((one) => one.concentrations[species] ?? 0));
  }

  it.each([
    ["R01", "A"],
    ["R02", "A"],
  ])("a stock's error moves %s in proportion to what it gives", (label, species) => {
    const more = movedBy(
      (input) => ({
        ...input,
        solutions: input.solutions.map((one) => (one.name === "A" ? stock("A", solute("A", 0.101)) : one)),
      }),
      label,
      species,
    );
    const now = run(mixing, label).concentrations[species] ?? 0;
    expect(effect("Stock A", label, species)).toBeCloseTo(more - now, 12);
  });

  it("volumes of a run act on every species by the difference that they make", () => {
    for (const label of ["R01", "R02"]) {
      for (const species of ["A", "B"]) {
        const now = run(mixing, label).concentrations[species] ?? 0;
        const parts = [0, 1, 2].map((place) => {
          const portion = chained.runs.find((one) => one.label === label)?.portions[place];
          const relative = (portion?.standardUncertainty ?? 0) / (portion?.volume ?? 1);
          const moved = (by: number) =>
            movedBy(
              (input) => ({
                ...input,
                runs: scaledVolumes(input.runs, (of, at) => (of === label && at === place ? 1 + by : 1)),
              }),
              label,
              species,
            );
          return ((moved(1e-5) - moved(-1e-5)) / 2e-5) * relative;
        });
        const mark = label === "R02" ? (now * 0.03) / 25 : 0;
        expect(effect(`Volumes of ${label}`, label, species) / Math.hypot(...parts, mark)).toBeCloseTo(1, 8);
      }
    }
  });

  it("a device acts through every delivery it made, with the same error", () => {
    const factor = 1 + 1e-5;
    const moved = movedBy(
      (input) => ({
        ...input,
        solutions: input.solutions.map((one) =>
          one.kind === "mixture"
            ? { ...one, portions: one.portions.map((p) => ({ ...p, volume: p.volume * factor })) }
            : one,
        ),
        runs: scaledVolumes(input.runs, (label, place) => (label === "R02" && place !== 1 ? factor : 1)),
      }),
      "R02",
      "A",
    );
    const now = run(mixing, "R02").concentrations.A ?? 0;
    expect(effect("Calibration of pipette", "R02", "A") / (((moved - now) / 1e-5) * 0.004)).toBeCloseTo(1, 4);
  });

  it("a device that delivers every portion of a sum cancels", () => {
    const both = mixRuns({
      ...chained,
      runs: [
        {
          label: "R01",
          portions: [
            { solution: "B", volume: 3, device: "pipette" },
            { solution: null, volume: 5, device: "pipette" },
          ],
          total: { kind: "sum" },
        },
      ],
    });
    const names = run(both, "R01").effects.map((one) => both.sources[one.source]?.name);
    expect(names).toEqual(["Stock B, B", "Stock B, salt"]);
  });

  it("the sources of a concentration add up to its standard uncertainty", () => {
    for (const label of ["R01", "R02"]) {
      const row = run(mixing, label);
      const budget = concentrationBudget(mixing, { label, species: "A" });
      const total = Math.hypot(...budget.map((line) => line.relative));
      expect(total * (row.concentrations.A ?? 0)).toBeCloseTo(row.standardUncertainties.A ?? 0, 15);
    }
    expect(concentrationBudget(mixing, { label: "R02", species: "A" }).map((line) => line.source)).toEqual(
      expect.arrayContaining(["Stock A", "Dilution A/10", "Calibration of pipette", "Volumes of R02"]),
    );
    expect(concentrationBudget(mixing, { label: "no such run", species: "A" })).toEqual([]);
  });

  it("runs from one stock vary together, and by nothing else", () => {
    const plain = mixRuns({
      solutions: [stock("A", solute("A", 0.1, 0.01))],
      runs: [1, 2].map((volume) => ({
        label: `R0${volume}`,
        portions: [{ solution: "A", volume, standardUncertainty: 0.01 }],
        total: { kind: "mark", volume: 10 },
      })),
    });
    const covariance = concentrationCovariance(plain, [
      { label: "R01", species: "A" },
      { label: "R02", species: "A" },
    ]);
    expect(covariance?.[0]?.[1]).toBeCloseTo(0.01 * 0.02 * 0.01 ** 2, 15);
    expect(covariance?.[0]?.[0]).toBeCloseTo(0.01 ** 2 * (0.01 ** 2 + 0.01 ** 2), 15);
    expect(concentrationCovariance(plain, [{ label: "R03", species: "A" }])).toBeNull();
  });
});

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

describe("ionic strength", () => {
  const charges = { "Na+": 1, "OH-": -1, "SO4 2-": -2, D: 1, "Cl-": -1 };

  it("is half the sum of c z², with its uncertainty, for every run", () => {
    const sulfate = stock("sulfate", solute("Na2SO4", 0.1, 0.01, { "Na+": 2, "SO4 2-": 1 }));
    const mixing = mixRuns({
      charges,
      solutions: [alkali, sulfate],
      runs: [
        { label: "alkali", portions: [{ solution: "alkali", volume: 1 }], total: { kind: "sum" } },
        { label: "sulfate", portions: [{ solution: "sulfate", volume: 1 }], total: { kind: "sum" } },
      ],
    });
    expect(run(mixing, "alkali").ionicStrength).toEqual({ value: 0.2, standardUncertainty: 0 });
    const strength = run(mixing, "sulfate").ionicStrength;
    expect(strength?.value).toBeCloseTo(0.3, 14);
    // Sodium and sulfate carry the same error: 1 % of the whole, not less by averaging.
    expect(strength?.standardUncertainty).toBeCloseTo(0.003, 14);
    expect(run(mixing, "sulfate").flags).toEqual([]);
  });

  it("is not given, or is flagged, where a charge or a counter-ion is missing", () => {
    const mixing = mixRuns({
      charges,
      solutions: [dye, stock("neutral", solute("E", 1))],
      runs: [
        { label: "dye", portions: [{ solution: "dye", volume: 1 }], total: { kind: "sum" } },
        { label: "neutral", portions: [{ solution: "neutral", volume: 1 }], total: { kind: "sum" } },
      ],
    });
    expect(run(mixing, "dye").flags[0]).toMatchObject({ code: "charges-unbalanced", severity: "weakens" });
    expect(run(mixing, "neutral").ionicStrength).toBeNull();
    expect(run(mixing, "neutral").flags[0]?.code).toBe("charge-missing");
    expect(run(mixRuns({ ...chained, charges: {} }), "R01").ionicStrength).toBeNull();
    expect(run(mixRuns(chained), "R01").ionicStrength).toBeNull();
  });
});

describe("what a rate law takes from it", () => {
  it("a stock that all runs share is one error without runs, a dilution step one with them", () => {
    const { runs, shared } = forRateLaw(
      mixRuns({
        solutions: [
          stock("A", solute("A", 0.1, 0.01)),
          {
            kind: "mixture",
            name: "A/10",
            portions: [{ solution: "A", volume: 10, standardUncertainty: 0.03 }],
            total: { kind: "mark", volume: 100, standardUncertainty: 0.4 },
          },
        ],
        runs: [
          {
            label: "R01",
            portions: [{ solution: "A", volume: 2, standardUncertainty: 0.01 }],
            total: { kind: "mark", volume: 10 },
          },
          {
            label: "R02",
            portions: [{ solution: "A/10", volume: 5 }],
            total: { kind: "mark", volume: 10, standardUncertainty: 0.02 },
          },
        ],
      }),
      ["A", "B"],
    );
    expect(runs[0]?.concentrations.A).toBe(0.02);
    expect(runs[1]?.concentrations.A).toBeCloseTo(0.005, 15);
    expect(runs.map((one) => one.concentrations.B)).toEqual([0, 0]);
    expect(runs[0]?.relativeUncertainty.A).toBeCloseTo(0.005, 14);
    expect(runs[1]?.relativeUncertainty.A).toBeCloseTo(0.002, 14);
    expect(shared).toHaveLength(2);
    expect(shared[0]).toMatchObject({ source: "Stock A", species: ["A"] });
    expect(shared[0]).not.toHaveProperty("runs");
    expect(shared[0]?.relative).toBeCloseTo(0.01, 14);
    // Aliquot 0.3 % and flask 0.4 % of the one step: 0.5 %.
    expect(shared[1]).toMatchObject({ source: "Dilution A/10", species: ["A"], runs: ["R02"] });
    expect(shared[1]?.relative).toBeCloseTo(0.005, 14);
    expect(shared.every((one) => one.factors === undefined)).toBe(true);
  });

  it("a device that moves species by different factors carries them, with their signs", () => {
    const { shared } = forRateLaw(
      mixRuns({
        devices: [{ name: "pipette", relative: 0.01 }],
        solutions: [stock("A", solute("A", 1)), stock("B", solute("B", 1))],
        runs: [1, 4].map((volume) => ({
          label: `R0${volume}`,
          portions: [
            { solution: "A", volume, device: "pipette" },
            { solution: "B", volume: 5 - volume },
          ],
          total: { kind: "sum" as const },
        })),
      }),
      ["A", "B"],
    );
    // ln c_A moves by 1 − V_A/V, ln c_B by −V_A/V.
    expect(shared).toHaveLength(1);
    const [device] = shared;
    expect(device?.relative).toBeCloseTo(0.008, 14);
    const factor = (label: string, species: string) =>
      ((device?.factors?.[label]?.[species] ?? Number.NaN) * (device?.relative ?? 0)) / 0.01;
    const sign = Math.sign(factor("R01", "A"));
    expect(sign * factor("R01", "A")).toBeCloseTo(0.8, 12);
    expect(sign * factor("R01", "B")).toBeCloseTo(-0.2, 12);
    expect(sign * factor("R04", "A")).toBeCloseTo(0.2, 12);
    expect(sign * factor("R04", "B")).toBeCloseTo(-0.8, 12);
  });

  it("leaves refused runs out and gives the same covariance of ln c as the sources do", () => {
    const mixing = mixRuns({
      ...chained,
      runs: [...chained.runs, { label: "R03", portions: [], total: null }],
    });
    const { runs, shared } = forRateLaw(mixing, ["B", "A"]);
    expect(runs.map((one) => one.label)).toEqual(["R01", "R02"]);
    const logEffect = (one: (typeof shared)[number], label: string) =>
      one.species.includes("A") && (one.runs?.includes(label) ?? true)
        ? one.relative * (one.factors?.[label]?.A ?? 1)
        : 0;
    const covariance = concentrationCovariance(mixing, [
      { label: "R01", species: "A" },
      { label: "R02", species: "A" },
    ]);
    const [a = 0, b = 0] = runs.map((one) => one.concentrations.A ?? 0);
    const together = shared.reduce((sum, one) => sum + logEffect(one, "R01") * logEffect(one, "R02"), 0);
    expect((covariance?.[0]?.[1] ?? 0) / (a * b) / together).toBeCloseTo(1, 10);
    const own = shared.reduce((sum, one) => sum + logEffect(one, "R02") ** 2, 0);
    const total = own + (runs[1]?.relativeUncertainty.A ?? 0) ** 2;
    expect((covariance?.[1]?.[1] ?? 0) / b ** 2 / total).toBeCloseTo(1, 10);
  });
});
