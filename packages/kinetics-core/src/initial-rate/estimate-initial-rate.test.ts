import { randomDraws } from "kinetics-core/random";
import { progressTo, simulateTrace, trueSlope } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { estimateInitialRate } from "./estimate-initial-rate";
import { evaluateCurve } from "./evaluate-curve";
import { codes, evenly, found, noisy, traceOf } from "./example-traces";
import { partConsumed } from "./general-order";
import published from "./published-tables.fixture.json" with { type: "json" };

describe("a detector that stands still", () => {
  it.each([5, 3.0001, 0.1])(
    "has a slope of exactly 0 at a signal of %d, and no rate comes of rounding",
    (value) => {
      const time = Array.from({ length: 12 }, (_, i) => i);
      for (const options of [{}, { signalSpan: 2 }]) {
        const still = estimateInitialRate({ time, signal: time.map(() => value) }, options);
        if (still.status !== "found") throw new Error(still.message);
        expect(still.slope).toBe(0);
        expect(still.standardError).toBeLessThan(1e-15);
        expect(still.alternatives.every(({ slope }) => slope === 0)).toBe(true);
      }
    },
  );
});

describe("a noiseless trace gives its slope at mixing", () => {
  it("of a straight line, rising or falling", () => {
    for (const sign of [1, -1]) {
      const result = found(
        traceOf(evenly(50, 10), (t) => 0.4 + sign * 0.03 * t),
        { signalSpan: 1 },
      );
      expect(result.slope).toBeCloseTo(sign * 0.03, 13);
      expect(result.standardError).toBeLessThan(1e-13);
    }
  });

  it.each([2, 3, 4] as const)("of a polynomial of degree %i, as its own tangent", (degree) => {
    // S = 0.4 + 0.03 t + … has derivative 0.03 at t = 0, whatever the higher coefficients.
    const higher = [0, 0, -1e-3, 2e-5, -1e-7].slice(0, degree + 1);
    const trace = traceOf(evenly(80, 20), (t) =>
      higher.reduce((sum, coefficient, power) => sum + coefficient * t ** power, 0.4 + 0.03 * t),
    );
    const result = found(trace, { estimator: "tangent", degree, window: [0, 20] });
    expect(result.slope).toBeCloseTo(0.03, 12);
    expect(result.degree).toBe(degree);
  });

  it("of a polynomial whose readings begin after mixing, by extrapolation", () => {
    const trace = traceOf(evenly(80, 20, 3), (t) => 0.4 + 0.03 * t - 1e-3 * t * t);
    expect(found(trace, { signalSpan: 1 }).slope).toBeCloseTo(0.03, 12);
  });

  // S = S₀ + D(1 − c(kt)) with dc/d(kt) = −1 at 0, so dS/dt = kD at mixing.
  it.each([
    [1, 0.3],
    [1, 0.95],
  ])("of an exponential, order %s to conversion %s", (order, conversion) => {
    const progress = progressTo(conversion, order);
    const trace = traceOf(evenly(100, 60), (t) => 0.2 + 1.3 * partConsumed((progress * t) / 60, order));
    const result = found(trace, { estimator: "exponential" });
    expect(result.slope / ((1.3 * progress) / 60)).toBeCloseTo(1, 11);
  });

  it.each([
    [0, 0.5],
    [0.5, 0.8],
    [1, 0.6],
    [1.5, 0.6],
    [2, 0.3],
    [2, 0.9],
    [3, 0.7],
  ])("of an order found from the trace: order %s to conversion %s", (order, conversion) => {
    const progress = progressTo(conversion, order);
    const trace = traceOf(evenly(100, 60), (t) => 1.5 - 1.3 * partConsumed((progress * t) / 60, order));
    const result = found(trace, { estimator: "integrated" });
    expect(result.slope / ((-1.3 * progress) / 60)).toBeCloseTo(1, 10);
    const { curve } = result;
    expect(curve.kind === "general-order" ? curve.order : Number.NaN).toBeCloseTo(order, 8);
  });

  it("of a zero-order reaction that stops when everything is used up", () => {
    const trace = traceOf(evenly(100, 60), (t) => 1.5 - Math.min(t / 20, 1));
    expect(found(trace, { estimator: "integrated" }).slope).toBeCloseTo(-0.05, 12);
  });

  it("by the rule within its own error, without being told the order", () => {
    for (const order of [0, 0.5, 1, 2]) {
      const progress = progressTo(0.7, order);
      const trace = traceOf(evenly(300, 60), (t) => partConsumed((progress * t) / 60, order));
      const { slope, standardError } = found(trace, { signalSpan: 1 });
      expect(Math.abs(slope - progress / 60)).toBeLessThan(Math.max(3 * standardError, 1e-12));
      expect(standardError / slope).toBeLessThan(0.01);
    }
  });
});

