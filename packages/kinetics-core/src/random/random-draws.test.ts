import { describe, expect, it } from "vitest";
import { randomDraws } from "./random-draws";

describe("random draws", () => {
  it("repeat for the same seed and differ for its neighbour", () => {
    const draw = (seed: number) => {
      const draws = randomDraws(seed);
      return Array.from({ length: 5 }, () => draws.normal());
    };
    expect(draw(7)).toEqual(draw(7));
    expect(draw(7)).not.toEqual(draw(8));
  });

  it("have the mean and variance of their distribution, and none from neighbouring seeds", () => {
    const first = Array.from({ length: 4000 }, (_, seed) => randomDraws(seed).normal());
    const mean = first.reduce((sum, x) => sum + x, 0) / first.length;
    const variance = first.reduce((sum, x) => sum + (x - mean) ** 2, 0) / first.length;
    const lag = first.slice(1).reduce((sum, x, i) => sum + (x - mean) * ((first[i] ?? 0) - mean), 0);
    expect(Math.abs(mean)).toBeLessThan(4 / Math.sqrt(first.length));
    expect(Math.abs(variance - 1)).toBeLessThan(4 * Math.sqrt(2 / first.length));
    expect(Math.abs(lag / first.length)).toBeLessThan(4 / Math.sqrt(first.length));
  });

  it("pick whole numbers from the whole range and never its end", () => {
    const draws = randomDraws(3);
    const picked = new Set(Array.from({ length: 400 }, () => draws.whole(5)));
    expect([...picked].sort()).toEqual([0, 1, 2, 3, 4]);
  });
});
