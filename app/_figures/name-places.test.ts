import { describe, expect, it } from "vitest";
import { boxesAlong, placeNames } from "./name-places";

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
