import { randomDraws } from "kinetics-core/random";
import type { GlobalFitInput, GlobalFitLaw } from "./global-fit";

/** A study of known truth for tests: A + B → products followed by the loss of A. */
export interface SimulatedStudy {
  readonly runs: number;
  readonly points: number;
  readonly orders: { readonly A: number; readonly B: number };
  readonly rateConstant: number;
  /** τ: standard deviation of ln k between runs. */
  readonly betweenRuns: number;
  readonly noise: number;
  /** Correlation of a reading's error with the one before. */
  readonly autocorrelation?: number;
  /** Duration in units of c_A0/v0. */
  readonly duration?: number;
  readonly seed: number;
  readonly law?: GlobalFitLaw;
}

const SIGNAL_PER_CONCENTRATION = 250;

export function simulateStudy(study: SimulatedStudy): GlobalFitInput {
  const draws = randomDraws(study.seed);
  const { autocorrelation = 0, duration = 1.5, orders, points, rateConstant } = study;
  const runs = Array.from({ length: study.runs }, (_, j) => {
    const A = 1e-3 * ([1, 2, 4][j % 3] ?? 1);
    const B = 4e-3 * ([1, 1.7, 3, 4][Math.floor(j / 3) % 4] ?? 1);
    const k = rateConstant * Math.exp(study.betweenRuns * draws.normal());
    const end = (duration * A) / (k * A ** orders.A * B ** orders.B);
    const time = Float64Array.from({ length: points }, (_, i) => ((i + 1) * end) / points);
    const offset = 0.05 * draws.normal();
    let error = draws.normal();
    const signal = extentsByFixedSteps(A, B, k, orders, time).map((extent) => {
      error = autocorrelation * error + Math.sqrt(1 - autocorrelation ** 2) * draws.normal();
      return offset + SIGNAL_PER_CONCENTRATION * (A - extent) + study.noise * error;
    });
    return { label: `R${j + 1}`, concentrations: { A, B }, time, signal };
  });
  return {
    species: [
      { name: "A", stoichiometricNumber: -1 },
      { name: "B", stoichiometricNumber: -1 },
    ],
    followed: "A",
    signalPerConcentration: { value: SIGNAL_PER_CONCENTRATION, standardUncertainty: 2.5 },
    runs,
    law: study.law ?? { orders: { A: "free", B: "free" } },
  };
}

/** Runge and Kutta's classical step of fixed length, many to a reading: nothing of the fit's own integrator. */
function extentsByFixedSteps(
  A: number,
  B: number,
  k: number,
  orders: { readonly A: number; readonly B: number },
  time: Float64Array,
): Float64Array {
  const steps = Math.max(2, Math.ceil(800 / time.length));
  const limit = Math.min(A, B);
  const rate = (x: number) =>
    x >= limit ? 0 : k * Math.max(A - x, 0) ** orders.A * Math.max(B - x, 0) ** orders.B;
  let x = 0;
  let t = 0;
  return time.map((until) => {
    const h = (until - t) / steps;
    for (let step = 0; step < steps; step++) {
      const k1 = rate(x);
      const k2 = rate(x + (h / 2) * k1);
      const k3 = rate(x + (h / 2) * k2);
      const k4 = rate(x + h * k3);
      x = Math.min(limit, x + (h / 6) * (k1 + 2 * k2 + 2 * k3 + k4));
    }
    t = until;
    return x;
  });
}
