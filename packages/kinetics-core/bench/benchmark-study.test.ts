import { describe, expect, it } from "vitest";
import { benchmarkStudy, TRUE_LOG_RATE_CONSTANT } from "./benchmark-study";
import { fitOrThrow, inputOf } from "./our-fit";

describe("the study of the benchmark", () => {
  it("is the same for the same seed, with readings that fall", () => {
    const [one, again] = [benchmarkStudy(12, 50, 3), benchmarkStudy(12, 50, 3)];
    expect(one).toEqual(again);
    expect(one.runs.every(({ signal }) => (signal[0] ?? 0) > (signal[49] ?? 0) + 0.1)).toBe(true);
  });

  it("has the law that it says: first order in both, and k", () => {
    const fit = fitOrThrow(inputOf(benchmarkStudy(12, 300, 1)));
    for (const [estimate, truth] of [
      [fit.logRateConstant, TRUE_LOG_RATE_CONSTANT],
      [fit.orders.A, 1],
      [fit.orders.B, 1],
    ] as const) {
      const off = (estimate?.estimate ?? Number.NaN) - truth;
      expect(Math.abs(off)).toBeLessThan(4 * (estimate?.standardError ?? 0));
    }
  });
});
