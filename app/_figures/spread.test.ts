import { describe, expect, it } from "vitest";
import { spreadApart } from "./spread";

describe("spreadApart", () => {
  it("leaves labels where they wish when none touch", () => {
    expect(spreadApart([10, 100, 50], 14, 0, 200)).toEqual([10, 100, 50]);
  });

  it("moves two that touch by the same amount, in their order", () => {
    expect(spreadApart([54, 50], 14, 0, 200)).toEqual([59, 45]);
  });

  it("keeps the gap between all neighbours and stays inside the frame, however crowded", () => {
    const wishes = Array.from({ length: 14 }, (_, i) => 100 + ((i * 7) % 5));
    const places = spreadApart(wishes, 14, 0, 200).toSorted((a, b) => a - b);
    expect(places[0]).toBeGreaterThanOrEqual(0);
    expect(places.at(-1)).toBeLessThanOrEqual(200 + 1e-9);
    for (let i = 1; i < places.length; i += 1) {
      expect((places[i] ?? 0) - (places[i - 1] ?? 0)).toBeGreaterThanOrEqual(14 - 1e-9);
    }
  });

  it("moves as little as can be: no other placing with the gap has a smaller sum of squares", () => {
    const wishes = [20, 22, 60, 61, 63];
    const cost = (places: readonly number[]) =>
      places.reduce((sum, place, i) => sum + (place - (wishes[i] ?? 0)) ** 2, 0);
    const best = cost(spreadApart(wishes, 14, -500, 500));
    // Every placing on a lattice of 1 px around the wishes that keeps the order and the gap.
    let least = Number.POSITIVE_INFINITY;
    const walk = (chosen: number[]) => {
      const rank = chosen.length;
      if (rank === wishes.length) {
        least = Math.min(least, cost(chosen));
        return;
      }
      const wish = wishes[rank] ?? 0;
      for (let place = wish - 30; place <= wish + 30; place += 1) {
        if (rank === 0 || place - (chosen[rank - 1] ?? 0) >= 14) walk([...chosen, place]);
      }
    };
    walk([]);
    expect(best).toBeLessThanOrEqual(least + 1e-9);
    expect(least - best).toBeLessThan(1.5);
  }, 60_000);
});
