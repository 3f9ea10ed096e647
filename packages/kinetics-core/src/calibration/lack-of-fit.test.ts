import { describe, expect, it } from "vitest";
import { calibrated, codes, line, scattered, x } from "./example-line";
import { pureErrorOf, testLackOfFit, unevenScatter } from "./lack-of-fit";

describe("replicates", () => {
  const concentrations = [1, 1, 2, 2, 3, 3, 4, 4];

  it("tell what the line misses from what scatters", () => {
    const bent = [1, 1.02, 2, 2.02, 2.8, 2.82, 3.4, 3.42];
    const fitted = line({ concentrations, signals: bent });
    const pure = pureErrorOf(fitted);
    expect(pure?.degreesOfFreedom).toBe(4);
    // Each pair differs by 0.02: s² = 0.02²/2.
    expect(pure?.standardDeviation).toBeCloseTo(0.02 / Math.SQRT2, 12);
    const lack = testLackOfFit(fitted);
    expect(lack?.degreesOfFreedom).toEqual([2, 4]);
    expect(lack?.pValue).toBeLessThan(1e-3);
    expect(codes(calibrated({ concentrations, signals: bent }))).toContain("lack-of-fit");
  });

  it("are needed for the test, must scatter, and need more levels than parameters", () => {
    expect(testLackOfFit(line({ concentrations: x, signals: scattered }))).toBeNull();
    expect(testLackOfFit(line({ concentrations, signals: [1, 1, 2, 2, 2.8, 2.8, 3.4, 3.4] }))).toBeNull();
    expect(testLackOfFit(line({ concentrations: [1, 1, 2, 2], signals: [1, 1.1, 2, 2.1] }))).toBeNull();
    expect(pureErrorOf(line({ concentrations: x, signals: scattered }))).toBeNull();
  });

  it("of one level are one level after a change of unit", () => {
    const converted = concentrations.map((value, i) => (i % 2 === 0 ? value * 0.1 * 3 : (value * 3) / 10));
    expect(pureErrorOf(line({ concentrations: converted, signals: concentrations }))?.degreesOfFreedom).toBe(
      4,
    );
  });

  it("compare the scatter of the ends", () => {
    const growing = [1, 1.01, 2, 2.05, 3, 3.2, 4, 5];
    const pure = pureErrorOf(line({ concentrations, signals: growing }));
    const uneven = pure === null ? null : unevenScatter(pure);
    expect(uneven?.ratio).toBeCloseTo(1e4, 4);
  });
});
