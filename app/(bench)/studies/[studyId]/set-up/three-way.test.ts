import { describe, expect, it } from "vitest";
import { emptySetUpForm } from "../../_set-up/set-up-form";
import { contestedBoxes, mineOverTheirs, sameForm } from "./three-way";

const base = { ...emptySetUpForm, name: "Hydrolysis", temperature: "25.0 ± 0.1", solvent: "water" };

describe("two people change a set-up", () => {
  const mine = { ...base, temperature: "26.0 ± 0.1", solvent: "water, 1 % acetonitrile" };
  const theirs = { ...base, temperature: "24.0 ± 0.1", name: "Alkaline hydrolysis" };

  it("names only the boxes that clash, with both values", () => {
    expect(contestedBoxes(base, mine, theirs)).toEqual([
      {
        path: "temperature",
        name: "Temperature",
        base: "25.0 ± 0.1",
        mine: "26.0 ± 0.1",
        theirs: "24.0 ± 0.1",
      },
    ]);
  });

  it("lays my changes over theirs and leaves the rest theirs", () => {
    expect(mineOverTheirs(base, mine, theirs)).toEqual({
      ...base,
      name: "Alkaline hydrolysis",
      temperature: "26.0 ± 0.1",
      solvent: "water, 1 % acetonitrile",
    });
  });

  it("takes the same change on both sides for no clash", () => {
    expect(contestedBoxes(base, mine, { ...base, temperature: "26.0 ± 0.1" })).toEqual([]);
    expect(sameForm(base, { ...base, name: " Hydrolysis " })).toBe(true);
    expect(sameForm(base, mine)).toBe(false);
  });
});
