import { correlatedLeastSquares, leastSquares, matrixFromColumns } from "kinetics-core/linear-algebra";
import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { varianceComponents } from "./restricted-likelihood";

const logarithms = [-1.5, -1, -0.5, 0, 0.5, 1, 1.5, -1.5, 0, 1.5];
const terms = matrixFromColumns([logarithms.map(() => 1), logarithms]);
const stated = [1e-4, 4e-4, 1e-2, 1e-4, 9e-4, 1e-4, 2.5e-3, 1e-4, 1e-4, 4e-4];

function response(seed: number, scatter: number): readonly number[] {
  const deviate = randomDraws(seed).normal;
  return logarithms.map((x, j) => 0.3 + x + Math.sqrt((stated[j] ?? 0) + scatter ** 2) * deviate());
}

/** −2 ln L_R for one straight line with V diagonal, from sums alone: no matrix code of the library. */
function deviance(y: readonly number[], variance: number): number {
  const w = stated.map((value) => 1 / (value + variance));
  const sum = (f: (j: number) => number) => w.reduce((total, weight, j) => total + weight * f(j), 0);
  const s0 = sum(() => 1);
  const s1 = sum((j) => logarithms[j] ?? 0);
  const s2 = sum((j) => (logarithms[j] ?? 0) ** 2);
  const t0 = sum((j) => y[j] ?? 0);
  const t1 = sum((j) => (y[j] ?? 0) * (logarithms[j] ?? 0));
  const determinant = s0 * s2 - s1 ** 2;
  const a = (s2 * t0 - s1 * t1) / determinant;
  const b = (s0 * t1 - s1 * t0) / determinant;
  const residual = sum((j) => ((y[j] ?? 0) - a - b * (logarithms[j] ?? 0)) ** 2);
  return residual + Math.log(determinant) - w.reduce((total, weight) => total + Math.log(weight), 0);
}

/** The least on a grid that is refined five times: slow, and sure to find it. */
function gridLeast(y: readonly number[]): number {
  const coarse = [0, ...Array.from({ length: 4000 }, (_, i) => 1e-9 * 10 ** (i / 400))];
  const least = (values: readonly number[]) =>
    values.reduce((best, value) => (deviance(y, value) < deviance(y, best) ? value : best), values[0] ?? 0);
  let best = least(coarse);
  if (best === 0) return 0;
  let width = best * 0.01;
  for (let round = 0; round < 3; round++) {
    const from = best;
    best = least(Array.from({ length: 401 }, (_, i) => Math.max(0, from + width * (i / 200 - 1))));
    width /= 50;
  }
  return best;
}

describe("variance between runs by restricted likelihood", () => {
  it.each([
    [11, 0],
    [12, 0.01],
    [13, 0.03],
    [14, 0.1],
    [15, 0.3],
    [16, 0.01],
    [17, 0],
  ])("seed %i, true scatter %d: the same as an independent search on a grid", (seed, scatter) => {
    const y = response(seed, scatter);
    const found = varianceComponents({ terms, response: y, stated, shared: [], blocks: [] }).betweenRuns;
    const searched = gridLeast(y);
    expect(Math.abs(found - searched)).toBeLessThanOrEqual(2e-4 * searched + 1e-12);
    expect(deviance(y, found)).toBeLessThanOrEqual(deviance(y, searched) + 1e-9);
  });

  it("with equal stated errors is what the residual variance exceeds them by, and zero where it does not", () => {
    const y = response(21, 0.05);
    const { residualSumOfSquares } = leastSquares(terms, y);
    const variance = residualSumOfSquares / (logarithms.length - 2);
    const equal = (value: number) =>
      varianceComponents({ terms, response: y, stated: stated.map(() => value), shared: [], blocks: [] })
        .betweenRuns;
    expect(equal(0)).toBeCloseTo(variance, 14);
    expect(equal(variance / 3)).toBeCloseTo((variance * 2) / 3, 14);
    expect(equal(variance * 3)).toBe(0);
    // The iterative way agrees with the closed form.
    const almost = stated.map((_, j) => (variance / 3) * (1 + (j % 2 === 0 ? 1e-9 : -1e-9)));
    const iterated = varianceComponents({
      terms,
      response: y,
      stated: almost,
      shared: [],
      blocks: [],
    }).betweenRuns;
    expect(iterated / ((variance * 2) / 3)).toBeCloseTo(1, 6);
  });
});

describe("variance between blocks", () => {
  const blocks = [
    [0, 1, 2],
    [3, 4, 5],
    [6, 7],
    [8, 9],
  ];

  it("finds the least of the restricted deviance over both variances, as a grid over both shows", () => {
    const deviate = randomDraws(31).normal;
    const own = [0.15, -0.1, 0.12, -0.2];
    const y = logarithms.map(
      (x, j) => x + (own[blocks.findIndex((members) => members.includes(j))] ?? 0) + 0.02 * deviate(),
    );
    const at = (runs: number, between: number) =>
      correlatedLeastSquares(
        terms,
        y,
        stated.map((value) => value + runs),
        between === 0
          ? []
          : blocks.map((members) => logarithms.map((_, j) => (members.includes(j) ? Math.sqrt(between) : 0))),
      ).restrictedDeviance;
    const found = varianceComponents({ terms, response: y, stated, shared: [], blocks });
    const least = at(found.betweenRuns, found.betweenBlocks);
    expect(found.betweenBlocks).toBeGreaterThan(0.005);
    const grid = [0, ...Array.from({ length: 41 }, (_, i) => 1e-6 * 10 ** (i / 8))];
    for (const runs of grid)
      for (const between of grid) expect(at(runs, between)).toBeGreaterThan(least - 1e-9);
  });

  it("stays under the scatter of the runs where blocks differ by no more than runs do", () => {
    const deviate = randomDraws(33).normal;
    const y = logarithms.map((x) => x + 0.05 * deviate());
    const { betweenBlocks } = varianceComponents({ terms, response: y, stated, shared: [], blocks });
    expect(betweenBlocks).toBeLessThan(1e-3);
  });
});