describe("an estimate", () => {
  const base = found(noisy, { signalSpan: 0.8 });

  it("is the same on a shifted clock", () => {
    const time = Array.from(noisy.time, (t) => t + 1024);
    const shifted = found({ time, signal: noisy.signal }, { signalSpan: 0.8, timeZero: 1024 });
    expect(shifted.slope / base.slope).toBeCloseTo(1, 9);
    expect(shifted.standardError / base.standardError).toBeCloseTo(1, 9);
    expect(shifted.window[1] - 1024).toBeCloseTo(base.window[1], 9);
  });

  it("scales with the units of time and signal", () => {
    const time = Array.from(noisy.time, (t) => t / 60);
    const signal = Array.from(noisy.signal, (s) => s * 1000);
    const scaled = found({ time, signal }, { signalSpan: 800 });
    expect(scaled.slope / (base.slope * 60_000)).toBeCloseTo(1, 9);
    expect(scaled.standardError / (base.standardError * 60_000)).toBeCloseTo(1, 9);
    expect(scaled.conversion).toBeCloseTo(Number(base.conversion), 9);
    expect(scaled.points).toBe(base.points);
  });

  it("changes sign with the signal, and nothing else", () => {
    const signal = Array.from(noisy.signal, (s) => 2 - s);
    const mirrored = found({ time: noisy.time, signal }, { signalSpan: 0.8 });
    expect(mirrored.slope / -base.slope).toBeCloseTo(1, 9);
    expect(mirrored.standardError / base.standardError).toBeCloseTo(1, 9);
    expect(mirrored.conversion).toBeCloseTo(Number(base.conversion), 9);
  });

  it("has an interval from Student's t with the degrees of freedom of the noise", () => {
    // t(0.975) at 60 and 120 degrees of freedom brackets it: 2.0003 and 1.9799 (any table).
    const factor = (base.interval[1] - base.slope) / base.standardError;
    expect(base.degreesOfFreedom).toBeGreaterThan(60);
    expect(base.degreesOfFreedom).toBeLessThan(120);
    expect(factor).toBeLessThan(2.0003);
    expect(factor).toBeGreaterThan(1.9799);
    expect(base.slope - base.interval[0]).toBeCloseTo(base.interval[1] - base.slope, 12);
  });

  it("shows the four estimators side by side, each with its own window", () => {
    expect(base.alternatives.map(({ estimator }) => estimator)).toEqual([
      "straight",
      "tangent",
      "exponential",
      "integrated",
    ]);
    for (const { slope, standardError } of base.alternatives) {
      expect(Math.abs(slope - 0.8 / 60)).toBeLessThan(5 * standardError);
    }
  });

  it("carries a curve whose slope at mixing belongs to its window", () => {
    for (const { curve, slope } of base.alternatives) {
      const step = 1e-4;
      const numeric = (evaluateCurve(curve, step) - evaluateCurve(curve, 0)) / step;
      expect(numeric / slope).toBeCloseTo(1, 4);
    }
  });
});

describe("a window by hand", () => {
  it("holds exactly the readings between its ends, ends included", () => {
    const trace = traceOf(evenly(101, 100), (t) => 1 - Math.exp(-t / 80));
    const result = found(trace, { window: [10, 40], signalSpan: 1 });
    expect(result.window).toEqual([10, 40]);
    expect(result.points).toBe(31);
    for (const alternative of result.alternatives) expect(alternative.window).toEqual([10, 40]);
  });

  it("gives a straight line its least-squares slope and the error of independent readings", () => {
    // Alternating residuals: ρ is clipped at 0, so Var b = σ²/Σ(t − t̄)² as in any textbook.
    const time = evenly(21, 20);
    const trace = traceOf(time, (t) => 0.1 + 0.02 * t + (t % 2 === 0 ? 0.001 : -0.001));
    const result = found(trace, { estimator: "straight", window: [0, 20] });
    const squares = time.reduce((sum, t) => sum + (t - 10) ** 2, 0);
    const slope = time.reduce((sum, t, i) => sum + (t - 10) * Number(trace.signal[i]), 0) / squares;
    expect(result.slope).toBeCloseTo(slope, 14);
    expect(result.autocorrelation).toBe(0);
    expect(result.standardError).toBeCloseTo(result.noise / Math.sqrt(squares), 14);
  });

  it("reports a quadratic on fewer than 8 readings, and says so", () => {
    const trace = traceOf(evenly(101, 100), (t) => 0.02 * t - 1e-5 * t * t);
    const result = found(trace, { window: [0, 5], signalSpan: 1 });
    expect(result.points).toBe(6);
    expect(result.degree).toBe(2);
    expect(result.slope).toBeCloseTo(0.02, 12);
    expect(codes(result)).toContain("few-points");
  });

  it("warns where a line is asked of a curve", () => {
    const result = found(noisy, { estimator: "straight", window: [0, 60], signalSpan: 0.8 });
    expect(codes(result)).toContain("curved-window");
  });

  it("warns where no order follows the trace", () => {
    // A lag followed by a burst: the rate doubles half-way, as in no reaction of one order.
    const trace = traceOf(evenly(200, 60), (t) => 0.2 * (t / 60) + (t > 30 ? 0.4 * (t / 60 - 0.5) : 0));
    const result = found(trace, { estimator: "integrated", window: [0, 60] });
    expect(codes(result)).toContain("lack-of-fit");
  });

  it("leaves the study's rule aside", () => {
    const rule = { conversionEnd: 0.2, pair: "line-quadratic" } as const;
    const byHand = found(noisy, { window: [0, 30], signalSpan: 0.8 });
    expect(found(noisy, { window: [0, 30], signalSpan: 0.8, rule }).slope).toBe(byHand.slope);
  });
});

