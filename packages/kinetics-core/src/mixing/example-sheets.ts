import type { MixedRow, Mixing, MixingInput, Solute, Stock } from "./mixing";

/** Small sheets of the bench to test with. */

export function solute(
  name: string,
  molar: number,
  relative = 0,
  species: Solute["species"] = { [name]: 1 },
): Solute {
  return { name, concentration: { value: molar, standardUncertainty: relative * molar }, species };
}

export function stock(name: string, ...solutes: readonly Solute[]): Stock {
  return { kind: "stock", name, solutes };
}

export function run(mixing: Mixing, label: string): MixedRow {
  const row = mixing.runs.find((one) => one.label === label);
  if (row?.status !== "mixed") throw new Error(row?.message ?? `no run ${label}`);
  return row;
}

export const dye = stock("dye", solute("D", 25e-6));
export const alkali = stock("alkali", solute("NaOH", 0.2, 0, { "Na+": 1, "OH-": 1 }));

/** Two stocks of one solute, a chain, devices in steps, runs and marks. */
export const chained: MixingInput = {
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
