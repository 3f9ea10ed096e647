import { describe, expect, it } from "vitest";
import {
  columnOf,
  dot,
  entry,
  householderQr,
  leastSquares,
  matrixFromColumns,
  rankOf,
  singularValues,
  times,
} from "./index";

/** NIST StRD, linear regression, data set Longley (1967): seven certified coefficients with their deviations. */
const longley = {
  y: [
    60323, 61122, 60171, 61187, 63221, 63639, 64989, 63761, 66019, 67857, 68169, 66513, 68655, 69564, 69331,
    70551,
  ],
  columns: [
    [83, 88.5, 88.2, 89.5, 96.2, 98.1, 99, 100, 101.2, 104.6, 108.4, 110.8, 112.6, 114.2, 115.7, 116.9],
    [
      234289, 259426, 258054, 284599, 328975, 346999, 365385, 363112, 397469, 419180, 442769, 444546, 482704,
      502601, 518173, 554894,
    ],
    [2356, 2325, 3682, 3351, 2099, 1932, 1870, 3578, 2904, 2822, 2936, 4681, 3813, 3931, 4806, 4007],
    [1590, 1456, 1616, 1650, 3099, 3594, 3547, 3350, 3048, 2857, 2798, 2637, 2552, 2514, 2572, 2827],
    [
      107608, 108632, 109773, 110929, 112075, 113270, 115094, 116219, 117388, 118734, 120445, 121950, 123366,
      125368, 127852, 130081,
    ],
    [1947, 1948, 1949, 1950, 1951, 1952, 1953, 1954, 1955, 1956, 1957, 1958, 1959, 1960, 1961, 1962],
  ],
  coefficients: [
    -3482258.63459582, 15.0618722713733, -0.035819179292591, -2.02022980381683, -1.03322686717359,
    -0.0511041056535807, 1829.15146461355,
  ],
  deviations: [
    890420.383607373, 84.9149257747669, 0.0334910077722432, 0.488399681651699, 0.214274163161675,
    0.22607320006937, 455.478499142212,
  ],
};

describe("least squares", () => {
  it("gives Longley's certified coefficients to 9 digits and deviations to 9 digits (NIST StRD)", () => {
    const x = matrixFromColumns([longley.y.map(() => 1), ...longley.columns]);
    const fit = leastSquares(x, longley.y);
    const variance = fit.residualSumOfSquares / (16 - 7);
    longley.coefficients.forEach((certified, j) => {
      expect(Math.abs((fit.coefficients[j] ?? 0) / certified - 1)).toBeLessThan(1e-9);
      const deviation = Math.sqrt(variance * entry(fit.inverseGram, j, j));
      expect(Math.abs(deviation / (longley.deviations[j] ?? 0) - 1)).toBeLessThan(1e-9);
    });
    expect(fit.leverage.reduce((sum, h) => sum + h, 0)).toBeCloseTo(7, 9);
  });

  it("survives columns that differ by thirty powers of ten", () => {
    const x = matrixFromColumns([
      [1e-15, 1e-15, 1e-15, 1e-15],
      [1e15, 2e15, 3e15, 4e15],
    ]);
    const fit = leastSquares(x, [3, 5, 7, 9]);
    expect((fit.coefficients[0] ?? 0) * 1e-15).toBeCloseTo(1, 12);
    expect((fit.coefficients[1] ?? 0) * 1e15).toBeCloseTo(2, 12);
  });

  it("throws on a column that repeats another, rather than returning noise", () => {
    expect(() =>
      leastSquares(
        matrixFromColumns([
          [1, 1, 1],
          [0, 0, 0],
        ]),
        [1, 2, 3],
      ),
    ).toThrow(RangeError);
  });
});

describe("QR", () => {
  it("has orthonormal columns and multiplies back", () => {
    const a = matrixFromColumns([
      [1, 2, 3, 4],
      [2, 0, -1, 5],
      [0.5, 1, 1, 1],
    ]);
    const { q, r } = householderQr(a);
    for (let i = 0; i < 3; i++) {
      for (let j = 0; j < 3; j++)
        expect(dot(columnOf(q, i), columnOf(q, j))).toBeCloseTo(i === j ? 1 : 0, 14);
      times(q, columnOf(r, i)).forEach((value, row) => {
        expect(value).toBeCloseTo(entry(a, row, i), 13);
      });
    }
  });

  it("refuses a wide matrix", () => {
    expect(() => householderQr(matrixFromColumns([[1], [2]]))).toThrow(RangeError);
  });
});

describe("singular values", () => {
  it("of a known matrix: [[3, 0], [4, 5]] has √45 and √5", () => {
    const { values } = singularValues(
      matrixFromColumns([
        [3, 4],
        [0, 5],
      ]),
    );
    expect(values[0]).toBeCloseTo(Math.sqrt(45), 13);
    expect(values[1]).toBeCloseTo(Math.sqrt(5), 13);
  });

  it("tells rank and null direction", () => {
    const a = matrixFromColumns([
      [1, 2, 3],
      [2, 4, 6],
      [0, 1, 0],
    ]);
    const decomposition = singularValues(a);
    expect(rankOf(decomposition, 1e-9)).toBe(2);
    const direction = columnOf(decomposition.v, 2);
    expect((direction[0] ?? 0) / (direction[1] ?? 1)).toBeCloseTo(-2, 12);
    times(a, direction).forEach((value) => {
      expect(value).toBeCloseTo(0, 13);
    });
  });

  it("takes a matrix with fewer rows than columns", () => {
    expect(rankOf(singularValues(matrixFromColumns([[1], [2], [3]])), 1e-9)).toBe(1);
  });
});
