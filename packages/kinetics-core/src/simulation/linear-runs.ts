import type { RunInformation } from "kinetics-core/inference";
import type { RandomDraws } from "kinetics-core/random";

/**
 * A study whose signals are linear in θ = (ln k, order, scale), so that every formula of inference under run scatter
 * is exact: no linearisation stands between truth and test. Each run's ln k departs by τ, its noise is AR(1).
 */
export interface LinearRun {
  readonly label: string;
  /** One column a parameter, ln k first. */
  readonly derivatives: readonly (readonly number[])[];
  readonly residuals: readonly number[];
}

export interface LinearStudy {
  /** ln c of each run, as it multiplies the order. */
  readonly logConcentrations: readonly number[];
  readonly points: number;
  /** What the shape of a run says about the order, as a part of what ln k does; 0: nothing. */
  readonly shape: number;
  /** Standard deviation of ln k between runs. */
  readonly scatter: number;
  readonly noise: number;
  /** How many times the noise of each run is that; all 1 where absent. */
  readonly noiseFactors?: readonly number[];
  readonly autocorrelation: number;
  /** True θ less the θ of the linearisation. */
  readonly truth: readonly [number, number, number];
}

export function simulateLinearRuns(study: LinearStudy, draws: RandomDraws): readonly LinearRun[] {
  const { points, shape, scatter, noise, autocorrelation, truth } = study;
  return study.logConcentrations.map((logConcentration, j) => {
    const times = Array.from({ length: points }, (_, i) => (i + 1) / points);
    const size = Math.exp(0.5 * logConcentration);
    const byRate = times.map((t) => size * (t - 0.15 * t * t));
    const derivatives = [
      byRate,
      byRate.map((value, i) => value * logConcentration - shape * size * (times[i] ?? 0) ** 2),
      byRate.map((value, i) => value + 0.02 * size * (times[i] ?? 0) ** 3),
    ];
    const departure = scatter * draws.normal();
    let error = draws.normal();
    const residuals = times.map((_, i) => {
      if (i > 0) error = autocorrelation * error + Math.sqrt(1 - autocorrelation ** 2) * draws.normal();
      const signal = derivatives.reduce((sum, column, k) => sum + (truth[k] ?? 0) * (column[i] ?? 0), 0);
      return signal + departure * (byRate[i] ?? 0) + noise * (study.noiseFactors?.[j] ?? 1) * error;
    });
    return { label: `R${j + 1}`, derivatives, residuals };
  });
}

/** What a global fit would report of such a run: no nuisance to project out. */
export function informationOf(run: LinearRun, autocorrelation: number): RunInformation {
  const { derivatives, residuals } = run;
  const product = (a: readonly number[], b: readonly number[]) =>
    a.reduce((sum, value, i) => sum + value * (b[i] ?? 0), 0);
  return {
    label: run.label,
    gram: Float64Array.from(derivatives.flatMap((a) => derivatives.map((b) => product(a, b)))),
    gradient: Float64Array.from(derivatives, (column) => product(column, residuals)),
    residualSquares: product(residuals, residuals),
    points: residuals.length,
    degreesOfFreedom: residuals.length,
    autocorrelation,
  };
}
