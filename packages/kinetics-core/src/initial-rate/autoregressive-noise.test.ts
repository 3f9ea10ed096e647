import { describe, expect, it } from "vitest";
import { quadraticForm, stepCorrelations } from "./autoregressive-noise";

/** aᵀRa entry by entry, from the definition of R. */
function bruteForce(row: number[], time: number[], autocorrelation: number, typical: number): number {
  let sum = 0;
  row.forEach((a, i) => {
    row.forEach((b, j) => {
      const distance = Math.abs(Number(time[i]) - Number(time[j])) / typical;
      sum += a * b * (i === j ? 1 : autocorrelation ** distance);
    });
  });
  return sum;
}

describe("a quadratic form in autoregressive noise", () => {
  const row = [0.3, -1.2, 0.5, 2, -0.7, 0.9, -0.1];

  it.each([0, 0.3, 0.97])("equals the matrix product on even times, ρ = %s", (rho) => {
    const time = [0, 2, 4, 6, 8, 10, 12];
    const steps = stepCorrelations(Float64Array.from(time), rho);
    expect(quadraticForm(Float64Array.from(row), steps, 0)).toBeCloseTo(bruteForce(row, time, rho, 2), 12);
  });

  it.each([0.3, 0.97])("equals the matrix product on uneven times, ρ = %s", (rho) => {
    // Gaps 0.5, 1, 1.5, 3, 4, 10: the median is (1.5 + 3)/2.
    const time = [1, 1.5, 2.5, 4, 7, 11, 21];
    const steps = stepCorrelations(Float64Array.from(time), rho);
    expect(quadraticForm(Float64Array.from(row), steps, 0)).toBeCloseTo(bruteForce(row, time, rho, 2.25), 12);
  });

  it("of a part of the readings leaves the rest out", () => {
    const time = [1, 1.5, 2.5, 4, 7, 11, 21];
    const steps = stepCorrelations(Float64Array.from(time), 0.6);
    const part = row.slice(2, 6);
    expect(quadraticForm(Float64Array.from(part), steps, 2)).toBeCloseTo(
      bruteForce(part, time.slice(2, 6), 0.6, 2.25),
      12,
    );
  });

  it("is a variance: simple white noise for ρ = 0", () => {
    const steps = stepCorrelations(Float64Array.from([0, 1, 2]), 0);
    expect(quadraticForm(Float64Array.from([1, 2, 3]), steps, 0)).toBe(14);
  });
});
