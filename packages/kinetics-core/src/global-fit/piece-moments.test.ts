import { describe, expect, it } from "vitest";
import { ColumnSums } from "./column-sums";
import { PieceMoments, uniformPowers } from "./piece-moments";

describe("moments of a piece", () => {
  it.each([1, 2, 3, 17, 1000])("are in closed form what they are point by point, for %d points", (points) => {
    const powers = new Float64Array(9);
    uniformPowers(points, -0.4, 0.9 / points, powers);
    for (let m = 0; m <= 8; m++) {
      let sum = 0;
      for (let i = 0; i < points; i++) sum += (-0.4 + (0.9 * i) / points) ** m;
      expect(powers[m]).toBeCloseTo(sum, 9);
    }
  });

  it("give the sums and products of columns, and the lag across pieces, as a loop over the points does", () => {
    const time = Float64Array.from({ length: 50 }, (_, i) => 0.3 * i + 0.05 * Math.sin(i));
    const signal = time.map((t, i) => Math.cos(t) + 0.1 * Math.sin(9 * i));
    const pieces = [
      { from: 0, until: 20, model: [0.5, 0.2, 0, 0.1, 0], column: [1, -1, 0.5, 0, 2] },
      { from: 20, until: 50, model: [0.1, -0.2, 0.3, 0, 0.4], column: [0, 2, 0, 1, -1] },
    ];
    const moments = new PieceMoments();
    const sums = new ColumnSums(2);
    const residual: number[] = [];
    const column: number[] = [];
    for (const piece of pieces) {
      const rate = 1 / 15;
      const origin = 0.5;
      sums.polynomials.set(piece.column, 5);
      const { from, until } = piece;
      moments.take(time, signal, from, until, rate, origin, Float64Array.from(piece.model), from > 0, 0);
      sums.add(moments);
      for (let i = from; i < until; i++) {
        const v = (time[i] ?? 0) * rate - origin;
        residual.push((signal[i] ?? 0) - polynomial(piece.model, v));
        column.push(polynomial(piece.column, v));
      }
    }
    const dot = (a: readonly number[], b: readonly number[]) =>
      a.reduce((sum, value, i) => sum + value * (b[i] ?? 0), 0);
    expect(sums.products[0]).toBeCloseTo(dot(residual, residual), 12);
    expect(sums.products[1]).toBeCloseTo(dot(residual, column), 12);
    expect(sums.products[3]).toBeCloseTo(dot(column, column), 12);
    expect(sums.sums[1]).toBeCloseTo(
      column.reduce((sum, value) => sum + value, 0),
      12,
    );
    const mean = residual.reduce((sum, value) => sum + value, 0) / 50;
    const centred = residual.map((value) => value - mean);
    expect(sums.lagOne()).toBeCloseTo(dot(centred.slice(1), centred) / dot(centred, centred), 12);
  });
});

function polynomial(coefficients: readonly number[], v: number): number {
  return coefficients.reduceRight((value, coefficient) => value * v + coefficient, 0);
}
