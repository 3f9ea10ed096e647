import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { fitLinear, type LinearFit, type LinearSolution } from "./fit-linear";

function fitted(fit: LinearFit): LinearSolution {
  if (fit.status !== "fitted") throw new Error(`${fit.status}: ${fit.message}`);
  return fit;
}

const X = [1, 2, 3, 4, 5, 6];
const Y = [2.1, 3.9, 6.2, 7.8, 10.1, 11.9];
const ONES = X.map(() => 1);

describe("a linear fit", () => {
  it("is the textbook straight line", () => {
    const fit = fitted(fitLinear([ONES, X], Y));
    // Sxx = 17.5, Sxy = 34.6, means 3.5 and 7.
    expect(fit.coefficients[1]).toBeCloseTo(34.6 / 17.5, 14);
    expect(fit.coefficients[0]).toBeCloseTo(7 - (3.5 * 34.6) / 17.5, 14);
    const squares = Y.reduce((sum, y, i) => sum + (y - 7 - (34.6 / 17.5) * ((X[i] ?? 0) - 3.5)) ** 2, 0);
    expect(fit.residualSquares).toBeCloseTo(squares, 14);
    expect(fit.standardDeviations?.[1]).toBeCloseTo(Math.sqrt(squares / 4 / 17.5), 14);
    expect(fit.unscaledCovariance[0]?.[0]).toBeCloseTo(1 / 6 + 3.5 ** 2 / 17.5, 14);
    expect(fit.rSquared).toBeCloseTo(34.6 ** 2 / 17.5 / Y.reduce((sum, y) => sum + (y - 7) ** 2, 0), 14);
  });

  it("takes a whole weight as so many equal points", () => {
    const weights = [1, 3, 2, 1, 1, 2];
    const repeat = (values: readonly number[]) => values.flatMap((value, i) => Array(weights[i]).fill(value));
    const weighted = fitted(fitLinear([ONES, X], Y, { weights }));
    const repeated = fitted(fitLinear([repeat(ONES), repeat(X)], repeat(Y)));
    weighted.coefficients.forEach((value, j) => {
      expect(value).toBeCloseTo(repeated.coefficients[j] ?? Number.NaN, 14);
      expect(weighted.unscaledCovariance[j]?.[j]).toBeCloseTo(repeated.unscaledCovariance[j]?.[j] ?? 0, 14);
    });
    expect(weighted.residualSquares).toBeCloseTo(repeated.residualSquares, 14);
    expect(weighted.rSquared).toBeCloseTo(repeated.rSquared ?? Number.NaN, 14);
    expect(weighted.residuals[1]).toBeCloseTo(repeated.residuals[1] ?? Number.NaN, 14);
  });

  it("gives coefficients and no scatter where every point is used up", () => {
    const fit = fitted(fitLinear([ONES.slice(0, 2), X.slice(0, 2)], Y.slice(0, 2)));
    expect(fit.coefficients[1]).toBeCloseTo(1.8, 14);
    expect(fit).toMatchObject({
      degreesOfFreedom: 0,
      residualStandardDeviation: null,
      covariance: null,
      standardDeviations: null,
    });
  });

  it("has no R² for a response that does not vary", () => {
    expect(fitted(fitLinear([ONES, X], ONES)).rSquared).toBeNull();
  });

  it("keeps columns of very different size apart", () => {
    const fit = fitted(
      fitLinear(
        [ONES.map(() => 1e-120), X.map((x) => x * 1e120)],
        X.map((x) => 1 + 2 * x),
      ),
    );
    expect((fit.coefficients[0] ?? 0) * 1e-120).toBeCloseTo(1, 13);
    expect((fit.coefficients[1] ?? 0) * 1e120).toBeCloseTo(2, 13);
  });

  it.each([
    ["a column that repeats another", [ONES, X, X.map((x) => 2 * x)], Y, {}, "dependent-columns", /1, 2/],
    ["a column of zeros", [ONES, X.map(() => 0)], Y, {}, "dependent-columns", /Column 1/],
    ["too few points", [ONES, X].map((c) => c.slice(0, 1)), [1], {}, "too-few-points", /1 points for 2/],
    ["no column", [], Y, {}, "bad-input", /no column/],
    ["a short column", [ONES, [1, 2]], Y, {}, "bad-input", /column 1 has 2 values/],
    [
      "a value that is no number",
      [ONES, X],
      [...Y.slice(1), Number.NaN],
      {},
      "bad-input",
      /response holds NaN at place 5/,
    ],
    [
      "a column too small to square",
      [ONES, X.map((x) => x * 1e-160)],
      Y,
      {},
      "bad-input",
      /column 1 has values of up to 6e-160/,
    ],
    [
      "a weight of zero",
      [ONES, X],
      Y,
      { weights: [1, 1, 0, 1, 1, 1] },
      "bad-input",
      /weights holds 0 at place 2/,
    ],
  ] as const)("refuses %s", (_, columns, response, options, status, sentence) => {
    const fit = fitLinear(columns, response, options);
    expect(fit.status).toBe(status);
    expect("message" in fit && fit.message).toMatch(sentence);
  });
});

