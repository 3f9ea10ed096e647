import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { driftBefore } from "./drift-before-mixing";
import { estimateInitialRate } from "./estimate-initial-rate";

/** Twenty readings before mixing at 0 and eighty of a first-order growth after it, 1 % noise of the height. */
function trace(drift: number, seed: number) {
  const { normal } = randomDraws(seed);
  const time = Array.from({ length: 100 }, (_, i) => i - 20);
  const signal = time.map((t) => drift * t + (t < 0 ? 0 : 1 - Math.exp(-0.03 * t)) + 0.002 * normal());
  return { time, signal };
}

const codes = (drift: number, seed: number) => {
  const rate = estimateInitialRate(trace(drift, seed), { signalSpan: 1 });
  if (rate.status !== "found") throw new Error(rate.message);
  return rate.flags.map((flag) => flag.code);
};

describe("drift before mixing", () => {
  it("is the slope of the readings before it", () => {
    const time = [0, 1, 2, 3, 4, 5, 6];
    const drift = driftBefore({ time, signal: time.map((t) => 0.2 - 0.01 * t + (t === 6 ? 9 : 0)) }, 6);
    expect(drift?.slope).toBeCloseTo(-0.01, 12);
    expect(drift?.standardError).toBeCloseTo(0, 12);
    expect(driftBefore({ time, signal: time }, 5)).toBeNull();
  });

  it("is told where it is real and matters beside the rate", () => {
    expect(codes(0.0015, 1)).toContain("drift-before-mixing");
    expect(codes(-0.0015, 2)).toContain("drift-before-mixing");
    // A thousandth of the rate is nobody's trouble, however surely it is seen.
    expect(codes(0.00003, 3)).not.toContain("drift-before-mixing");
  });

  it("is told of noise alone in few of many traces", () => {
    const told = Array.from({ length: 100 }, (_, seed) => codes(0, 100 + seed)).filter((found) =>
      found.includes("drift-before-mixing"),
    );
    expect(told.length).toBeLessThanOrEqual(5);
  });
});

describe("the conversion that a trace reached", () => {
  it("comes from its last readings, and exceeds 1 where the signal moves by more than it can", () => {
    const time = Array.from({ length: 200 }, (_, i) => i);
    const signal = time.map((t) => 0.1 - 0.8 * (1 - Math.exp(-0.05 * t)));
    const reached = (signalSpan?: number) => {
      const rate = estimateInitialRate({ time, signal }, signalSpan === undefined ? {} : { signalSpan });
      return rate.status === "found" ? rate.reached : Number.NaN;
    };
    expect(reached(0.8)).toBeCloseTo(1, 2);
    expect(reached(0.4)).toBeCloseTo(2, 1);
    expect(reached()).toBeNull();
  });
});
