import { describe, expect, it } from "vitest";
import { nearestSimpleOrder, readSimpleOrder } from "./simple-orders";

const order = (estimate: number, half: number | null) => ({
  estimate,
  standardError: half,
  interval: half === null ? null : ([estimate - half, estimate + half] as const),
  level: 0.95,
});

describe("the nearest simple order", () => {
  it.each([
    [0.97, 1],
    [1.3, 1.5],
    [0.74, 0.5],
    [0.75, 1],
    [0.25, 0],
    [1.75, 2],
    [2.6, 3],
    [-0.3, -0.5],
    [-7, -1],
    [4, 3],
  ])("of %d is %d, the whole one of two equally close", (value, nearest) => {
    expect(nearestSimpleOrder(value)).toBe(nearest);
  });
});

describe("what may be said of it", () => {
  it("'is' needs an interval that contains it, excludes every other and is narrow", () => {
    expect(readSimpleOrder(order(0.965, 0.049), false)).toBe("is");
    expect(readSimpleOrder(order(0.98, 0.24), false)).toBe("is");
    expect(readSimpleOrder(order(1.02, 0.26), false)).toBe("consistent");
    expect(readSimpleOrder(order(0.8, 0.31), false)).toBe("consistent");
    // Around 2.6 the simple orders are sparse: narrow enough is a condition of its own.
    expect(readSimpleOrder(order(2.9, 0.3), false)).toBe("consistent");
  });

  it("an interval that excludes it, or none at all, leaves it the nearest", () => {
    expect(readSimpleOrder(order(0.9, 0.05), false)).toBe("nearest");
    expect(readSimpleOrder(order(1, null), false)).toBe("nearest");
  });

  it("without an estimate nothing is said", () => {
    const nothing = { estimate: null, standardError: null, interval: null, level: 0.95 };
    expect(readSimpleOrder(nothing, false)).toBe("undetermined");
  });

  it("an exact table is compared with a tolerance of 1e-9, and no more", () => {
    expect(readSimpleOrder(order(1 + 5e-15, 1e-15), true)).toBe("is");
    expect(readSimpleOrder(order(1 + 5e-15, 1e-15), false)).toBe("nearest");
    expect(readSimpleOrder(order(1 + 1e-6, 1e-15), true)).toBe("nearest");
  });
});