describe("the study's rule on a run", () => {
  const trace = traceOf(evenly(401, 400), (t) => -Math.expm1(-t / 300));

  it("ends at its conversion and reports the upper member of its pair", () => {
    const rule = { conversionEnd: 0.3, pair: "quadratic-cubic" } as const;
    const result = found(trace, { signalSpan: 1, rule });
    // 1 − e^(−t/300) = 0.3 at t = −300 ln 0.7 = 107.002
    expect(result.window).toEqual([0, 107]);
    expect(result.pair).toBe("quadratic-cubic");
    expect(result.degree).toBe(3);
    expect(result.conversion).toBeCloseTo(-Math.expm1(-107 / 300), 4);
  });

  it("uses the end of a run that does not reach the conversion", () => {
    const short = traceOf(evenly(50, 30), (t) => -Math.expm1(-t / 300));
    const rule = { conversionEnd: 0.3, pair: "line-quadratic" } as const;
    const result = found(short, { signalSpan: 1, rule });
    expect(result.window).toEqual([0, 30]);
    expect(codes(result)).not.toContain("sparse-start");
  });

  it("takes the first eight readings where fewer lie below the conversion, and says so", () => {
    const sparse = traceOf(evenly(30, 290), (t) => -Math.expm1(-t / 100));
    const rule = { conversionEnd: 0.2, pair: "line-quadratic" } as const;
    const result = found(sparse, { signalSpan: 1, rule });
    expect(result.points).toBe(8);
    expect(codes(result)).toContain("sparse-start");
  });
});

describe("published concentration-time tables", () => {
  // The rate constants are for −dc/dt, so the initial slope is −k·c₀ⁿ.
  const firstOrder = published.filter(({ order }) => order === 1);

  it.each(firstOrder)("$reaction, $source", ({ time, concentrationMolar, rateConstant }) => {
    const start = Number(concentrationMolar[0]);
    const expected = -rateConstant * start;
    const { slope, interval } = found(
      { time, signal: concentrationMolar },
      { estimator: "exponential", signalSpan: start },
    );
    // Two figures, and an end of the reaction that the book takes as known while the estimate leaves it free.
    expect(Math.abs(slope / expected - 1)).toBeLessThan(0.1);
    expect(interval[0]).toBeLessThanOrEqual(expected + 1e-12);
    expect(interval[1]).toBeGreaterThanOrEqual(expected - 1e-12);
  });

  it("an exact halving gives k·c₀ to every digit", () => {
    const table = published.find(({ reaction }) => reaction.startsWith("2H2O2"));
    const { slope } = found(
      { time: table?.time ?? [], signal: table?.concentrationMolar ?? [] },
      { estimator: "exponential" },
    );
    expect(slope).toBeCloseTo(-Math.LN2 / 6, 12);
  });

  it("N2O5 at 318 K by the rule, within its interval", () => {
    const table = published.find(({ reaction }) => reaction.startsWith("2N2O5"));
    const start = Number(table?.concentrationMolar[0]);
    const { interval } = found(
      { time: table?.time ?? [], signal: table?.concentrationMolar ?? [] },
      { signalSpan: start },
    );
    expect(interval[0]).toBeLessThan(-4.82e-4 * start);
    expect(interval[1]).toBeGreaterThan(-4.82e-4 * start);
  });

  it("C4H6, half gone at the second of five readings: off by more than half, and flagged", () => {
    const table = published.find(({ reaction }) => reaction.startsWith("2C4H6"));
    const result = found(
      { time: table?.time ?? [], signal: table?.concentrationMolar ?? [] },
      { signalSpan: 0.01 },
    );
    expect(Math.abs(result.slope / (-0.0614 * 0.01 ** 2) - 1)).toBeGreaterThan(0.3);
    expect(codes(result)).toContain("few-points");
  });
});

describe("long traces", () => {
  it("cost time in proportion to their length", () => {
    const course = {
      order: 1,
      progress: 1,
      duration: 60,
      start: 0,
      span: 1,
      noise: 0.01,
      autocorrelation: 0.2,
    };
    const took = [5_000, 50_000].map((readings) => {
      const trace = simulateTrace({ ...course, readings }, randomDraws(2).normal);
      const result = found(trace, { signalSpan: 1 });
      expect(Math.abs(result.slope - trueSlope({ ...course, readings }))).toBeLessThan(
        4 * result.standardError,
      );
      // The least of three, because other work on the machine only ever adds.
      const times = Array.from({ length: 3 }, () => {
        const began = performance.now();
        found(trace, { signalSpan: 1 });
        return performance.now() - began;
      });
      return Math.min(...times);
    });
    // Ten times the readings: a quadratic cost would show as a hundred.
    expect(Number(took[1]) / Number(took[0])).toBeLessThan(40);
  });
});
