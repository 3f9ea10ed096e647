import { randomDraws } from "kinetics-core/random";
import { progressTo, simulateTrace } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { type OrderOfTrace, type OrderOfTraceInput, orderOfTrace } from "./order-of-trace";
import { orderResolution, orderStandardDeviation } from "./order-resolution";
import { straightestAxisOrder } from "./straightest-axis";

function read(input: OrderOfTraceInput): Extract<OrderOfTrace, { status: "read" }> {
  const result = orderOfTrace(input);
  if (result.status !== "read")
    throw new Error(`expected a reading, got ${result.status}: ${result.message}`);
  return result;
}

function traceOf(order: number, conversion: number, autocorrelation: number, normal: () => number) {
  return simulateTrace(
    {
      order,
      progress: progressTo(conversion, order),
      readings: 60,
      duration: 100,
      start: 0.62,
      span: -0.6,
      noise: 0.003,
      autocorrelation,
    },
    normal,
  );
}

describe("the order of one trace with a known end", () => {
  const UNCERTAINTY = 0.003;

  it("is never the wrong one from 60 % conversion on, and mostly shown", () => {
    const draws = randomDraws(31);
    let [shown, counted] = [0, 0];
    for (const order of [0, 1, 2]) {
      for (const conversion of [0.6, 0.9]) {
        for (const autocorrelation of [0, 0.6]) {
          for (let replicate = 0; replicate < 2; replicate++) {
            const trace = traceOf(order, conversion, autocorrelation, draws.normal);
            const value = 0.02 + UNCERTAINTY * draws.normal();
            const endSignal = { kind: "known", value, standardUncertainty: UNCERTAINTY } as const;
            const result = read({ ...trace, endSignal });
            expect(result.nearest).toBe(order);
            expect([null, order]).toContain(result.order);
            counted++;
            shown += result.order === order ? 1 : 0;
          }
        }
      }
    }
    expect(shown / counted).toBeGreaterThan(0.7);
  });

  it("is told by the end where the straightest axis is led astray by an unnoticed offset", () => {
    // A residual signal of a fifth of the span, taken for none.
    const draws = randomDraws(5);
    let [misled, shown] = [0, 0];
    for (let replicate = 0; replicate < 5; replicate++) {
      const trace = traceOf(1, 0.9, 0, draws.normal);
      const offset = { ...trace, signal: Array.from(trace.signal, (value) => value + 0.1) };
      if (straightestAxisOrder(offset).order !== 1) misled++;
      const endSignal = { kind: "known", value: 0.12, standardUncertainty: UNCERTAINTY } as const;
      const result = read({ ...offset, endSignal });
      expect(result.nearest).toBe(1);
      if (result.order === 1) shown++;
    }
    expect(misled).toBe(5);
    // One good trace in twenty shows a pattern by chance, and is then not claimed.
    expect(shown).toBeGreaterThanOrEqual(4);
  });

  it("is not claimed at low conversion", () => {
    const trace = traceOf(1, 0.12, 0, randomDraws(1).normal);
    const endSignal = { kind: "known", value: 0.02, standardUncertainty: UNCERTAINTY } as const;
    const result = read({ ...trace, endSignal });
    expect(result).toMatchObject({
      reading: "consistent",
      order: null,
      reason: expect.stringMatching(/\.$/),
    });
    expect(result.candidates.filter(({ excluded }) => !excluded).length).toBeGreaterThan(1);
  });

  it("is not claimed against the stated end, nor among candidates that are all excluded", () => {
    const trace = traceOf(1, 0.9, 0, randomDraws(2).normal);
    const conflict = { kind: "known", value: 0.1, standardUncertainty: UNCERTAINTY } as const;
    expect(read({ ...trace, endSignal: conflict }).reading).toBe("none");
    const known = { kind: "known", value: 0.02, standardUncertainty: UNCERTAINTY } as const;
    expect(read({ ...trace, endSignal: known, candidates: [0, 2] })).toMatchObject({
      reading: "none",
      order: null,
    });
  });

  it("passes the refusals of the fit on", () => {
    expect(orderOfTrace({ time: [0, 1, 2], signal: [1, 1, 1] })).toMatchObject({ status: "too-few-points" });
    expect(orderOfTrace({ time: [0, 1, 2, 2, 3], signal: [5, 4, 3, 2, 1] })).toMatchObject({
      status: "unusable",
    });
    expect(() => orderOfTrace({ time: [], signal: [], candidates: [] })).toThrow(RangeError);
  });
});

describe("how well a trace can tell its order", () => {
  // Settled by simulation with 100-point traces, and computed here in closed form.
  it.each([
    [0.1, 2535],
    [0.2, 600],
    [0.3, 251],
    [0.4, 132],
    [0.5, 79],
    [0.6, 50],
    [0.7, 34],
    [0.8, 23],
    [0.9, 16],
  ])("at a conversion of %s, known end, K = %s", (conversion, expected) => {
    expect(Math.abs(orderResolution(conversion, "known") / expected - 1)).toBeLessThan(0.025);
  });

  it("is worse by far with a free end", () => {
    expect(orderResolution(0.1, "free")).toBeCloseTo(2.86e5, -4);
    expect(orderResolution(0.9, "free")).toBeCloseTo(80, 0);
  });

  it("foretells the standard error of the free order", () => {
    const trace = traceOf(1, 0.8, 0, randomDraws(14).normal);
    const { freeFit } = read({ ...trace, endSignal: { kind: "known", value: 0.02, standardUncertainty: 0 } });
    const relativeNoise = (freeFit.residualStandardDeviation ?? 0) / 0.6;
    const foretold = orderStandardDeviation({
      conversion: 0.8,
      relativeNoise,
      effectivePoints: 60,
      end: "known",
    });
    expect((freeFit.orderStandardError ?? 0) / foretold).toBeGreaterThan(0.85);
    expect((freeFit.orderStandardError ?? 0) / foretold).toBeLessThan(1.3);
  });

  it("wants a conversion", () => {
    expect(() => orderResolution(1, "known")).toThrow(RangeError);
  });
});
