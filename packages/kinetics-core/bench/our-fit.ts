import { fitGlobal, type GlobalFit, type GlobalFitInput, type GlobalFitLaw } from "kinetics-core/global-fit";
import type { BenchmarkStudy } from "./benchmark-study";

/** k and two free orders, as powers of the concentrations. */
const POWERS: GlobalFitLaw = { orders: { A: "free", B: "free" } };

export function inputOf(
  { runs, scale, scaleError }: BenchmarkStudy,
  law: GlobalFitLaw = POWERS,
): GlobalFitInput {
  return {
    species: [
      { name: "A", stoichiometricNumber: -1 },
      { name: "B", stoichiometricNumber: -1 },
    ],
    followed: "A",
    signalPerConcentration: { value: scale, standardUncertainty: scaleError },
    runs: runs.map(({ label, a, b, time, signal }) => ({
      label,
      concentrations: { A: a, B: b },
      time,
      signal,
    })),
    law,
  };
}

/** The shipped fit, or an error that ends the benchmark: a failure must not pass for speed. */
export function fitOrThrow(input: GlobalFitInput): GlobalFit {
  const fit = fitGlobal(input);
  if (fit.status !== "fitted") throw new Error(`Our own fit failed: ${fit.message}`);
  return fit;
}
