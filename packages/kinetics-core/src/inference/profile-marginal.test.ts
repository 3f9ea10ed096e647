import { describe, expect, it } from "vitest";
import { profileMarginal } from "./index";

const request = { estimate: 2, standardError: 0.3, degreesOfFreedom: 6, deviance: 17, name: "n_A" };
// t for 95 % and 6 degrees of freedom, from any table.
const T = 2.4469118511449786;

describe("profile of the marginal likelihood", () => {
  it("is the Wald interval where the deviance is a parabola", () => {
    const { interval, flags } = profileMarginal({
      ...request,
      refit: (value) => 17 + ((value - 2) / 0.3) ** 2,
    });
    expect(interval?.[0]).toBeCloseTo(2 - 0.3 * T, 7);
    expect(interval?.[1]).toBeCloseTo(2 + 0.3 * T, 7);
    expect(flags).toEqual([]);
  });

  it("follows a lopsided deviance: limits are where it has risen by t²", () => {
    const deviance = (value: number) => 17 + 40 * (value / 2 - 1 - Math.log(value / 2));
    const { interval } = profileMarginal({
      ...request,
      refit: (value) => (value > 0 ? deviance(value) : null),
      bounds: [1e-6, Number.POSITIVE_INFINITY],
    });
    expect(deviance(interval?.[0] ?? 0) - 17).toBeCloseTo(T ** 2, 5);
    expect(deviance(interval?.[1] ?? 0) - 17).toBeCloseTo(T ** 2, 5);
    expect((interval?.[1] ?? 0) - 2).toBeGreaterThan(1.2 * (2 - (interval?.[0] ?? 0)));
  });

  it("does not close where the deviance levels off, and says from which side", () => {
    const result = profileMarginal({
      ...request,
      refit: (value) => (value < 2 ? 17 + ((value - 2) / 0.3) ** 2 : 17 + 3 * (1 - Math.exp(2 - value))),
    });
    expect(result.interval).toBeNull();
    expect(result.lower).toBeCloseTo(2 - 0.3 * T, 7);
    expect(result.upper).toBeNull();
    expect(result.flags[0]?.code).toBe("profile-open");
    expect(result.flags[0]?.message).toContain("above");
  });

  it("does not step over a bound", () => {
    const seen: number[] = [];
    const result = profileMarginal({
      ...request,
      bounds: [1.9, 10],
      refit: (value) => {
        seen.push(value);
        return 17 + ((value - 2) / 0.3) ** 2;
      },
    });
    expect(Math.min(...seen)).toBe(1.9);
    expect(result.lower).toBeNull();
    expect(result.upper).toBeCloseTo(2 + 0.3 * T, 7);
  });

  it("gives no interval about a point that is not the least", () => {
    const result = profileMarginal({ ...request, refit: (value) => 17 + ((value - 2.5) / 0.3) ** 2 - 2.8 });
    expect(result.interval).toBeNull();
    expect(result.flags[0]?.message).toContain("better fit");
  });

  it("names a refit that failed, and a fit without standard error", () => {
    expect(profileMarginal({ ...request, refit: () => null }).flags[0]?.message).toContain("failed");
    const without = profileMarginal({ ...request, standardError: 0, refit: () => 17 });
    expect(without.interval).toBeNull();
    expect(without.flags[0]?.code).toBe("profile-impossible");
  });
});
