import { fitGlobal, type GlobalFitInput } from "kinetics-core/global-fit";
import { describe, expect, it } from "vitest";
import { lawOfTraces } from "./law-of-traces";
import { timeToConversion } from "./time-to-conversion";

/** Six runs of A → P by v = 2 [A] [B]^½, B a catalyst: exponentials, ε·l = 100, k departing by 2 % either way. */
const starts = [
  [0.01, 0.01],
  [0.02, 0.02],
  [0.01, 0.04],
  [0.04, 0.01],
  [0.02, 0.01],
  [0.01, 0.02],
] as const;

function input(orders: Readonly<Record<string, "free" | number>>): GlobalFitInput {
  return {
    species: [
      { name: "A", stoichiometricNumber: -1 },
      { name: "B", stoichiometricNumber: 0 },
      { name: "P", stoichiometricNumber: 1 },
    ],
    followed: "P",
    signalPerConcentration: { value: 100, standardUncertainty: 0.5 },
    runs: starts.map(([A, B], j) => {
      const rate = 2 * Math.sqrt(B) * (1 + (j % 2 === 0 ? 0.02 : -0.02));
      const time = Array.from({ length: 60 }, (_, i) => ((i + 1) / 60 / rate) * 1.5);
      // A catalyst B keeps its concentration, so A decays exponentially.
      const signal = time.map((t, i) => 100 * A * (1 - Math.exp(-rate * t)) + 1e-4 * Math.sin(12.9 * i));
      return { label: `R${j + 1}`, concentrations: { A, B, P: 0 }, time, signal };
    }),
    law: { orders },
  };
}

describe("the law of a fit to traces", () => {
  it.each([
    ["all orders free", { A: "free", B: "free" } as const, 3],
    ["one order held", { A: 1, B: "free" } as const, 2],
  ])("with %s predicts with the fit's own covariance", (_, orders, size) => {
    const study = input(orders);
    const fit = fitGlobal(study);
    if (fit.status !== "fitted") throw new Error(fit.message);
    const found = lawOfTraces(fit, study);
    if (found.status !== "law") throw new Error(found.message);
    const { law } = found;
    expect(law.covariance).toHaveLength(size);
    expect(Number(law.covariance?.[0]?.[0])).toBeCloseTo(Number(fit.covariance?.[0]?.[0]), 12);
    expect(law.studied.B).toEqual([0.01, 0.04]);
    const time = timeToConversion(
      law,
      { concentrations: { A: 0.02, B: 0.02 }, stoichiometricNumbers: { A: -1 } },
      0.5,
    );
    if (time.status !== "predicted") throw new Error(time.message);
    const truth = Math.LN2 / (2 * Math.sqrt(0.02));
    expect(Math.abs(Number(time.ofTheLaw.estimate) / truth - 1)).toBeLessThan(0.03);
    expect(time.newRun.interval?.[0]).toBeLessThan(truth);
    expect(time.newRun.interval?.[1]).toBeGreaterThan(truth);
  });
});
