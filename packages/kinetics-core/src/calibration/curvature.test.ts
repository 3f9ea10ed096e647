import { describe, expect, it } from "vitest";
import { testCurvature } from "./curvature";
import { exact, line, x } from "./example-line";

describe("curvature", () => {
  it("needs a level and a standard to spare", () => {
    expect(testCurvature(line({ concentrations: [0, 1, 2], signals: [0, 1, 3] })).status).toBe(
      "too-few-standards",
    );
    const twoLevels = line({ concentrations: [1, 1, 2, 2], signals: [1, 2, 3, 4] });
    expect(testCurvature(twoLevels).status).toBe("too-few-standards");
    const through = { concentrations: [0, 1, 2], signals: [0.01, 1, 3], intercept: "none" as const };
    expect(testCurvature(line(through)).status).toBe("tested");
  });

  it("is no number on a line without scatter, and a finite one on an exact parabola", () => {
    expect(testCurvature(line({ concentrations: x, signals: exact })).status).toBe("exact");
    const parabola = testCurvature(line({ concentrations: x, signals: x.map((c) => c + 0.1 * c * c) }));
    if (parabola.status !== "tested") throw new Error(parabola.status);
    expect(parabola.quadratic.estimate).toBeCloseTo(0.1, 12);
    expect(Number.isFinite(parabola.fStatistic)).toBe(true);
    expect(parabola.pValue).toBeLessThan(1e-20);
  });
});
