import { medianOfSorted } from "kinetics-core/summation";
/**
 * Noise with the correlation of a first-order autoregression, R_ij = ρ^(|t_i − t_j| / median Δt). Since the
 * correlation over several steps is the product of the steps' own, quadratic forms in R need no matrix: with
 * φ_i = ρ^((t_i − t_{i−1})/median Δt) and s_i = φ_i (s_{i−1} + a_{i−1}),
 *
 *   aᵀRa = Σ a_i² + 2 Σ a_i s_i,
 *
 * which costs one pass over the points.
 */

/** φ_i, correlation of reading i with the one before it; φ_0 = 0. Length of `time`. */
export function stepCorrelations(time: Float64Array, autocorrelation: number): Float64Array {
  const steps = new Float64Array(time.length);
  if (autocorrelation === 0 || time.length < 2) return steps;
  const typical = medianStep(time);
  const logarithm = Math.log(autocorrelation);
  for (let i = 1; i < time.length; i++) {
    const step = ((time[i] ?? Number.NaN) - (time[i - 1] ?? Number.NaN)) / typical;
    steps[i] = step === 1 ? autocorrelation : Math.exp(logarithm * step);
  }
  return steps;
}

/** aᵀRa for a row `row[0…points)` that belongs to the readings from index `from` on. */
export function quadraticForm(row: Float64Array, steps: Float64Array, from: number): number {
  let squares = 0;
  let crossed = 0;
  let carried = 0;
  let before = 0;
  for (let i = 0; i < row.length; i++) {
    const a = row[i] ?? Number.NaN;
    carried = i === 0 ? 0 : (steps[from + i] ?? Number.NaN) * (carried + before);
    squares += a * a;
    crossed += a * carried;
    before = a;
  }
  return squares + 2 * crossed;
}

function medianStep(time: Float64Array): number {
  const gaps = new Float64Array(time.length - 1);
  for (let i = 1; i < time.length; i++) gaps[i - 1] = (time[i] ?? Number.NaN) - (time[i - 1] ?? Number.NaN);
  return medianOfSorted(gaps.sort());
}
