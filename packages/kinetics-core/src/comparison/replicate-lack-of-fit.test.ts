import { describe, expect, it } from "vitest";
import { replicateLackOfFit } from "./replicate-lack-of-fit";

const recipes = [[1], [1], [2], [2], [4], [4], [4]];

describe("lack of fit against repeated recipes", () => {
  it("is the textbook's F, checked by hand", () => {
    const residuals = [0.1, 0.3, -0.3, -0.1, 0.1, 0, -0.1];
    // Pure error: 0.02 + 0.02 + 0.02 with 4 degrees; in all 0.22; lack 0.16 with 3 − 1 degrees.
    const test = replicateLackOfFit(
      recipes,
      residuals,
      recipes.map(() => 1),
      1,
    );
    expect(test?.degreesOfFreedom).toEqual([2, 4]);
    expect(test?.fStatistic).toBeCloseTo(0.16 / 2 / (0.06 / 4), 12);
    // scipy.stats.f.sf(16/3, 2, 4), SciPy 1.17: (1 + 2·F/4)⁻² in closed form.
    expect(test?.pValue).toBeCloseTo((1 + (2 * 16) / 3 / 4) ** -2, 12);
  });

  it("says nothing of rates entered twice, which differ by rounding alone", () => {
    const residuals = [0.2, 0.2 + 1e-16, -0.2, -0.2, 0.1, 0.1, 0.1];
    expect(
      replicateLackOfFit(
        recipes,
        residuals,
        recipes.map(() => 1),
        1,
      ),
    ).toBeNull();
  });

  it("says nothing without repeats or with as many parameters as recipes", () => {
    expect(replicateLackOfFit([[1], [2], [3]], [1, -1, 0], [1, 1, 1], 1)).toBeNull();
    expect(replicateLackOfFit(recipes, [1, -1, 0, 1, 0, 0, 1], [1, 1, 1, 1, 1, 1, 1], 3)).toBeNull();
  });
});
