import { describe, expect, it } from "vitest";
import { studentTCdf, studentTFactor, studentTQuantile, studentTSurvival } from "./student-t";

/** Degrees of freedom, quantiles at 0.975 and 1e-12, survival at 2 and 6: computed with SciPy 1.17, stats.t. */
const ORACLE = [
  [1e5, 1.9599877075346095, -7.035371742393576, 0.022751481728753256, 9.899647278008859e-10],
  [1.001e7, 1.9599642215302147, -7.0344926946567945, 0.02275014543243723, 9.866213329954414e-10],
  [1e8, 1.9599640082627663, -7.034484713122774, 0.022750133297953345, 9.865910171576395e-10],
  [1e10, 1.959963984777281, -7.034483834179348, 0.02275013196167696, 9.865876787588478e-10],
  [1e16, 1.9599639845400543, -7.03448382530114, 0.02275013194817922, 9.865876450377012e-10],
] as const;

describe("Student's t with very many degrees of freedom", () => {
  it.each(ORACLE)("keeps its digits at %s", (freedom, quantile, farQuantile, at2, at6) => {
    const relative = (got: number, wanted: number) => Math.abs(got / wanted - 1);
    const within = freedom < 1e6 ? 1e-11 : 2e-14;
    expect(relative(studentTQuantile(0.975, freedom), quantile)).toBeLessThan(within);
    expect(relative(studentTQuantile(1e-12, freedom), farQuantile)).toBeLessThan(within);
    expect(relative(studentTSurvival(2, freedom), at2)).toBeLessThan(within);
    expect(relative(studentTSurvival(6, freedom), at6)).toBeLessThan(5 * within);
    expect(studentTCdf(-2, freedom)).toBe(studentTSurvival(2, freedom));
  });

  it("falls to the normal distribution without a step, as far as Welch's formula goes", () => {
    const factors = [1e3, 1e5, 9.99e5, 1.001e6, 1e7, 1e9, 1e12, 1e16, 1e20, 1e56, 1e300].map((freedom) =>
      studentTFactor(0.95, freedom),
    );
    const normal = studentTFactor(0.95, Number.POSITIVE_INFINITY);
    factors.forEach((factor, i) => {
      expect(factor).toBeGreaterThanOrEqual(normal);
      expect(factor).toBeLessThanOrEqual((factors[i - 1] ?? 2) + 1e-15);
    });
    expect(factors.at(-1)).toBe(normal);
    expect(studentTSurvival(1e6, 1e9)).toBe(0);
  });
});
