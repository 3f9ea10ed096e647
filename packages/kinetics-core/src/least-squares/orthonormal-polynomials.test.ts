import { columnOf, leastSquares, matrixFromColumns } from "kinetics-core/linear-algebra";
import { describe, expect, it } from "vitest";
import {
  orthonormalPolynomials,
  plainCoefficients,
  polynomialsAt,
  projectOn,
} from "./orthonormal-polynomials";

const even = Float64Array.from({ length: 50 }, (_, i) => i * 2.5);
/** Readings that start dense and end sparse, over three decades. */
const geometric = Float64Array.from({ length: 40 }, (_, i) => 0.1 * 10 ** ((3 * i) / 39));

describe.each([
  ["evenly spaced", even],
  ["geometrically spaced", geometric],
])("orthonormal polynomials on %s readings", (_, time) => {
  const basis = orthonormalPolynomials(time, 0, time.length, 6);

  it("are orthonormal", () => {
    for (let j = 0; j <= 6; j++) {
      for (let k = 0; k <= j; k++) {
        let product = 0;
        for (let i = 0; i < time.length; i++) {
          product += Number(basis.columns[j * time.length + i]) * Number(basis.columns[k * time.length + i]);
        }
        expect(product).toBeCloseTo(j === k ? 1 : 0, 10);
      }
    }
  });

  it("evaluate away from the points as they do on them", () => {
    const i = 17;
    const { values } = polynomialsAt(basis.recurrence, Number(time[i]));
    values.forEach((value, j) => {
      expect(value).toBeCloseTo(Number(basis.columns[j * time.length + i]), 12);
    });
  });

  it("differentiate", () => {
    const at = Number(time[20]);
    const step = 1e-5 * at;
    const { derivatives } = polynomialsAt(basis.recurrence, at);
    const ahead = polynomialsAt(basis.recurrence, at + step).values;
    const behind = polynomialsAt(basis.recurrence, at - step).values;
    derivatives.forEach((derivative, j) => {
      const numeric = (Number(ahead[j]) - Number(behind[j])) / (2 * step);
      expect(derivative).toBeCloseTo(numeric, 6);
    });
  });

  it("give the coefficients that Householder QR gives", () => {
    const signal = time.map((t) => Math.exp(-t / 40) + 0.01 * Math.sin(7 * t));
    const projections = projectOn(basis, signal, 0).slice(0, 4);
    const coefficients = plainCoefficients(basis.recurrence, projections);
    const scaled = Array.from({ length: 4 }, (_, j) => time.map((t) => (t / 100) ** j));
    const { coefficients: expected } = leastSquares(matrixFromColumns(scaled), signal);
    coefficients.forEach((coefficient, j) => {
      expect((coefficient * 100 ** j) / Number(expected[j])).toBeCloseTo(1, 9);
    });
    expect(columnOf(matrixFromColumns(scaled), 0)).toHaveLength(time.length);
  });
});

describe("a part of the readings", () => {
  it("gives the basis of that part alone", () => {
    const part = orthonormalPolynomials(even, 10, 30, 3);
    const alone = orthonormalPolynomials(even.slice(10, 30), 0, 20, 3);
    expect([...part.columns]).toEqual([...alone.columns]);
  });

  it("refuses a degree that the points cannot carry", () => {
    expect(() => orthonormalPolynomials(even, 0, 3, 3)).toThrow(RangeError);
  });
});
