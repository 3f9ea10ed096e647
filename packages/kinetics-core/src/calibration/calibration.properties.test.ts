import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type CalibrateInput, type Calibration, calibrate } from "./index";

// The same cases on every machine; 8 000 others of each were tried once.
fc.configureGlobal({ seed: 1954 });

/** Standards of any size, some of them replicates, with or without weights, and readings of any size. */
const size = fc.double({ min: 0.1, max: 10, noNaN: true });
const scale = fc.integer({ min: -12, max: 12 }).map((power) => 10 ** power);
const standards = fc
  .array(fc.tuple(fc.integer({ min: 0, max: 9 }), fc.integer({ min: -100, max: 100 }), size), {
    minLength: 4,
    maxLength: 15,
  })
  .filter((rows) => new Set(rows.map(([level]) => level)).size >= 3);
const study = fc.record({
  rows: standards,
  slope: size,
  offset: fc.double({ min: -2, max: 2, noNaN: true }),
  intercept: fc.constantFrom("fitted" as const, "none" as const),
  weighted: fc.boolean(),
});
type Study = typeof study extends fc.Arbitrary<infer T> ? T : never;

function inputOf({ rows, slope, offset, intercept, weighted }: Study): CalibrateInput {
  const concentrations = rows.map(([level]) => 1 + level);
  return {
    concentrations,
    signals: rows.map(([, error], i) => offset + slope * (concentrations[i] ?? 0) + 0.001 * error),
    intercept,
    readings: [[offset + 4 * slope], [offset + 2 * slope, offset + 2.1 * slope]],
    ...(weighted ? { weights: rows.map(([, , weight]) => weight) } : {}),
  };
}

function calibrated(input: CalibrateInput): Calibration {
  const result = calibrate(input);
  if (result.status !== "calibrated") throw new Error(result.message);
  return result;
}

/** Every number of an answer, flags' sentences included. */
function assertNoNaN(value: unknown, path = "answer"): void {
  if (typeof value === "number") expect(value, path).not.toBeNaN();
  else if (typeof value === "string") expect(value, path).not.toMatch(/NaN|Infinity|undefined|null/);
  else if (value !== null && typeof value === "object")
    for (const [key, item] of Object.entries(value)) assertNoNaN(item, `${path}.${key}`);
}

function near(value: number | null | undefined, wanted: number | null | undefined, tolerance = 1e-7): void {
  if (wanted === null || wanted === undefined || value === null || value === undefined)
    expect(value ?? null).toBe(wanted ?? null);
  else expect(Math.abs(value - wanted)).toBeLessThanOrEqual(tolerance * Math.max(Math.abs(wanted), 1e-9));
}

describe("a calibration", () => {
  it("scales with the unit of concentration: slope as its inverse, readings and limits with it", () => {
    fc.assert(
      fc.property(study, scale, (one, factor) => {
        const input = inputOf(one);
        const plain = calibrated(input);
        // Rounding errors obey no scale.
        fc.pre(!plain.line.exact);
        const scaled = calibrated({ ...input, concentrations: input.concentrations.map((x) => factor * x) });
        near((scaled.line.slope.estimate ?? 0) * factor, plain.line.slope.estimate);
        near(scaled.line.residualStandardDeviation, plain.line.residualStandardDeviation);
        near((scaled.limitOfDetection ?? 0) / factor, plain.limitOfDetection);
        plain.readings.forEach((reading, i) => {
          near((scaled.readings[i]?.estimate ?? 0) / factor, reading.estimate);
          expect(scaled.readings[i]?.set?.kind).toBe(reading.set?.kind);
          if (reading.interval !== null)
            near((scaled.readings[i]?.interval?.[1] ?? 0) / factor, reading.interval[1]);
        });
        if (plain.linearRange.status === "assessed" && scaled.linearRange.status === "assessed")
          near(scaled.linearRange.straightUpTo / factor, plain.linearRange.straightUpTo, 1e-5);
      }),
    );
  });

  it("scales with the unit of the signal: readings, correlation and R² stay", () => {
    fc.assert(
      fc.property(study, scale, (one, factor) => {
        const input = inputOf(one);
        const plain = calibrated(input);
        // Rounding errors obey no scale.
        fc.pre(!plain.line.exact);
        const scaled = calibrated({
          ...input,
          signals: input.signals.map((y) => factor * y),
          readings: (input.readings ?? []).map((signals) => signals.map((y) => factor * y)),
        });
        near((scaled.line.slope.estimate ?? 0) / factor, plain.line.slope.estimate);
        near((scaled.line.residualStandardDeviation ?? 0) / factor, plain.line.residualStandardDeviation);
        near(scaled.line.correlation, plain.line.correlation);
        near(scaled.line.rSquared, plain.line.rSquared);
        plain.readings.forEach((reading, i) => {
          near(scaled.readings[i]?.estimate, reading.estimate);
          near(scaled.readings[i]?.standardError, reading.standardError);
        });
      }),
    );
  });

  it("does not depend on the order of its standards, nor on the scale of their weights", () => {
    fc.assert(
      fc.property(study, scale, fc.infiniteStream(fc.double({ noNaN: true })), (one, factor, keys) => {
        const input = inputOf(one);
        const order = input.concentrations
          .map((_, i) => ({ i, key: keys.next().value ?? 0 }))
          .sort((a, b) => a.key - b.key)
          .map(({ i }) => i);
        const plain = calibrated(input);
        // Rounding errors obey no scale.
        fc.pre(!plain.line.exact);
        const shuffled = calibrated({
          ...input,
          concentrations: order.map((i) => input.concentrations[i] ?? 0),
          signals: order.map((i) => input.signals[i] ?? 0),
          weights: order.map((i) => factor * (input.weights?.[i] ?? 1)),
          readingWeights: (input.readings ?? []).map(() => factor),
        });
        near(shuffled.line.slope.estimate, plain.line.slope.estimate);
        near(shuffled.line.slope.standardError, plain.line.slope.standardError);
        near(shuffled.line.intercept.estimate, plain.line.intercept.estimate);
        plain.readings.forEach((reading, i) => {
          near(shuffled.readings[i]?.estimate, reading.estimate);
          near(shuffled.readings[i]?.standardError, reading.standardError);
        });
        near(shuffled.lackOfFit?.fStatistic, plain.lackOfFit?.fStatistic, 1e-6);
      }),
    );
  });

  it("answers or refuses, and never with a NaN, whatever numbers come", () => {
    const any = fc.oneof(
      fc.double(),
      fc.constantFrom(0, 1, 1, 2, 1e-300, 1e300, Number.NaN, Number.POSITIVE_INFINITY, 1e-20, 1e20),
    );
    fc.assert(
      fc.property(
        fc.array(any, { maxLength: 8 }),
        fc.array(any, { maxLength: 8 }),
        fc.option(fc.array(any, { maxLength: 8 }), { nil: undefined }),
        fc.array(fc.array(any, { maxLength: 3 }), { maxLength: 3 }),
        fc.boolean(),
        (concentrations, signals, weights, readings, alike) => {
          const length = Math.min(concentrations.length, signals.length);
          assertNoNaN(
            calibrate({
              concentrations: alike ? concentrations.slice(0, length) : concentrations,
              signals: alike ? signals.slice(0, length) : signals,
              readings,
              ...(weights === undefined ? {} : { weights }),
            }),
          );
        },
      ),
      { numRuns: 400 },
    );
  });
});