describe("any linear fit", () => {
  const value = fc.integer({ min: -10_000, max: 10_000 }).map((whole) => whole / 1000);
  const rows = fc.array(fc.tuple(value, value, value), { minLength: 6, maxLength: 12 });
  const fitOf = (
    data: readonly (readonly [number, number, number])[],
    unit = 1,
    weights?: readonly number[],
  ) =>
    fitLinear(
      [data.map(() => 1), data.map(([x]) => x * unit), data.map(([, z]) => z)],
      data.map(([, , y]) => y),
      {
        ...(weights && { weights }),
      },
    );

  it("scales a coefficient against its column, and is the same in another order", () => {
    fc.assert(
      fc.property(rows, fc.integer({ min: -40, max: 40 }), fc.boolean(), (data, exponent, backwards) => {
        const plain = fitOf(data);
        const other = fitOf(backwards ? [...data].reverse() : data, 2 ** exponent);
        expect(other.status).toBe(plain.status);
        if (plain.status !== "fitted" || other.status !== "fitted") return;
        const [slope, scaled] = [plain.coefficients[1] ?? 0, (other.coefficients[1] ?? 0) * 2 ** exponent];
        expect(Math.abs(scaled - slope)).toBeLessThanOrEqual(
          1e-12 * (plain.standardDeviations?.[1] ?? 0) + 1e-12 * Math.abs(slope),
        );
      }),
      { numRuns: 200, seed: 21 },
    );
  });

  it("leaves residuals without a component along any column, weighted or not, and no NaN", () => {
    fc.assert(
      fc.property(
        rows,
        fc.array(fc.double({ min: 0.01, max: 100, noNaN: true }), { minLength: 12, maxLength: 12 }),
        (data, twelve) => {
          const weights = data.map((_, i) => twelve[i] ?? 1);
          const fit = fitOf(data, 1, weights);
          if (fit.status !== "fitted") return;
          const size = Math.sqrt(fit.residualSquares) * 1000;
          for (const column of [data.map(() => 1), data.map(([x]) => x), data.map(([, z]) => z)]) {
            const along = column.reduce(
              (sum, x, i) => sum + x * (weights[i] ?? 0) * (fit.residuals[i] ?? 0),
              0,
            );
            expect(Math.abs(along)).toBeLessThanOrEqual(1e-13 * size + 1e-11);
          }
          expect(
            [...fit.coefficients, ...(fit.standardDeviations ?? []), fit.rSquared ?? 0].every(
              Number.isFinite,
            ),
          ).toBe(true);
        },
      ),
      { numRuns: 200, seed: 22 },
    );
  });

  it("is refused or finite, however small the numbers", () => {
    const wild = fc.array(
      fc.array(fc.double({ min: -10, max: 10, noNaN: true }), { minLength: 3, maxLength: 3 }),
      {
        minLength: 1,
        maxLength: 8,
      },
    );
    fc.assert(
      fc.property(wild, (data) => {
        const fit = fitOf(data.map(([x = 0, z = 0, y = 0]) => [x, z, y]));
        expect(JSON.parse(JSON.stringify(fit.status === "fitted" ? fit.unscaledCovariance : []))).toEqual(
          fit.status === "fitted" ? fit.unscaledCovariance : [],
        );
        if (fit.status === "fitted")
          expect(
            [...fit.coefficients, ...fit.residuals, ...(fit.standardDeviations ?? [])].every(Number.isFinite),
          ).toBe(true);
      }),
      { numRuns: 300, seed: 23 },
    );
  });
});
