import { leastSquares, matrixFromColumns } from "kinetics-core/linear-algebra";
import { randomDraws } from "kinetics-core/random";
import { simulateTrace } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { type TraceNoise, traceNoise } from "./trace-noise";

function noiseOf(time: ArrayLike<number>, signal: ArrayLike<number>): TraceNoise {
  const noise = traceNoise({ time, signal });
  if (noise.status !== "found") throw new Error(noise.status);
  return noise;
}

function meanOf(values: number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

describe("the noise of a trace", () => {
  it("follows its formulas, computed with whole matrices", () => {
    const deviate = randomDraws(11).normal;
    // Uneven on purpose: R takes each gap in units of the median gap.
    const time = Array.from({ length: 26 }, (_, i) => i + 0.3 * Math.sin(3 * i));
    // A ripple of five periods is too fast for the polynomial and correlates neighbours by cos 1.2.
    const signal = time.map((t) => Math.exp(-t / 15) + 0.01 * Math.sin(1.2 * t) + 0.003 * deviate());
    const n = time.length;
    const degree = 5; // min(6, ⌊26/4⌋ − 1)
    const q = degree + 1;
    const columns = Array.from({ length: q }, (_, j) => Float64Array.from(time, (t) => (t / 25) ** j));
    const { coefficients } = leastSquares(matrixFromColumns(columns), Float64Array.from(signal));
    const residuals = signal.map((s, i) =>
      columns.reduce((sum, column, j) => sum - Number(coefficients[j]) * Number(column[i]), s),
    );
    const squares = residuals.reduce((sum, r) => sum + r * r, 0);
    const lagged = residuals.slice(1).reduce((sum, r, i) => sum + r * Number(residuals[i]), 0);
    const rho = Math.min(Math.max(((n * lagged) / squares + q) / (n - q - 2), 0), 0.97);

    // tr QᵀRQ = tr (R H) with H the hat matrix, whose column i is the fit to a unit reading i.
    const gaps = time
      .slice(1)
      .map((t, i) => t - Number(time[i]))
      .sort((a, b) => a - b);
    const typical = Number(gaps[12]);
    let trace = 0;
    for (let i = 0; i < n; i++) {
      const unit = new Float64Array(n);
      unit[i] = 1;
      const fit = leastSquares(matrixFromColumns(columns), unit).coefficients;
      for (let k = 0; k < n; k++) {
        const hat = columns.reduce((sum, column, j) => sum + Number(fit[j]) * Number(column[k]), 0);
        trace += hat * rho ** (Math.abs(Number(time[i]) - Number(time[k])) / typical);
      }
    }

    const noise = noiseOf(time, signal);
    expect(rho).toBeGreaterThan(0.2);
    expect(noise.degree).toBe(degree);
    expect(noise.autocorrelation).toBeCloseTo(rho, 10);
    expect(noise.standardDeviation).toBeCloseTo(Math.sqrt(squares / (n - trace)), 10);
    const effective = (n * (1 - rho)) / (1 + rho);
    expect(noise.effectivePoints).toBeCloseTo(effective, 8);
    expect(noise.degreesOfFreedom).toBeCloseTo(Math.max(effective - 5, 3), 8);
  });

  it.each([
    [200, 0, 0.05],
    [200, 0.5, 0.04],
    [1000, 0.8, 0.02],
  ])("recovers σ and ρ: %i readings, ρ = %s", (readings, autocorrelation, tolerance) => {
    const deviate = randomDraws(3).normal;
    const noises = Array.from({ length: 60 }, () => {
      const course = { order: 1, progress: 1, readings, duration: 60, start: 0.2, span: 1, noise: 0.01 };
      const { time, signal } = simulateTrace({ ...course, autocorrelation }, deviate);
      return noiseOf(time, signal);
    });
    expect(Math.abs(meanOf(noises.map((noise) => noise.autocorrelation)) - autocorrelation)).toBeLessThan(
      tolerance,
    );
    const variance = meanOf(noises.map((noise) => noise.standardDeviation ** 2));
    expect(Math.sqrt(variance) / 0.01).toBeGreaterThan(0.97);
    expect(Math.sqrt(variance) / 0.01).toBeLessThan(1.03);
  });

  it("underestimates ρ in short traces, which the floor of three degrees of freedom stands for", () => {
    const deviate = randomDraws(4).normal;
    const noises = Array.from({ length: 200 }, () => {
      const course = { order: 0, progress: 0.5, readings: 20, duration: 60, start: 0, span: 1, noise: 0.01 };
      const { time, signal } = simulateTrace({ ...course, autocorrelation: 0.9 }, deviate);
      return noiseOf(time, signal);
    });
    const sorted = noises.map((noise) => noise.autocorrelation).sort((a, b) => a - b);
    expect(Number(sorted[100])).toBeGreaterThan(0.4);
    expect(Number(sorted[100])).toBeLessThan(0.7);
    expect(Math.min(...noises.map((noise) => noise.degreesOfFreedom))).toBe(3);
  });

  it("takes the residuals of a quadratic as independent under 8 readings", () => {
    const time = [0, 1, 2, 3, 4, 5];
    const signal = [1, 1.9, 3.2, 4.1, 4.8, 6.1];
    const noise = noiseOf(time, signal);
    const columns = [0, 1, 2].map((j) => Float64Array.from(time, (t) => t ** j));
    const { residualSumOfSquares } = leastSquares(matrixFromColumns(columns), Float64Array.from(signal));
    expect(noise.autocorrelation).toBe(0);
    expect(noise.degreesOfFreedom).toBe(3);
    expect(noise.standardDeviation).toBeCloseTo(Math.sqrt(residualSumOfSquares / 3), 12);
  });

  it("is never less than the rounding of a double", () => {
    const noise = noiseOf([0, 1, 2, 3, 4, 5, 6, 7, 8], new Array(9).fill(0.5));
    expect(noise.standardDeviation).toBeGreaterThan(0);
    expect(noise.standardDeviation).toBeLessThan(1e-15);
    expect(noise.autocorrelation).toBe(0);
  });

  it("asks for four readings", () => {
    expect(traceNoise({ time: [0, 1, 2], signal: [0, 1, 2] })).toEqual({
      status: "too-few-points",
      needed: 4,
      got: 3,
    });
  });
});
