import { describe, expect, it } from "vitest";
import { compensatedDot, productError } from "./compensated-dot";
import { amend, powersOf, timesEach, twicePrecise } from "./twice-precision";

describe("a compensated inner product", () => {
  it("keeps what cancellation would lose", () => {
    // 1e16·1 + 1·1 − 1e16·1: plainly 0.
    expect(compensatedDot(Float64Array.of(1e16, 1, -1e16), Float64Array.of(1, 1, 1))).toBe(1);
    // (1 + ε)² − 1 − 2ε = ε²: the rounding of the square itself.
    const e = 2 ** -30;
    expect(compensatedDot(Float64Array.of(1 + e, -1, -2 * e), Float64Array.of(1 + e, 1, 1))).toBe(e * e);
  });

  it("falls back to the plain sum where splitting overflows", () => {
    expect(compensatedDot(Float64Array.of(1e305, 1), Float64Array.of(2, 1))).toBe(2e305);
  });

  it("knows the error of one product exactly", () => {
    const [x, y] = [0.1, 0.3];
    const exact = BigInt(Math.round(x * 2 ** 56)) * BigInt(Math.round(y * 2 ** 56));
    const error = Number(exact - BigInt(x * y * 2 ** 60) * 2n ** 52n) / 2 ** 112;
    expect(productError(x, y, x * y)).toBe(error);
  });
});

describe("numbers in twice the precision", () => {
  it("take a correction far below their last digit", () => {
    const number = twicePrecise([1]);
    amend(number, 0, 1e-20);
    amend(number, 0, 1e-20);
    expect(number.values[0]).toBe(1);
    expect(number.remainders[0]).toBeCloseTo(2e-20, 35);
  });

  it("multiply with the rounding kept", () => {
    const e = 2 ** -30;
    const square = timesEach(twicePrecise([1 + e]), [1 + e]);
    expect(square.values[0]).toBe(1 + 2 * e);
    expect(square.remainders[0]).toBe(e * e);
  });

  it("make the columns of a polynomial", () => {
    const columns = powersOf([2, -3], 3);
    expect(columns.map(({ values }) => Array.from(values))).toEqual([
      [1, 1],
      [2, -3],
      [4, 9],
      [8, -27],
    ]);
    // The doubles are 0.1 + 5.551…e-18 and 0.01 + 2.08…e-19, so the square of one is this far from the other.
    const [, , square] = powersOf([0.1], 2);
    const expected = 2 * 0.1 * 5.551115123125783e-18 - 2.08166817117217e-19;
    expect((square?.values[0] ?? 0) - 0.01 + (square?.remainders[0] ?? 0)).toBeCloseTo(expected, 30);
  });
});
