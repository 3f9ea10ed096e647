import { randomDraws } from "kinetics-core/random";
import { simulateTrace } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { estimateInitialRate } from "./estimate-initial-rate";
import { codes, evenly, found, traceOf } from "./example-traces";

describe("what weakens an estimate is flagged", () => {
  it("no signal span: a quadratic over all readings", () => {
    const result = found(traceOf(evenly(6, 10), (t) => 0.4 + 0.03 * t - 0.001 * t * t));
    expect(result.slope).toBeCloseTo(0.03, 13);
    expect(result.conversion).toBeNull();
    expect(codes(result)).toContain("conversion-unknown");
  });

  it("no signal span and readings enough: windows of all lengths compete", () => {
    const curve = (t: number) => 0.1 + Math.exp(-0.03 * t);
    const deviate = randomDraws(12).normal;
    const trace = traceOf(evenly(120, 100), (t) => curve(t) + 0.002 * deviate());
    const result = found(trace);
    const [low, high] = result.interval;
    expect(low).toBeLessThan(-0.03);
    expect(high).toBeGreaterThan(-0.03);
    expect(high - low).toBeLessThan(0.2 * 0.03);
    expect(result.conversion).toBeNull();
    expect(codes(result)).toEqual(["conversion-unknown"]);
  });

  it("readings before mixing, which are not used", () => {
    const trace = traceOf(evenly(60, 59), (t) => (t < 10 ? 0.4 : 0.4 + 0.03 * (t - 10)));
    const result = found(trace, { timeZero: 10, signalSpan: 5 });
    expect(result.slope).toBeCloseTo(0.03, 12);
    expect(result.window[0]).toBe(10);
    expect(result.flags.find(({ code }) => code === "before-mixing")?.message).toContain("10 readings");
  });

  it("equal readings", () => {
    const result = found(
      traceOf(evenly(60, 59), () => 0.4),
      { signalSpan: 1 },
    );
    expect(result.slope).toBeCloseTo(0, 15);
    expect(codes(result)).toEqual(["constant-signal"]);
  });

  it("a rate lost in noise", () => {
    const deviate = randomDraws(5).normal;
    const result = found(
      traceOf(evenly(60, 59), () => 0.4 + 0.01 * deviate()),
      { signalSpan: 1 },
    );
    expect(codes(result)).toContain("imprecise-rate");
  });

  it("strongly correlated noise", () => {
    const course = { order: 1, progress: 0.5, readings: 400, duration: 60, start: 0, span: 1, noise: 0.01 };
    const result = found(simulateTrace({ ...course, autocorrelation: 0.97 }, randomDraws(8).normal), {
      signalSpan: 1,
    });
    expect(result.autocorrelation).toBeGreaterThan(0.9);
    expect(codes(result)).toContain("autocorrelated");
  });

  it("an order that a barely curved, noisy trace does not settle, which the rule then leaves out", () => {
    const course = { order: 0, progress: 0.1, readings: 120, duration: 60, start: 0, span: 1, noise: 0.02 };
    const deviate = randomDraws(6).normal;
    const results = Array.from({ length: 20 }, () => {
      const trace = simulateTrace({ ...course, autocorrelation: 0 }, deviate);
      const byName = found(trace, { signalSpan: 1, estimator: "integrated", window: [0, 60] });
      return { byName: codes(byName), byRule: codes(found(trace, { signalSpan: 1 })) };
    });
    expect(results.some(({ byName }) => byName.includes("order-not-settled"))).toBe(true);
    expect(results.some(({ byRule }) => byRule.includes("order-not-settled"))).toBe(false);
  });

  it("a first reading that comes after a fifth of the reaction", () => {
    const trace = traceOf(evenly(100, 90, 30), (t) => -Math.expm1(-t / 100));
    const flag = found(trace, { signalSpan: 1 }).flags.find(({ code }) => code === "dead-time");
    expect(flag?.severity).toBe("blocks");
  });
});

describe("what cannot be used comes back as a sentence", () => {
  const signal = [0, 1, 2, 3, 4, 5, 6, 7];

  it.each([
    ["lengths", { time: [0, 1], signal }, "lengths-differ", "2 times but 8 signals"],
    [
      "a duplicated time",
      { time: [0, 1, 2, 3, 3, 5, 6, 7], signal },
      "not-increasing",
      "Readings 4 and 5 both have the time 3",
    ],
    [
      "times out of order",
      { time: [0, 1, 2, 3, 2.5, 5, 6, 7], signal },
      "not-increasing",
      "Reading 5, at time 2.5, comes after time 3",
    ],
    ["one time for all", { time: new Array(8).fill(2), signal }, "flat-time", "All 8 readings"],
    ["a missing time", { time: [0, Number.NaN, 2, 3, 4, 5, 6, 7], signal }, "not-finite", "reading 2"],
    [
      "a missing signal",
      { time: signal, signal: [0, 1, 2, Number.POSITIVE_INFINITY, 4, 5, 6, 7] },
      "not-finite",
      "reading 4, at time 3",
    ],
  ])("%s", (_, trace, code, words) => {
    const result = estimateInitialRate(trace, { signalSpan: 1 });
    expect(result.status).toBe("unusable");
    if (result.status !== "unusable") return;
    expect(result.code).toBe(code);
    expect(result.message).toContain(words);
  });

  it("a window without readings", () => {
    const result = estimateInitialRate({ time: signal, signal }, { window: [3.2, 3.8] });
    expect(result).toMatchObject({ status: "unusable", code: "empty-window" });
    const reversed = estimateInitialRate({ time: signal, signal }, { window: [6, 2] });
    expect(reversed).toMatchObject({ status: "unusable", code: "empty-window" });
  });

  it.each([
    ["nothing at all", [], {}, 0],
    ["three readings", [0, 1, 2], {}, 3],
    ["four readings, for a quadratic", [0, 1, 2, 3], {}, 4],
    ["nothing after mixing", [0, 1, 2, 3, 4, 5], { timeZero: 9 }, 0],
    ["a window of two readings", signal, { window: [2, 3] as const }, 2],
  ])("too few points: %s", (_, time, options, got) => {
    const result = estimateInitialRate({ time, signal: time }, options);
    expect(result).toMatchObject({ status: "too-few-points", got, needed: 5 });
  });

  it("a straight line makes do with four readings", () => {
    const time = [0, 1, 2, 3];
    const line = (points: number) =>
      estimateInitialRate(
        { time: time.slice(0, points), signal: [0, 1, 2.1, 3].slice(0, points) },
        { estimator: "straight" },
      );
    expect(line(3)).toMatchObject({ status: "too-few-points", needed: 4, got: 3 });
    expect(line(4).status).toBe("found");
  });

  it("a general order of a trace that is level from the second reading on", () => {
    const trace = traceOf(evenly(30, 29), (t) => (t > 0 ? 1 : 0));
    const result = estimateInitialRate(trace, { estimator: "integrated", signalSpan: 1 });
    expect(result).toMatchObject({ status: "unusable", code: "no-slope" });
    const { alternatives } = found(trace, { signalSpan: 1 });
    expect(alternatives.map(({ estimator }) => estimator)).not.toContain("integrated");
  });

  it("four readings carry a straight line, asked for by name", () => {
    const result = found(
      traceOf([0, 1, 2, 3], (t) => 2 * t + (t === 1 ? 0.1 : 0)),
      {
        estimator: "straight",
      },
    );
    expect(result.points).toBe(4);
  });

  it("while a level outside 0 to 1 is a programmer's error", () => {
    expect(() => estimateInitialRate({ time: signal, signal }, { level: 95 })).toThrow(RangeError);
  });
});
