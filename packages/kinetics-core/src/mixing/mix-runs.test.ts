import { describe, expect, it } from "vitest";
import { alkali, chained, dye, run, solute, stock } from "./example-sheets";
import { mixRuns } from "./mix-runs";

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
