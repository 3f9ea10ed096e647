import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { line } from "./example-line";
import { linearRange, linearRangeFlags, straightnessAt } from "./linear-range";

describe("the linear range", () => {
  /** Signals with an exact slope of 1, an exact quadratic coefficient, and residuals of exactly this deviation. */
  function standards(quadratic: number, deviation: number, levels: readonly number[] = [1, 2, 3, 4, 5, 6]) {
    const contrast = [1, -3, 2, 2, -3, 1];
    const norm = Math.sqrt(contrast.reduce((sum, value) => sum + value ** 2, 0) / 3);
    return {
      concentrations: levels,
      signals: levels.map((c, i) => c + quadratic * c * c + (deviation * (contrast[i] ?? 0)) / norm),
    };
  }

  it("six standards with 1 % scatter show straightness for a ninth of the range, and say how many would show all", () => {
    const range = linearRange(line(standards(0, 0.06)));
    if (range.status !== "assessed") throw new Error(range.message);
    expect(range.straightUpTo / range.highest).toBeCloseTo(1 / 9.3, 2);
    expect(range.curvedFrom).toBeNull();
    // u(q) = σ/√(112/3), t(0.975, 3) = 3.182446; q itself is 0 here.
    const error = 0.06 / Math.sqrt(112 / 3);
    expect(range.mostPerConcentration).toBeCloseTo(3.182446 * error, 6);
    expect(range.straightUpTo).toBeCloseTo(0.02 / (3.182446 * error), 6);
    const more = range.moreStandards ?? 0;
    expect(more).toBeGreaterThan(300);
    const enough = (1.96 + 1.2816) * error * Math.sqrt(6 / (6 + more)) * 6;
    expect(enough).toBeCloseTo(0.02, 3);
    expect(range.scatterNeeded).toBeCloseTo(0.02 / 6 / ((3.182446 + 1.2816) * error), 6);
  });

  it("the further standards that it asks for do show it, in about four cases of five", () => {
    const range = linearRange(line(standards(0, 0.06)));
    const rounds = range.status === "assessed" ? Math.ceil((range.moreStandards ?? 0) / 6) : 0;
    const draws = randomDraws(77);
    let shown = 0;
    for (let replicate = 0; replicate < 200; replicate++) {
      const concentrations = Array.from({ length: 6 * (rounds + 1) }, (_, i) => 1 + (i % 6));
      const signals = concentrations.map((c) => c + 0.06 * draws.normal());
      const found = linearRange(line({ concentrations, signals }));
      if (found.status === "assessed" && found.straightUpTo === found.highest) shown += 1;
    }
    // Central 99.8 % of a binomial of 200 with 80 %: 142 to 177 (SciPy 1.17).
    expect(shown).toBeGreaterThanOrEqual(142);
    expect(shown).toBeLessThanOrEqual(177);
  });

  it("a precise line is straight to its highest standard, a bent one curved from a concentration on", () => {
    const straight = linearRange(line(standards(0, 0.0004)));
    expect(straight).toMatchObject({ straightUpTo: 6, curvedFrom: null, moreStandards: null });
    const bent = line(standards(-0.02, 0.0004));
    const range = linearRange(bent);
    if (range.status !== "assessed") throw new Error(range.message);
    expect(range.curvedFrom).toBeGreaterThan((0.02 * 0.8) / 0.02);
    expect(range.curvedFrom).toBeLessThan(1.1);
    expect(range.straightUpTo).toBeLessThan(range.curvedFrom ?? 0);
    expect([0.5, 3].map((c) => straightnessAt(range, c))).toEqual(["straight", "curved"]);
    expect(range.moreStandards).toBeNull();
  });

  it("weakens where straightness is not shown and blocks where over a fifth of the points lie in the curve", () => {
    const range = linearRange(line(standards(-0.02, 0.0004)));
    const severity = (points: readonly number[]) =>
      linearRangeFlags(range, points, "readings").map((flag) => `${flag.code}: ${flag.severity}`);
    expect(severity([0.1, 0.2])).toEqual([]);
    expect(severity([0.1, 0.2, 0.3, 0.4, 5])).toEqual(["curvature-shown: weakens"]);
    expect(severity([0.1, 0.2, 0.3, 4, 5])).toEqual(["curvature-shown: blocks"]);
    const open = linearRange(line(standards(0, 0.06)));
    const [flag] = linearRangeFlags(open, [0.1, 4], "readings");
    expect(flag).toMatchObject({ code: "straightness-not-shown", severity: "weakens" });
    expect(flag?.message).toMatch(/readings at 4 lie beyond it.*more standards on the same levels/);
  });

  it("is not assessed with too few standards or a level line, and says so once", () => {
    const few = linearRange(line({ concentrations: [0, 1, 2], signals: [0, 1, 2.1] }));
    expect(few.status).toBe("not-assessed");
    expect(straightnessAt(few, 1)).toBe("not-shown");
    expect(linearRangeFlags(few, [1], "standards")[0]?.code).toBe("straightness-not-tested");
    expect(linearRange(line({ concentrations: [0, 1, 2, 3], signals: [1, 1, 1, 1] })).status).toBe(
      "not-assessed",
    );
    expect(linearRangeFlags(few, [], "readings")).toEqual([]);
  });
});
