import { describe, expect, it } from "vitest";
import { LABEL_HEIGHT, nameWidth, placeEndLabels, type TraceEnd } from "./end-labels";

const frame = { top: 30, bottom: 300, columnX: 420 };
const end = (x: number, y: number, label = "R01"): TraceEnd => ({ x, y, width: nameWidth(label) });

function overlaps(ends: readonly TraceEnd[], labels: ReturnType<typeof placeEndLabels>): number {
  let count = 0;
  labels.forEach((a, i) => {
    labels.slice(i + 1).forEach((b, j) => {
      const across = a.x < b.x + (ends[i + 1 + j]?.width ?? 0) && b.x < a.x + (ends[i]?.width ?? 0);
      if (across && Math.abs(a.y - b.y) < LABEL_HEIGHT - 1e-9) count += 1;
    });
  });
  return count;
}

describe("placeEndLabels", () => {
  it("leaves names at their ends where none meet", () => {
    const labels = placeEndLabels([end(100, 80), end(100, 200)], frame);
    expect(labels.map((label) => label.y)).toEqual([80, 200]);
    expect(labels.some((label) => label.leader)).toBe(false);
  });

  it("parts names that would cover one another, side by side ends included", () => {
    const ends = [end(300, 100), end(310, 103), end(300, 101), end(330, 99), end(60, 100)];
    const labels = placeEndLabels(ends, frame);
    expect(overlaps(ends, labels)).toBe(0);
    expect(labels[4]?.y).toBe(100);
  });

  it("puts more than twelve names into one column, each with a leader line, none over another", () => {
    const ends = Array.from({ length: 18 }, (_, i) => end(150 + (i % 3) * 60, 120 + i));
    const labels = placeEndLabels(ends, frame);
    expect(labels.every((label) => label.leader && label.x === frame.columnX)).toBe(true);
    expect(overlaps(ends, labels)).toBe(0);
    expect(Math.min(...labels.map((label) => label.y))).toBeGreaterThanOrEqual(frame.top);
    expect(Math.max(...labels.map((label) => label.y))).toBeLessThanOrEqual(frame.bottom + 1e-9);
  });

  it("keeps names in the order of the ends, so that leader lines do not cross", () => {
    const ends = Array.from({ length: 15 }, (_, i) => end(200, 290 - i * 2));
    const places = placeEndLabels(ends, frame).map((label) => label.y);
    expect(places).toEqual(places.toSorted((a, b) => b - a));
  });
});
