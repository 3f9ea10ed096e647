import { randomDraws } from "kinetics-core/random";
import { progressTo, simulateTrace } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import type { EndSignal } from "./end-signal";
import { fitIntegratedLaw } from "./fit-integrated-law";
import type { IntegratedLawFit, IntegratedLawInput } from "./integrated-law";

function fitted(input: IntegratedLawInput): IntegratedLawFit {
  const result = fitIntegratedLaw(input);
  if (result.status !== "fitted") throw new Error(`expected a fit, got ${result.status}: ${result.message}`);
  return result;
}

const flagOf = (fit: IntegratedLawFit, code: string) => fit.flags.find((flag) => flag.code === code);

/** Signal of 0.62 that ends at 0.02 (or the other way round), noiseless, to a conversion. */
function courseOf(order: number, conversion: number, changes: { rising?: boolean; readings?: number } = {}) {
  const { rising = false, readings = 40 } = changes;
  return simulateTrace(
    {
      order,
      progress: progressTo(conversion, order),
      readings,
      duration: 100,
      start: rising ? 0.02 : 0.62,
      span: rising ? 0.6 : -0.6,
      noise: 0,
      autocorrelation: 0,
    },
    () => 0,
  );
}

/** k of −dy/dt = k·yⁿ of these courses. */
const rateConstantOf = (order: number, conversion: number) =>
  (progressTo(conversion, order) / 100) * 0.6 ** (1 - order);

describe("a noiseless course", () => {
  it.each([0, 0.5, 1, 1.5, 2, 3])(
    "of order %s gives its truth back, rising and falling, held and free",
    (order) => {
      for (const rising of [false, true]) {
        const trace = courseOf(order, 0.8, { rising });
        const end = rising ? 0.62 : 0.02;
        const known: EndSignal = { kind: "known", value: end, standardUncertainty: 0 };
        for (const [asked, endSignal] of [
          [order, known],
          ["free", known],
          ["free", { kind: "known", value: end, standardUncertainty: 0.004 }],
          ...(order === 0 ? [] : ([[order, { kind: "free" }]] as const)),
        ] as const) {
          const fit = fitted({ ...trace, order: asked, endSignal });
          expect(fit.order.estimate).toBeCloseTo(order, 6);
          expect((fit.rateConstant.estimate ?? 0) / rateConstantOf(order, 0.8)).toBeCloseTo(1, 6);
          expect(fit.initialSignal.estimate).toBeCloseTo(rising ? 0.02 : 0.62, 8);
          expect(fit.endSignal.estimate).toBeCloseTo(end, 7);
          expect(fit.conversion).toBeCloseTo(0.8, 7);
        }
      }
    },
  );

  it("has the half-life of its order, from its start", () => {
    for (const order of [0, 0.5, 1, 2, 3]) {
      const { halfLife } = fitted({
        ...courseOf(order, 0.8),
        order,
        endSignal: { kind: "known", value: 0.02, standardUncertainty: 0 },
      });
      // Half of it is gone at the progress to a conversion of one half.
      expect(
        (halfLife.estimate ?? 0) / ((100 * progressTo(0.5, order)) / progressTo(0.8, order)),
      ).toBeCloseTo(1, 9);
    }
  });

  it("that is read from later on has the same k, and its start by extrapolation", () => {
    const { time, signal } = courseOf(2, 0.8, { readings: 50 });
    const late = { time: Array.from(time).slice(10), signal: Array.from(signal).slice(10) };
    const endSignal = { kind: "known", value: 0.02, standardUncertainty: 0 } as const;
    const fit = fitted({ ...late, order: 2, endSignal });
    expect((fit.rateConstant.estimate ?? 0) / rateConstantOf(2, 0.8)).toBeCloseTo(1, 9);
    expect(fit.initialSignal.estimate).toBeCloseTo(0.62, 8);
    expect(flagOf(fit, "dead-time")).toBeDefined();
    const shifted = { ...late, time: late.time.map((t) => t + 1000), timeZero: 1000 };
    expect(fitted({ ...shifted, order: 2, endSignal }).initialSignal.estimate).toBeCloseTo(0.62, 7);
  });

  it("of order below one stops at exhaustion, says when, and its later readings fix the end", () => {
    for (const order of [0, 0.5]) {
      const time = Float64Array.from({ length: 60 }, (_, i) => i);
      const over = 40;
      const signal = time.map((t) => 0.02 + 0.6 * Math.max(1 - t / over, 0) ** (1 / (1 - order)));
      const fit = fitted({ time, signal, order, endSignal: { kind: "free" } });
      expect(fit.endSignal.estimate).toBeCloseTo(0.02, 7);
      expect(flagOf(fit, "exhausted")?.message).toMatch(/ 40/);
    }
  });

  it("with a straight signal and a free end has a zero-order k, and neither end nor half-life", () => {
    const draws = randomDraws(4);
    const time = Float64Array.from({ length: 40 }, (_, i) => i);
    for (let replicate = 0; replicate < 20; replicate++) {
      const signal = time.map((t) => 0.8 - 0.01 * t + 0.002 * draws.normal());
      const fit = fitted({ time, signal, order: 0 });
      expect(fit.rateConstant.estimate).toBeCloseTo(0.01, 3);
      expect(fit.rateConstant.standardError).toBeGreaterThan(0);
      expect(fit.endSignal).toMatchObject({ estimate: null, interval: null });
      expect(fit.halfLife.estimate).toBeNull();
    }
  });
});

