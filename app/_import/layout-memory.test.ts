import { expect, test } from "vitest";
import { headingHash, layoutOf, offeredLayout } from "./layout-memory";
import { read } from "./testing-corpus";

test("a heading is known again in another file, whatever that file holds and however it was corrected", () => {
  const hash = headingHash(read("comma-point.csv"));
  expect(hash).toMatch(/^[0-9a-f]{64}$/);
  expect(headingHash(read("comma-point.csv", { columns: { "1": "left-out" } }))).toBe(hash);
  expect(headingHash(read("windows-1252.csv"))).not.toBe(hash);
  expect(headingHash(read("no-header.csv"))).toBeNull();
});

test("columns, units and marks are remembered, cells, lines, labels and species are not", () => {
  expect(
    layoutOf({
      timeUnit: "min",
      columns: { "1": "left-out", "2": "species:a" },
      cells: [{ line: 3, column: 1, as: 0.2 }],
      labels: { c1: "R7" },
      linesLeftOut: [4],
      lastDataLine: 9,
    }),
  ).toEqual({ timeUnit: "min", columns: { "1": "left-out" } });
  expect(layoutOf({ labels: { c1: "R7" } })).toBeNull();
});

test("a layout is offered once, and never where something was said already", () => {
  const remembered = { timeUnit: "min" };
  expect(offeredLayout(remembered, {})).toEqual(remembered);
  expect(offeredLayout(remembered, { labels: { c1: "R7" } })).toEqual(remembered);
  expect(offeredLayout(remembered, { timeUnit: "s" })).toBeNull();
  expect(offeredLayout({ timeUnit: "fortnight" }, {})).toBeNull();
});
