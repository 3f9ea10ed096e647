import { expect, test } from "vitest";
import { layOut } from "./chart";
import { fittedBetween, placeOf, readingAt } from "./reading-at";

const area = layOut(
  { width: 400, height: 300 },
  { kind: "linear", domain: [0, 10] },
  { kind: "linear", domain: [0, 1] },
);
const readings = { time: [1, 2, 3], signal: [0.1, 0.5, 0.2] };

test("a click tells the reading that it is on, and none where it is on none", () => {
  expect(readingAt(readings, area, [area.x(2) + 4, area.y(0.5) - 5])).toBe(1);
  expect(readingAt(readings, area, [area.x(2), area.y(0.9)])).toBeNull();
  expect(readingAt(readings, area, null)).toBeNull();
});

test("a place is told in the drawing's pixels, however large it is drawn", () => {
  const drawing = { getBoundingClientRect: () => ({ left: 10, top: 20, width: 200 }) };
  expect(placeOf({ clientX: 110, clientY: 70 }, drawing, 400)).toEqual([200, 100]);
  expect(placeOf({ clientX: 110, clientY: 70 }, null, 400)).toBeNull();
});

test("a window's points are those that are fitted", () => {
  const choice = { from: 0, to: 0, fromIndex: 3, toIndex: 12, points: 10 };
  expect(fittedBetween({ outside: [0, 1, 3, 4], spikes: [7, 20] }, choice)).toBe(7);
});
