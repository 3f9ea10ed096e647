import { describe, expect, it } from "vitest";
import { integrate } from "./adaptive-quadrature";

function integral(f: (u: number) => number, from: number, to: number): number {
  const sums = new Float64Array(1);
  const ended = integrate(
    (u, into) => {
      into[0] = f(u);
      return Number.isFinite(into[0]);
    },
    from,
    to,
    sums,
  );
  return ended ? (sums[0] ?? Number.NaN) : Number.NaN;
}

describe("adaptive quadrature", () => {
  it("is exact for polynomials up to the degree of the Kronrod rule", () => {
    for (let degree = 0; degree <= 22; degree++) {
      const exact = (1 - (-2) ** (degree + 1)) / (degree + 1);
      expect(integral((u) => u ** degree, -2, 1) / exact).toBeCloseTo(1, 13);
    }
  });

  it("finds smooth, steep and peaked integrals to ten digits", () => {
    expect(integral((u) => Math.exp(-u), 0, 30)).toBeCloseTo(1 - Math.exp(-30), 12);
    expect(integral((u) => 1 / (1e-4 + u * u), -1, 1) / (200 * Math.atan(100))).toBeCloseTo(1, 10);
    expect(integral((u) => 1 / Math.sqrt(u), 0, 1)).toBeCloseTo(2, 6);
  });

  it("says where an integrand has no value", () => {
    expect(integral((u) => Math.log(u - 0.5), 0, 1)).toBeNaN();
  });

  it("adds to what is there, function by function", () => {
    const sums = Float64Array.of(1, 0);
    integrate(
      (u, into) => {
        into[0] = 1;
        into[1] = u;
        return true;
      },
      0,
      2,
      sums,
    );
    expect([...sums]).toEqual([expect.closeTo(3, 13), expect.closeTo(2, 13)]);
  });
});
