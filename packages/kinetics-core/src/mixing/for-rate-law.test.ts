import { describe, expect, it } from "vitest";
import { concentrationCovariance } from "./covariance";
import { chained, solute, stock } from "./example-sheets";
import { forRateLaw } from "./for-rate-law";
import { mixRuns } from "./mix-runs";

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
