import { expect, test } from "vitest";
import { timeOfKey, timeStep } from "./time-step";

test("a step of time zero is a tenth of the distance between readings, as a power of ten", () => {
  expect(timeStep([0, 1, 2, 3])).toBeCloseTo(0.1, 12);
  expect(timeStep([0, 0.5, 1])).toBeCloseTo(0.01, 12);
  expect(timeStep([0, 30, 60])).toBeCloseTo(1, 12);
  expect(timeStep([5])).toBe(1);
});

test("arrows go one step, with Shift ten", () => {
  expect(timeOfKey("ArrowLeft", false, 2, 0.1)).toBeCloseTo(1.9, 12);
  expect(timeOfKey("ArrowUp", true, 2, 0.1)).toBeCloseTo(3, 12);
  expect(timeOfKey("Tab", false, 2, 0.1)).toBeNull();
});
