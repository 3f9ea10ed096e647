import { describe, expect, it } from "vitest";
import { decimate } from "./decimate";

/** A repeatable sequence in [0, 1): the minimal standard generator of Park and Miller (1988). */
function generator(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 16807) % 2147483647;
    return state / 2147483647;
  };
}

const readings = 20_000;
const columns = 300;
const next = generator(20260);
const x = Array.from({ length: readings }, (_, i) => i * 0.05);
const y = Array.from({ length: readings }, () => next());

describe("decimate", () => {
  const thin = decimate(x, y, columns);

  it("keeps the lowest and highest reading of every pixel column", () => {
    const perColumn = ((x.at(-1) ?? 0) - (x[0] ?? 0)) / columns;
    const columnOf = (value: number) => Math.min(columns - 1, Math.floor((value - (x[0] ?? 0)) / perColumn));
    const extremes = (xs: readonly number[], ys: readonly number[]) => {
      const found = new Map<number, [number, number]>();
      xs.forEach((value, i) => {
        const reading = ys[i] ?? 0;
        const [low, high] = found.get(columnOf(value)) ?? [reading, reading];
        found.set(columnOf(value), [Math.min(low, reading), Math.max(high, reading)]);
      });
      return found;
    };
    expect(extremes(thin.x, thin.y)).toEqual(extremes(x, y));
  });

  it("keeps a spike of one reading", () => {
    const spiked = y.with(12_345, 99);
    expect(decimate(x, spiked, columns).y).toContain(99);
  });

  it("keeps at most four readings a column, first and last of all, in their order", () => {
    expect(thin.x.length).toBeLessThanOrEqual(columns * 4);
    expect(thin.x[0]).toBe(x[0]);
    expect(thin.x.at(-1)).toBe(x.at(-1));
    for (let i = 1; i < thin.x.length; i += 1) expect(thin.x[i]).toBeGreaterThan(thin.x[i - 1] ?? 0);
  });

  it("invents nothing: every kept pair is a reading", () => {
    const readingAt = new Map(x.map((value, i) => [value, y[i]]));
    thin.x.forEach((value, i) => {
      expect(readingAt.get(value)).toBe(thin.y[i]);
    });
  });

  it("gives a short trace back whole", () => {
    expect(decimate([0, 1, 2], [3, 4, 5], 300)).toEqual({ x: [0, 1, 2], y: [3, 4, 5] });
  });
});
