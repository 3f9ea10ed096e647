import { randomDraws } from "kinetics-core/random";

/**
 * A study to fit: v = k·a·b for A + B → products, the signal of A read evenly until about 70 % of the scarcer reactant
 * is used up. Every run has a rate constant and an offset of its own, all share one scale, noise is autocorrelated.
 * The course has a closed form, so no integrator is favoured by the data.
 */
export interface BenchmarkStudy {
  readonly runs: readonly BenchmarkRun[];
  /** Signal per concentration, as stated, with its standard uncertainty. */
  readonly scale: number;
  readonly scaleError: number;
}

export interface BenchmarkRun {
  readonly label: string;
  readonly a: number;
  readonly b: number;
  readonly time: Float64Array;
  readonly signal: Float64Array;
}

export const TRUE_LOG_RATE_CONSTANT = Math.log(0.8);
const TRUE_SCALE = 60;
const STATED_SCALE = 60.4;
const SCALE_ERROR = 0.6;
const RUN_SCATTER = 0.03;
const OFFSET_SCATTER = 0.01;
const NOISE = 0.004;
const AUTOCORRELATION = 0.3;
const CONVERSION = 0.7;

/** Levels of a and b, mol/L. No two of a run are equal, where the closed form is 0/0. */
const A_LEVELS = [0.01, 0.02, 0.04] as const;
const B_LEVELS = [0.015, 0.03, 0.06, 0.045] as const;

export function benchmarkStudy(runs: number, readings: number, seed: number): BenchmarkStudy {
  const draws = randomDraws(seed);
  return {
    runs: Array.from({ length: runs }, (_, j) => {
      const a = A_LEVELS[j % A_LEVELS.length] ?? 0.01;
      const b = B_LEVELS[Math.floor(j / A_LEVELS.length) % B_LEVELS.length] ?? 0.015;
      return benchmarkRun(`R${j + 1}`, a, b, readings, draws);
    }),
    scale: STATED_SCALE,
    scaleError: SCALE_ERROR,
  };
}

function benchmarkRun(
  label: string,
  a: number,
  b: number,
  readings: number,
  draws: { normal(): number },
): BenchmarkRun {
  const rateConstant = Math.exp(TRUE_LOG_RATE_CONSTANT + RUN_SCATTER * draws.normal());
  const scarce = Math.min(a, b);
  const plenty = Math.max(a, b);
  const end =
    Math.log((plenty - CONVERSION * scarce) / (plenty * (1 - CONVERSION))) /
    (Math.exp(TRUE_LOG_RATE_CONSTANT) * (plenty - scarce));
  const offset = 0.05 + OFFSET_SCATTER * draws.normal();
  const innovation = Math.sqrt(1 - AUTOCORRELATION ** 2);
  const time = new Float64Array(readings);
  const signal = new Float64Array(readings);
  let error = draws.normal();
  for (let i = 0; i < readings; i++) {
    const t = (end * i) / (readings - 1);
    if (i > 0) error = AUTOCORRELATION * error + innovation * draws.normal();
    const decay = Math.exp(-rateConstant * (b - a) * t);
    const extent = (a * b * (1 - decay)) / (b - a * decay);
    time[i] = t;
    signal[i] = offset + TRUE_SCALE * (a - extent) + NOISE * error;
  }
  return { label, a, b, time, signal };
}
