import { describe, expect, it } from "vitest";
import { box, boxesAlong, leastCovering, placeNames } from "./name-places";

const area = { left: 40, right: 400, top: 20, bottom: 300 };

describe("placeNames", () => {
  it("puts a lone name right of its mark", () => {
    expect(placeNames([{ x: 100, y: 100 }], ["R01"], { spots: [] }, area)).toEqual([
      { x: 110, y: 104, anchor: "start" },
    ]);
  });

  it("turns to the left at the right edge", () => {
    const [place] = placeNames([{ x: 395, y: 100 }], ["R01"], { spots: [] }, area);
    expect(place?.anchor).toBe("end");
  });

  it("keeps off a line through the mark and off a neighbour", () => {
    const mark = { x: 200, y: 150 };
    const [place] = placeNames(
      [mark],
      ["R04"],
      { spots: [], boxes: boxesAlong({ x: 40, y: 150 }, { x: 400, y: 150 }) },
      area,
    );
    expect(Math.abs((place?.y ?? 0) - 4 - mark.y)).toBeGreaterThan(6);
  });

  it("gives the same places for the same data", () => {
    const marks = Array.from({ length: 9 }, (_, i) => ({ x: 100 + i * 8, y: 100 + (i % 3) * 4 }));
    const names = marks.map((_, i) => `R0${i}`);
    expect(placeNames(marks, names, { spots: [] }, area)).toEqual(
      placeNames(marks, names, { spots: [] }, area),
    );
  });
});

describe("leastCovering", () => {
  const frames = [box(50, 30, 100, 20), box(290, 30, 100, 20), box(290, 270, 100, 20)];

  it("takes the first free frame, and says that it is free", () => {
    expect(leastCovering(frames, [])).toEqual({ index: 0, covered: 0 });
    expect(leastCovering(frames, [box(60, 35, 10, 10)])).toEqual({ index: 1, covered: 0 });
  });

  it("says how much the best one covers where none is free", () => {
    const everywhere = [box(50, 30, 100, 20), box(290, 30, 50, 20), box(290, 270, 100, 10)];
    expect(leastCovering(frames, [...everywhere, box(290, 270, 10, 5)])).toEqual({ index: 1, covered: 1000 });
  });
});
