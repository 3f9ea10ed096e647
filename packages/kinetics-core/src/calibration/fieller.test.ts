import { studentTFactor } from "kinetics-core/distributions";
import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { estimateOfRatio, fieller, type RatioOfEstimates } from "./fieller";

const base: RatioOfEstimates = {
  numerator: 3,
  denominator: 2,
  numeratorVariance: 0.04,
  denominatorVariance: 0.09,
  covariance: 0.02,
  factor: 2,
};

/** Whether a ratio satisfies the inequality that defines the set. */
function admits(input: RatioOfEstimates, ratio: number): boolean {
  const { numerator, denominator, numeratorVariance, denominatorVariance, covariance, factor } = input;
  return (
    (numerator - ratio * denominator) ** 2 <=
    factor ** 2 * (numeratorVariance - 2 * ratio * covariance + ratio ** 2 * denominatorVariance)
  );
}

describe("fieller", () => {
  it("is an interval about the quotient where the denominator differs from zero", () => {
    const { estimate, standardError, g, set } = fieller(base);
    expect(estimate).toBe(1.5);
    // √(0.04 − 2·1.5·0.02 + 2.25·0.09)/2
    expect(standardError).toBeCloseTo(Math.sqrt(0.1825) / 2, 12);
    expect(g).toBeCloseTo(0.09, 12);
    if (set.kind !== "bounded") throw new Error(set.kind);
    for (const end of [set.low, set.high]) {
      expect(admits(base, end - 1e-9)).not.toBe(admits(base, end + 1e-9));
    }
    expect(admits(base, 1.5)).toBe(true);
  });

  it("excludes an inner interval where the denominator may be zero and the numerator is not", () => {
    const input = { ...base, denominator: 0.5 };
    const { g, set } = fieller(input);
    expect(g).toBeGreaterThan(1);
    if (set.kind !== "complement" || set.upTo === null || set.from === null) throw new Error(set.kind);
    expect(admits(input, (set.upTo + set.from) / 2)).toBe(false);
    expect(admits(input, set.upTo - 1e-9)).toBe(true);
    expect(admits(input, set.from + 1e-9)).toBe(true);
    expect(estimateOfRatio(fieller(input), 0.95)).toMatchObject({ estimate: 6, interval: null });
  });

  it("is the whole line where both may be zero", () => {
    const input = { ...base, numerator: 0.1, denominator: 0.1 };
    expect(fieller(input).set).toEqual({ kind: "whole-line" });
    for (const ratio of [-1e6, -3, 0, 0.7, 1e6]) expect(admits(input, ratio)).toBe(true);
  });

  it("is a half-line at g = 1", () => {
    const input = { ...base, denominator: 0.6, covariance: 0 };
    expect(fieller(input)).toMatchObject({ g: 1, set: { kind: "complement", upTo: null } });
    expect(fieller({ ...input, numerator: -3 }).set).toMatchObject({ kind: "complement", from: null });
  });

  it("knows exact estimates: a point, zero, and no ratio at all", () => {
    const exact = { ...base, numeratorVariance: 0, denominatorVariance: 0, covariance: 0 };
    expect(fieller(exact).set).toEqual({ kind: "bounded", low: 1.5, high: 1.5 });
    expect(fieller({ ...exact, numerator: 0 })).toMatchObject({
      estimate: 0,
      set: { kind: "bounded", low: 0, high: 0 },
    });
    expect(fieller({ ...exact, denominator: 0 })).toEqual({
      estimate: null,
      standardError: null,
      g: null,
      set: { kind: "whole-line" },
    });
  });

  it("keeps its digits where numerator and denominator differ by 300 powers of ten", () => {
    const { estimate, set } = fieller({
      numerator: 3e150,
      denominator: 2e-150,
      numeratorVariance: 0.04e300,
      denominatorVariance: 0.09e-300,
      covariance: 0.02,
      factor: 2,
    });
    const plain = fieller(base).set;
    if (set.kind !== "bounded" || plain.kind !== "bounded") throw new Error(set.kind);
    expect((estimate ?? 0) / 1.5e300).toBeCloseTo(1, 14);
    expect(set.low / 1e300).toBeCloseTo(plain.low, 12);
  });

  it("covers the true ratio at its level, also where the denominator is poorly known", () => {
    const draws = randomDraws(5101);
    const factor = studentTFactor(0.95, Number.POSITIVE_INFINITY);
    let covered = 0;
    const replicates = 4000;
    for (let replicate = 0; replicate < replicates; replicate++) {
      // True ratio 2; the denominator is known to 50 %.
      const input = {
        numerator: 2 + 0.3 * draws.normal(),
        denominator: 1 + 0.5 * draws.normal(),
        numeratorVariance: 0.09,
        denominatorVariance: 0.25,
        covariance: 0,
        factor,
      };
      const { set } = fieller(input);
      const inside =
        set.kind === "whole-line" ||
        (set.kind === "bounded"
          ? set.low <= 2 && 2 <= set.high
          : 2 <= (set.upTo ?? -Infinity) || 2 >= (set.from ?? Infinity));
      if (inside) covered += 1;
    }
    // Central 99.8 % of a binomial with 95 %: 3,756 to 3,841 (SciPy 1.17).
    expect(covered).toBeGreaterThanOrEqual(3756);
    expect(covered).toBeLessThanOrEqual(3841);
  });
});