describe("with noise", () => {
  /** Of 0.5 % of the span, correlated where asked. */
  function noisy(order: number, autocorrelation: number, normal: () => number, readings = 100) {
    return simulateTrace(
      {
        order,
        progress: progressTo(0.8, order),
        readings,
        duration: 100,
        start: 0.62,
        span: -0.6,
        noise: 0.003,
        autocorrelation,
      },
      normal,
    );
  }

  it.each([0, 0.7])("intervals of order and k cover, autocorrelation %s", (autocorrelation) => {
    const draws = randomDraws(21);
    const [replicates, orders] = [8, [0, 1, 2]];
    let [order, k, held] = [0, 0, 0];
    for (const truth of orders) {
      for (let replicate = 0; replicate < replicates; replicate++) {
        const trace = noisy(truth, autocorrelation, draws.normal);
        const endSignal = {
          kind: "known",
          value: 0.02 + 0.003 * draws.normal(),
          standardUncertainty: 0.003,
        } as const;
        const free = fitted({ ...trace, order: "free", endSignal });
        order += covers(free.order.interval, truth);
        k += covers(free.rateConstant.interval, rateConstantOf(truth, 0.8));
        held += covers(
          fitted({ ...trace, order: truth, endSignal }).rateConstant.interval,
          rateConstantOf(truth, 0.8),
        );
      }
    }
    // 24 each: fewer than 19 have a probability of 0.001 at 95 %.
    expect(Math.min(order, k, held)).toBeGreaterThanOrEqual(19);
  });

  function covers(interval: readonly [number, number] | null, truth: number): number {
    return interval !== null && interval[0] <= truth && truth <= interval[1] ? 1 : 0;
  }

  it("a known end narrows the order more the better it is known", () => {
    const trace = noisy(1, 0.3, randomDraws(8).normal);
    const errors = [0.0001, 0.003, 0.01, 0.1].map(
      (standardUncertainty) =>
        fitted({ ...trace, order: "free", endSignal: { kind: "known", value: 0.02, standardUncertainty } })
          .order.standardError ?? 0,
    );
    expect(errors).toEqual(errors.toSorted((a, b) => a - b));
    const free = fitted({ ...trace, order: "free" });
    expect(errors.at(-1)).toBeLessThan(1.2 * (free.order.standardError ?? 0));
    expect(flagOf(free, "end-signal-free")?.severity).toBe("weakens");
  });

  it("what the stated end decides has its degrees of freedom, which are many", () => {
    const trace = { time: [0, 75, 119, 185], signal: [9.62, 12.1, 13.1, 14.75], order: 1 } as const;
    const fit = fitted({ ...trace, endSignal: { kind: "known", value: 21.05, standardUncertainty: 0.05 } });
    expect(fit.degreesOfFreedom).toBeCloseTo(2, 2);
    const [low, high] = fit.endSignal.interval ?? [0, 0];
    expect((high - low) / 2 / 0.05).toBeCloseTo(1.96, 2);
    // k is decided by both.
    const [least, most] = fit.logRateConstant.interval ?? [0, 0];
    expect((most - least) / 2 / (fit.logRateConstant.standardError ?? 1)).toBeLessThan(4.3);
  });

  it("an end that the readings contradict is flagged, and blocks from three standard uncertainties on", () => {
    const trace = noisy(1, 0, randomDraws(9).normal, 200);
    const fitAt = (value: number) =>
      fitted({ ...trace, order: 1, endSignal: { kind: "known", value, standardUncertainty: 0.005 } });
    expect(flagOf(fitAt(0.022), "end-conflict")).toBeUndefined();
    const wrong = fitAt(0.06);
    expect(flagOf(wrong, "end-conflict")?.severity).toBe("blocks");
    expect(wrong.endConflict).toBeLessThan(-3);
  });

  it("at low conversion the order is not shown", () => {
    const trace = simulateTrace(
      {
        order: 1,
        progress: progressTo(0.15, 1),
        readings: 60,
        duration: 100,
        start: 0.6,
        span: -0.6,
        noise: 0.003,
        autocorrelation: 0,
      },
      randomDraws(2).normal,
    );
    const free = fitted({ ...trace, order: "free", endSignal: { kind: "zero" } });
    expect([flagOf(free, "order-not-shown"), flagOf(free, "order-at-bound")].some(Boolean)).toBe(true);
    const held = fitted({ ...trace, order: 1, endSignal: { kind: "zero" } });
    expect(flagOf(held, "order-not-shown")?.severity).toBe("weakens");
  });

  it("a wrong held order is contradicted", () => {
    const trace = noisy(2, 0, randomDraws(6).normal);
    const endSignal = { kind: "known", value: 0.02, standardUncertainty: 0.001 } as const;
    expect(flagOf(fitted({ ...trace, order: 0, endSignal }), "order-disagrees")?.message).toMatch(/above 0/);
    expect(flagOf(fitted({ ...trace, order: 2, endSignal }), "order-disagrees")).toBeUndefined();
  });

  it("strong correlation is flagged", () => {
    const trace = noisy(1, 0.96, randomDraws(12).normal, 400);
    expect(flagOf(fitted({ ...trace, order: 1 }), "autocorrelated")?.severity).toBe("weakens");
  });

  it("a signal that moves away from its end is refused a rate constant", () => {
    const { time } = courseOf(1, 0.8);
    const fit = fitted({
      time,
      signal: Array.from(time, (t) => 0.2 + 0.01 * t),
      order: 1,
      endSignal: { kind: "zero" },
    });
    expect(flagOf(fit, "rate-at-bound")?.severity).toBe("blocks");
    expect(fit.rateConstant.estimate).toBeNull();
  });
});

