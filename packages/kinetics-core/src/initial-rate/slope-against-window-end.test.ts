import { describe, expect, it } from "vitest";
import { estimateInitialRate } from "./estimate-initial-rate";
import { slopeAgainstWindowEnd } from "./slope-against-window-end";

const time = Array.from({ length: 200 }, (_, i) => 5 + i / 2);
const signal = time.map((t) => -Math.expm1(-(t - 5) / 40) + 1e-3 * Math.sin(t * t));

describe("the slope against the end of its window", () => {
  const slopes = slopeAgainstWindowEnd({ time, signal }, { timeZero: 5 });

  it("is the straight line's on each window by hand", () => {
    for (const { end, slope, standardError } of slopes.filter((_, i) => i % 7 === 0)) {
      const byHand = estimateInitialRate(
        { time, signal },
        { timeZero: 5, estimator: "straight", window: [5, end] },
      );
      if (byHand.status !== "found") throw new Error(byHand.message);
      expect(slope).toBe(byHand.slope);
      expect(standardError).toBe(byHand.standardError);
    }
  });

  it("grows to the whole trace, from eight readings on", () => {
    const ends = slopes.map(({ end }) => end);
    expect(ends[0]).toBe(time[7]);
    expect(ends.at(-1)).toBe(time.at(-1));
    expect(ends).toEqual([...new Set(ends)].sort((a, b) => a - b));
    expect(slopes.length).toBeGreaterThan(25);
  });

  it("falls for a line on a decelerating trace, and holds for an exponential on an exponential", () => {
    expect(Number(slopes.at(-1)?.slope)).toBeLessThan(0.6 * (1 / 40));
    const exponential = slopeAgainstWindowEnd({ time, signal }, { timeZero: 5, estimator: "exponential" });
    const last = exponential.at(-1);
    expect(Math.abs(Number(last?.slope) - 1 / 40)).toBeLessThan(3 * Number(last?.standardError));
  });

  it("is empty for traces that cannot be used or are too short", () => {
    expect(slopeAgainstWindowEnd({ time: [0, 0, 1], signal: [1, 2, 3] })).toEqual([]);
    expect(slopeAgainstWindowEnd({ time: [0, 1, 2, 3, 4], signal: [0, 1, 2, 3, 4] })).toEqual([]);
  });
});
