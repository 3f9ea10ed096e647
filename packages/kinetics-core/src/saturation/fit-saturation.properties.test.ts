import fc from "fast-check";
import type { Estimate } from "kinetics-core/quantities";
import { randomDraws } from "kinetics-core/random";
import { placesNotFinite } from "kinetics-core/testing";
import { describe, expect, it } from "vitest";
import { fitSaturation } from "./fit-saturation";
import type { SaturationFit, SaturationInput } from "./saturation";

fc.configureGlobal({ seed: 1913 });

const LEVELS = [0.02, 0.02, 0.06, 0.06, 0.11, 0.22, 0.56, 1.1, 1.1];

const rates: fc.Arbitrary<SaturationInput> = fc
  .record({
    seed: fc.nat(),
    half: fc.double({ min: 0.03, max: 0.6, noNaN: true }),
    noise: fc.constantFrom(1e-4, 0.02),
  })
  .map(({ seed, half, noise }) => {
    const { normal } = randomDraws(seed);
    return {
      concentrations: LEVELS,
      rates: LEVELS.map((c) => (200 * c) / (half + c) + 200 * noise * normal()),
    };
  });

describe("fitSaturation", () => {
  it("moves with the units of concentration and rate, and not with the order of the points", () => {
    fc.assert(
      fc.property(
        rates,
        fc.constantFrom(1e-6, 1e3),
        fc.constantFrom(1 / 60, 1e-9),
        fc.nat(),
        (input, amount, rate, seed) => {
          const before = fitted(input);
          const { whole } = randomDraws(seed);
          const left = input.concentrations.map((_, i) => i);
          const order = input.concentrations.flatMap(() => left.splice(whole(left.length), 1));
          const after = fitted({
            concentrations: order.map((i) => (input.concentrations[i] ?? Number.NaN) * amount),
            rates: order.map((i) => (input.rates[i] ?? Number.NaN) * rate),
          });
          expectScaled(after.limitingRate, before.limitingRate, rate);
          expectScaled(after.halfSaturation, before.halfSaturation, amount);
          expectScaled(after.initialSlope, before.initialSlope, rate / amount);
          expect(after.correlation).toBeCloseTo(before.correlation ?? Number.NaN, 6);
          expect(after.lackOfFit?.fStatistic).toBeCloseTo(before.lackOfFit?.fStatistic ?? Number.NaN, 5);
        },
      ),
      { numRuns: 40 },
    );
  });

  it("hands out no number that is none, whatever is given", () => {
    const number = fc.oneof(
      { weight: 40, arbitrary: fc.double({ min: 1e-3, max: 10, noNaN: true }) },
      { weight: 1, arbitrary: fc.double() },
      { weight: 1, arbitrary: fc.constantFrom(0, -1, 1e-320, 1e300, Number.NaN, Number.POSITIVE_INFINITY) },
    );
    const statuses = new Set<string>();
    fc.assert(
      fc.property(
        fc.array(number, { maxLength: 12 }),
        fc.array(number, { minLength: 12, maxLength: 12 }),
        (c, v) => {
          const result = fitSaturation({ concentrations: c, rates: v.slice(0, c.length) });
          statuses.add(result.status);
          expect(placesNotFinite(result)).toEqual([]);
          if (result.status !== "fitted") expect(result.message).toMatch(/^\S.{20,}\.$/);
        },
      ),
      { numRuns: 300 },
    );
    expect([...statuses].toSorted()).toEqual(["bad-input", "fitted", "too-few-points"]);
  });
});

function fitted(input: SaturationInput): SaturationFit {
  const result = fitSaturation(input);
  if (result.status !== "fitted") throw new Error(result.message);
  return result;
}

function expectScaled(after: Estimate, before: Estimate, factor: number): void {
  const pairs = [
    [after.estimate, before.estimate],
    [after.standardError, before.standardError],
    [after.interval?.[0] ?? null, before.interval?.[0] ?? null],
    [after.interval?.[1] ?? null, before.interval?.[1] ?? null],
  ] as const;
  for (const [moved, from] of pairs) {
    if (moved === null || from === null) expect(moved).toBe(from);
    else expect(moved / (from * factor)).toBeCloseTo(1, 5);
  }
}
