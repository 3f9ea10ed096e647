import { describe, expect, it } from "vitest";
import { concentrationBudget, concentrationCovariance } from "./covariance";
import { chained, run, solute, stock } from "./example-sheets";
import { mixRuns } from "./mix-runs";
import type { MixingInput, RunMixture } from "./mixing";

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