describe("what cannot be fitted is named", () => {
  const good = { time: [0, 1, 2, 3, 4, 5], signal: [1, 0.7, 0.5, 0.35, 0.25, 0.18], order: 1 } as const;

  it.each([
    ["not-increasing", { ...good, time: [0, 1, 1, 3, 4, 5] }],
    ["lengths-differ", { ...good, signal: [1, 0.7] }],
    ["not-finite", { ...good, signal: [1, 0.7, Number.NaN, 0.35, 0.25, 0.18] }],
    ["not-finite", { ...good, signal: [1e300, 0.7, 0.5, 0.35, 0.25, 0.18] }],
    ["constant-signal", { ...good, signal: [1, 1, 1, 1, 1, 1] }],
  ] as const)("%s", (code, input) => {
    expect(fitIntegratedLaw(input)).toMatchObject({
      status: "unusable",
      code,
      message: expect.stringMatching(/\.$/),
    });
  });

  it("too few readings, with what is needed", () => {
    expect(fitIntegratedLaw({ time: [0, 1], signal: [1, 0.5], order: "free" })).toMatchObject({
      status: "too-few-points",
      needed: 4,
      got: 2,
    });
    expect(fitIntegratedLaw({ ...good, timeZero: 99 })).toMatchObject({ status: "too-few-points", got: 0 });
  });

  it("a programmer's errors throw", () => {
    expect(() => fitIntegratedLaw({ ...good, order: 7 })).toThrow(RangeError);
    expect(() => fitIntegratedLaw({ ...good, level: 1 })).toThrow(RangeError);
    const endSignal = { kind: "known", value: 0, standardUncertainty: -1 } as const;
    expect(() => fitIntegratedLaw({ ...good, endSignal })).toThrow(RangeError);
  });
});
