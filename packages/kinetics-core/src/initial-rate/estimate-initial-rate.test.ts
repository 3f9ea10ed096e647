import { describe, expect, it } from "vitest";
import { estimateInitialRate } from "./estimate-initial-rate";
import type { InitialRateFound, InitialRateOptions, Trace } from "./initial-rate";

function found(trace: Trace, options?: InitialRateOptions): InitialRateFound {
  const result = estimateInitialRate(trace, options);
  if (result.status !== "found") throw new Error(result.message);
  return result;
}

function traceOf(times: number[], signal: (t: number) => number): Trace {
  return { time: times, signal: times.map(signal) };
}

const evenly = (n: number, end: number, start = 0) =>
  Array.from({ length: n }, (_, i) => start + ((end - start) * i) / (n - 1));

describe("a noiseless trace gives its analytic slope at mixing", () => {
  it("quadratic, without knowing the conversion", () => {
    const result = found(traceOf(evenly(6, 10), (t) => 0.4 + 0.03 * t - 0.001 * t * t));
    expect(result.slope).toBeCloseTo(0.03, 13);
    expect(result.flags.map((flag) => flag.code)).toContain("conversion-unknown");
  });

  it("first order: S = S∞(1 − e^(−kt)) has slope k·S∞", () => {
    const result = found(
      traceOf(evenly(200, 60), (t) => 1.2 * -Math.expm1(-0.05 * t)),
      { signalSpan: 1.2 },
    );
    expect(Math.abs(result.slope / 0.06 - 1)).toBeLessThan(1e-4);
    expect(Math.abs(result.slope - 0.06)).toBeLessThan(3 * result.standardError);
  });
});
