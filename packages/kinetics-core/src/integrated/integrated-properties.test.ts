import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { EndSignal } from "./end-signal";
import { fitBurst } from "./fit-burst";
import { fitIntegratedLaw } from "./fit-integrated-law";
import type { IntegratedLawFit, IntegratedLawInput } from "./integrated-law";
import { orderOfTrace } from "./order-of-trace";

/** Courses of some order with a little noise that is part of the case. */
const measuredCourse = fc
  .record({
    order: fc.constantFrom(0, 0.5, 1, 1.5, 2),
    rate: fc.integer({ min: 30, max: 120 }).map((hundredths) => hundredths / 100),
    // Whole steps: what is all but exact is judged by its rounding, which units change.
    noise: fc.array(
      fc.integer({ min: -10, max: 9 }).map((step) => (step + 0.5) / 1000),
      { minLength: 12, maxLength: 24 },
    ),
    offset: fc.integer({ min: -30, max: 30 }).map((hundredths) => hundredths / 100),
    rising: fc.boolean(),
  })
  .map(({ order, rate, noise, offset, rising }) => {
    const time = noise.map((_, i) => i / (noise.length - 1));
    const left = (t: number) =>
      order === 1 ? Math.exp(-rate * t) : Math.max(1 + (order - 1) * rate * t, 0) ** (1 / (1 - order));
    const signal = noise.map((error, i) => offset + (rising ? -1 : 1) * (left(time[i] ?? 0) + error));
    return { time, signal, order, offset };
  });

function fitted(input: IntegratedLawInput): IntegratedLawFit {
  const result = fitIntegratedLaw(input);
  if (result.status !== "fitted") throw new Error(`expected a fit, got ${result.status}: ${result.message}`);
  return result;
}

/** Both null, or equal to so many parts. */
function expectRatio(found: number | null, before: number | null, ratio: number): void {
  if (before === null || found === null) {
    expect(found).toBe(before);
    return;
  }
  expect(Math.abs(found - ratio * before)).toBeLessThanOrEqual(
    2e-6 * Math.abs(ratio * before) + 1e-12 * ratio,
  );
}

const scale = fc.integer({ min: -6, max: 6 }).map((power) => 10 ** power);

describe("units", () => {
  it("of time and signal scale k as its unit says, and nothing else", () => {
    fc.assert(
      fc.property(measuredCourse, scale, scale, ({ time, signal, order, offset }, s, f) => {
        const endOf = (factor: number): EndSignal => ({
          kind: "known",
          value: factor * offset,
          standardUncertainty: factor * 0.01,
        });
        const before = fitted({ time, signal, order, endSignal: endOf(1) });
        const after = fitted({
          time: time.map((t) => s * t),
          signal: signal.map((value) => f * value),
          order,
          endSignal: endOf(f),
        });
        expectRatio(after.rateConstant.estimate, before.rateConstant.estimate, f ** (1 - order) / s);
        expectRatio(
          after.rateConstant.standardError,
          before.rateConstant.standardError,
          f ** (1 - order) / s,
        );
        expectRatio(after.halfLife.estimate, before.halfLife.estimate, s);
        expectRatio(after.residualStandardDeviation, before.residualStandardDeviation, f);
        expect(after.flags.map(({ code }) => code)).toEqual(before.flags.map(({ code }) => code));
      }),
      { numRuns: 25, seed: 17 },
    );
  });

  it("leave the free order alone", () => {
    fc.assert(
      fc.property(measuredCourse, scale, ({ time, signal, offset }, s) => {
        const endSignal = { kind: "known", value: offset, standardUncertainty: 0 } as const;
        const before = fitted({ time, signal, order: "free", endSignal });
        const after = fitted({ time: time.map((t) => s * t), signal, order: "free", endSignal });
        expectRatio(after.order.estimate, before.order.estimate, 1);
        expectRatio(after.order.standardError, before.order.standardError, 1);
      }),
      { numRuns: 15, seed: 18 },
    );
  });

  it("a trace turned upside down about its end has the same k", () => {
    fc.assert(
      fc.property(measuredCourse, ({ time, signal, order, offset }) => {
        const endSignal = { kind: "known", value: offset, standardUncertainty: 0.01 } as const;
        const before = fitted({ time, signal, order, endSignal });
        const after = fitted({ time, signal: signal.map((value) => 2 * offset - value), order, endSignal });
        expectRatio(after.rateConstant.estimate, before.rateConstant.estimate, 1);
      }),
      { numRuns: 15, seed: 19 },
    );
  });
});

/** Numbers of every size, and things that are no numbers. */
const anyNumber = fc.oneof(
  fc.double(),
  fc.double({ min: -10, max: 10, noNaN: true }),
  fc.constantFrom(
    0,
    1,
    -1,
    1e-300,
    1e300,
    Number.MAX_VALUE,
    Number.MIN_VALUE,
    Number.POSITIVE_INFINITY,
    Number.NaN,
  ),
);

const anyTime = fc.oneof(
  fc.array(anyNumber, { maxLength: 12 }),
  fc
    .array(fc.double({ min: 0, max: 1e6, noNaN: true }), { maxLength: 14 })
    .map((times) => times.toSorted((a, b) => a - b)),
  fc.integer({ min: 0, max: 20 }).map((count) => Array.from({ length: count }, (_, i) => i)),
);

const anyEnd = fc.oneof(
  fc.constant<EndSignal>({ kind: "zero" }),
  fc.constant<EndSignal>({ kind: "free" }),
  fc
    .record({
      value: fc.double({ min: -1e20, max: 1e20, noNaN: true }),
      standardUncertainty: fc.oneof(fc.constant(0), fc.double({ min: 1e-300, max: 1e20, noNaN: true })),
    })
    .map((end): EndSignal => ({ kind: "known", ...end })),
);

function numbersIn(value: unknown): number[] {
  if (typeof value === "number") return [value];
  if (value instanceof Float64Array) return [...value];
  if (Array.isArray(value)) return value.flatMap(numbersIn);
  return typeof value === "object" && value !== null ? Object.values(value).flatMap(numbersIn) : [];
}

describe("hostile numbers", () => {
  const plainNumber = fc.oneof(
    fc.integer({ min: -5, max: 5 }),
    fc.double({ min: -1e6, max: 1e6, noNaN: true }),
    fc.double({ min: -1e-6, max: 1e-6, noNaN: true }),
  );
  const anyTrace = fc
    .tuple(
      anyTime,
      fc.oneof(
        fc.array(anyNumber, { minLength: 20, maxLength: 20 }),
        fc.array(plainNumber, { minLength: 20, maxLength: 20 }),
      ),
    )
    .map(([time, signal]) => ({ time, signal: signal.slice(0, time.length) }));

  it("end in a fit of finite numbers or in a named refusal, never in an exception or in NaN", () => {
    fc.assert(
      fc.property(
        anyTrace,
        fc.constantFrom(0, 0.5, 1, 2, -1, "free" as const),
        anyEnd,
        (trace, order, endSignal) => {
          for (const result of [
            fitIntegratedLaw({ ...trace, order, endSignal }),
            orderOfTrace({ ...trace, endSignal }),
            fitBurst(trace),
          ]) {
            expect(numbersIn(result).filter((value) => !Number.isFinite(value))).toEqual([]);
            if ("message" in result) expect(result.message).toMatch(/\S.*\.$/);
          }
        },
      ),
      { numRuns: 120, seed: 23 },
    );
  });
});
