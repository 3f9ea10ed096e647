import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { feasibleSet, isFeasible, recipeGrid, refineRecipe } from "./feasible-set";

const stocks = [
  { species: "A", concentration: 0.1, leastVolume: 0.1, mostVolume: 3 },
  { species: "B", concentration: 0.5, leastVolume: 0.1, mostVolume: 3 },
];

describe("what can be mixed", () => {
  it("follows from stocks, volumes and the linear range", () => {
    const result = feasibleSet({ stocks, totalVolume: 3, limits: { A: [0.005, 0.04] } });
    expect(result).toMatchObject({
      status: "feasible",
      set: { ranges: { A: [0.005, 0.04], B: [expect.closeTo(0.5 / 30, 12), 0.5] } },
    });
  });

  it("never overfills: every recipe of the grid and every refined one fits the volume", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.01, max: 1, noNaN: true }),
        fc.double({ min: 0.5, max: 3, noNaN: true }),
        fc.double({ min: -2, max: 2, noNaN: true }),
        (concentration, most, weight) => {
          const result = feasibleSet({
            stocks: [{ species: "A", concentration, leastVolume: 0.1, mostVolume: most }, ...stocks.slice(1)],
            totalVolume: 3,
          });
          if (result.status !== "feasible") throw new Error(result.message);
          const { set } = result;
          const grid = recipeGrid(set);
          expect(grid.length).toBeGreaterThan(10);
          expect(grid.every((recipe) => isFeasible(set, recipe))).toBe(true);
          const start = grid[0] ?? {};
          const refined = refineRecipe(set, start, ({ A = 0, B = 0 }) => Math.log(A) * weight + Math.log(B));
          expect(isFeasible(set, refined.recipe)).toBe(true);
        },
      ),
      { numRuns: 30 },
    );
  });

  it("slides along the limit of the volume to its best: two stocks that fill the vessel by halves", () => {
    const result = feasibleSet({ stocks, totalVolume: 3 });
    if (result.status !== "feasible") throw new Error(result.message);
    // A·B is greatest on the limit A/0.1 + B/0.5 = 1 at half a vessel of each.
    const refined = refineRecipe(result.set, { A: 0.01, B: 0.05 }, ({ A = 0, B = 0 }) => Math.log(A * B));
    expect(Math.abs(Number(refined.recipe.A) / 0.05 - 1)).toBeLessThan(0.02);
    expect(Math.abs(Number(refined.recipe.B) / 0.25 - 1)).toBeLessThan(0.02);
  });

  it.each([
    [{ stocks, totalVolume: 0 }, "totalVolume"],
    [{ stocks, totalVolume: 0.15 }, "totalVolume"],
    [{ stocks, totalVolume: 3, limits: { A: [0.2, 0.3] as const } }, "stocks.0"],
    [
      { stocks: [{ species: "A", concentration: 1, leastVolume: 2, mostVolume: 1 }], totalVolume: 3 },
      "stocks.0",
    ],
  ])("says what cannot be mixed: %#", (request, place) => {
    expect(feasibleSet(request)).toMatchObject({
      status: "nothing-feasible",
      place,
      message: expect.stringMatching(/\w/),
    });
  });
});
