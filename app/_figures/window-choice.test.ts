import { describe, expect, it } from "vitest";
import {
  choiceBetween,
  gripLimits,
  moveGrip,
  nearestReading,
  readingAfterKey,
  timeDecimals,
} from "./window-choice";

const time = Array.from({ length: 50 }, (_, i) => 0.5 + i * 0.5);

describe("a window over readings", () => {
  it("counts both ends", () => {
    expect(choiceBetween(time, 3, 12)).toEqual({ fromIndex: 3, toIndex: 12, from: 2, to: 6.5, points: 10 });
  });

  it("finds the nearest reading, also outside the trace", () => {
    expect(nearestReading(time, 2.2)).toBe(3);
    expect(nearestReading(time, 2.3)).toBe(4);
    expect(nearestReading(time, -9)).toBe(0);
    expect(nearestReading(time, 999)).toBe(49);
  });

  it("keeps the fewest points between its grips, whichever is moved", () => {
    const choice = choiceBetween(time, 10, 20);
    expect(moveGrip(time, choice, "from", 40, 5)).toMatchObject({ fromIndex: 16, toIndex: 20, points: 5 });
    expect(moveGrip(time, choice, "to", 0, 5)).toMatchObject({ fromIndex: 10, toIndex: 14, points: 5 });
    expect(moveGrip(time, choice, "to", 500, 5).toIndex).toBe(49);
  });

  it("follows the keys of a slider", () => {
    const limits = gripLimits("to", choiceBetween(time, 10, 20), time.length, 5);
    expect(readingAfterKey("ArrowRight", false, 20, limits)).toBe(21);
    expect(readingAfterKey("ArrowLeft", true, 20, limits)).toBe(10);
    expect(readingAfterKey("Home", false, 20, limits)).toBe(14);
    expect(readingAfterKey("End", false, 20, limits)).toBe(49);
    expect(readingAfterKey("a", false, 20, limits)).toBeNull();
  });

  it("prints times with the decimals that tell readings apart", () => {
    expect(timeDecimals(time)).toBe(1);
    expect(timeDecimals([0, 60, 120])).toBe(0);
    expect(timeDecimals([0, 0.005, 0.01])).toBe(3);
  });
});
