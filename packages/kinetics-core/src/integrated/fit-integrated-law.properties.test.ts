import fc from "fast-check";
import { randomDraws } from "kinetics-core/random";
import { progressTo, simulateTrace } from "kinetics-core/simulation";
import { placesNotFinite } from "kinetics-core/testing";
import { describe, expect, it } from "vitest";
import { fitIntegratedLaw } from "./fit-integrated-law";
import type { IntegratedLawFit, IntegratedLawInput } from "./integrated-law";

fc.configureGlobal({ seed: 1884 });

const trace: fc.Arbitrary<IntegratedLawInput> = fc
  .record({
    seed: fc.nat(),
    order: fc.constantFrom(0.5, 1, 2),
    isFree: fc.boolean(),
    conversion: fc.double({ min: 0.5, max: 0.95, noNaN: true }),
    noise: fc.constantFrom(1e-4, 0.005),
  })
  .map(({ seed, order, isFree, conversion, noise }) => ({
    ...simulateTrace(
      {
        order,
        progress: progressTo(conversion, order),
        duration: 300,
        readings: 60,
        start: 1,
        span: -0.8,
        noise,
        autocorrelation: 0,
      },
      randomDraws(seed).normal,
    ),
    order: isFree ? "free" : order,
    endSignal: { kind: "known", value: 0.2, standardUncertainty: 0.002 },
  }));

describe("fitIntegratedLaw", () => {
  it("moves k as its unit says when signal and time change theirs", () => {
    fc.assert(
      fc.property(trace, fc.constantFrom(1e-3, 1e3), fc.constantFrom(1 / 60, 60), (input, amount, time) => {
        const before = fitted(input);
        const after = fitted({
          ...input,
          time: Array.from(input.time, (t) => t * time),
          signal: Array.from(input.signal, (s) => s * amount),
          endSignal: { kind: "known", value: 0.2 * amount, standardUncertainty: 0.002 * amount },
        });
        const order = before.order.estimate ?? Number.NaN;
        const error = before.logRateConstant.standardError ?? Number.NaN;
        const moved =
          (after.logRateConstant.estimate ?? Number.NaN) - (before.logRateConstant.estimate ?? Number.NaN);
        const byUnit = (1 - order) * Math.log(amount) - Math.log(time);
        // A fitted order is settled to a thousandth of its standard error, and k turns about it.
        const slack =
          input.order === "free" ? 1e-3 * (before.order.standardError ?? 0) * Math.abs(Math.log(amount)) : 0;
        expect(Math.abs(moved - byUnit)).toBeLessThan(0.01 * error + slack);
        expect(
          (after.halfLife.estimate ?? Number.NaN) / ((before.halfLife.estimate ?? Number.NaN) * time),
        ).toBeCloseTo(1, 5);
      }),
      { numRuns: 25 },
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
        fc.array(number, { maxLength: 14 }),
        fc.array(number, { minLength: 14, maxLength: 14 }),
        fc.constantFrom<number | "free">(0, 0.5, 1, 2, "free"),
        (steps, signal, order) => {
          let t = 0;
          const time = steps.map((step) => (t += Math.abs(step)));
          const result = fitIntegratedLaw({ time, signal: signal.slice(0, time.length), order });
          statuses.add(result.status);
          expect(placesNotFinite(result)).toEqual([]);
          if (result.status !== "fitted") expect(result.message).toMatch(/^\S.{20,}\.$/);
        },
      ),
      { numRuns: 150 },
    );
    expect([...statuses]).toEqual(expect.arrayContaining(["fitted", "too-few-points", "unusable"]));
  });
});

function fitted(input: IntegratedLawInput): IntegratedLawFit {
  const result = fitIntegratedLaw(input);
  if (result.status !== "fitted") throw new Error(result.message);
  return result;
}
