import fc from "fast-check";
import { randomDraws } from "kinetics-core/random";
import { progressTo, simulateTrace } from "kinetics-core/simulation";
import { placesNotFinite } from "kinetics-core/testing";
import { describe, expect, it } from "vitest";
import { chooseStudyRule } from "./choose-study-rule";
import { estimateInitialRate } from "./estimate-initial-rate";
import type { InitialRate, InitialRateFound, InitialRateOptions, Trace } from "./initial-rate";
import { slopeAgainstWindowEnd } from "./slope-against-window-end";
import { traceNoise } from "./trace-noise";

fc.configureGlobal({ seed: 1850 });

const SPAN = 0.8;

/** Traces of every order, conversion, noise and length that a run of the bench has. */
const trace: fc.Arbitrary<Trace> = fc
  .record({
    seed: fc.nat(),
    order: fc.constantFrom(0.5, 1, 1.5, 2),
    conversion: fc.double({ min: 0.05, max: 0.9, noNaN: true }),
    readings: fc.constantFrom(6, 12, 40, 120),
    noise: fc.constantFrom(0, 1e-4, 0.005, 0.02),
    autocorrelation: fc.constantFrom(0, 0.5),
    direction: fc.constantFrom(1, -1),
  })
  .map(({ seed, order, conversion, direction, ...rest }) =>
    simulateTrace(
      {
        order,
        progress: progressTo(conversion, order),
        duration: 300,
        start: 0.1,
        span: SPAN * direction,
        ...rest,
      },
      randomDraws(seed).normal,
    ),
  );

const options: fc.Arbitrary<InitialRateOptions> = fc.oneof(
  fc.constant({}),
  fc.constant({ signalSpan: SPAN }),
  fc
    .constantFrom("straight", "tangent", "exponential", "integrated")
    .map((estimator) => ({ estimator, signalSpan: SPAN }) as const),
  fc.constant({ signalSpan: SPAN, window: [0, 150] as const }),
  fc.constant({ signalSpan: SPAN, rule: { conversionEnd: 0.3, pair: "quadratic-cubic" } as const }),
);

describe("a change of units", () => {
  it("moves slope and error by its factor, and no choice", () => {
    fc.assert(
      fc.property(
        trace,
        options,
        fc.constantFrom(1 / 3600, 60, 1000),
        fc.constantFrom(1e-6, 1000, -1),
        (one, how, time, signal) => {
          const scaled = {
            time: Array.from(one.time, (t) => t * time),
            signal: Array.from(one.signal, (s) => s * signal),
          };
          const moved: InitialRateOptions = {
            ...how,
            ...(how.signalSpan === undefined ? {} : { signalSpan: how.signalSpan * Math.abs(signal) }),
            ...(how.window === undefined ? {} : { window: [how.window[0] * time, how.window[1] * time] }),
          };
          expectAlike(estimateInitialRate(scaled, moved), estimateInitialRate(one, how), signal / time);
        },
      ),
      { numRuns: 60 },
    );
  });

  it("neither does another clock or another zero of the signal", () => {
    fc.assert(
      fc.property(
        trace,
        options,
        fc.integer({ min: -500, max: 500 }),
        fc.integer({ min: -4, max: 4 }),
        (one, how, later, higher) => {
          const shifted = {
            time: Array.from(one.time, (t) => t + later),
            signal: Array.from(one.signal, (s) => s + higher),
          };
          const moved: InitialRateOptions = {
            ...how,
            timeZero: later,
            ...(how.window === undefined ? {} : { window: [how.window[0] + later, how.window[1] + later] }),
          };
          expectAlike(estimateInitialRate(shifted, moved), estimateInitialRate(one, how), 1);
        },
      ),
      { numRuns: 40 },
    );
  });
});

describe("the rule of a study", () => {
  it("depends neither on the order of its runs nor on their units", () => {
    fc.assert(
      fc.property(
        fc.array(trace, { minLength: 2, maxLength: 4 }),
        fc.constantFrom(60, 1e-3),
        (traces, factor) => {
          const runs = traces.map((one, i) => ({
            label: `R${i}`,
            trace: one,
            timeZero: 0,
            signalSpan: SPAN,
          }));
          const rule = chooseStudyRule(runs)?.rule;
          expect(chooseStudyRule(runs.toReversed())?.rule).toEqual(rule);
          const scaled = runs.map((run) => ({
            ...run,
            trace: { time: Array.from(run.trace.time, (t) => t * factor), signal: run.trace.signal },
          }));
          expect(chooseStudyRule(scaled)?.rule).toEqual(rule);
        },
      ),
      { numRuns: 15 },
    );
  });
});

describe("whatever is given", () => {
  const number = fc.oneof(
    { weight: 60, arbitrary: fc.double({ min: -10, max: 10, noNaN: true }) },
    { weight: 1, arbitrary: fc.double() },
    {
      weight: 1,
      arbitrary: fc.constantFrom(0, -0, 1e-320, 1e300, -1e155, Number.NaN, Number.NEGATIVE_INFINITY),
    },
  );
  const step = fc.oneof(
    { weight: 60, arbitrary: fc.double({ min: 1e-3, max: 10, noNaN: true }) },
    { weight: 1, arbitrary: fc.constantFrom(0, 1e-300, 1e-8, 1e20, 1e300) },
  );
  const anyTrace = fc
    .tuple(
      fc.array(step, { maxLength: 40 }),
      fc.array(number, { minLength: 40, maxLength: 40 }),
      fc.boolean(),
    )
    .map(([steps, signal, isEven]) => {
      let t = 0;
      const time = steps.map((one) => (t += one));
      return { time, signal: isEven ? signal.slice(0, time.length) : signal };
    });
  const anyOptions: fc.Arbitrary<InitialRateOptions> = fc.record(
    {
      timeZero: fc.double({ min: -5, max: 50, noNaN: true }),
      signalSpan: number,
      estimator: fc.constantFrom(
        "auto" as const,
        "straight" as const,
        "tangent" as const,
        "exponential" as const,
        "integrated" as const,
      ),
      degree: fc.constantFrom(2 as const, 3 as const, 4 as const),
      window: fc.tuple(
        fc.double({ noNaN: true, noDefaultInfinity: true }),
        fc.double({ noNaN: true, noDefaultInfinity: true }),
      ),
    },
    { requiredKeys: [] },
  );

  it("no number comes back that is none, and a failure says what was found", () => {
    const statuses = new Set<string>();
    fc.assert(
      fc.property(anyTrace, anyOptions, (one, how) => {
        const timeZero = how.timeZero ?? 0;
        const result = estimateInitialRate(one, how);
        statuses.add(result.status);
        expectPlain(result);
        expectPlain(traceNoise(one, timeZero));
        expectPlain(slopeAgainstWindowEnd(one, { timeZero }));
        expectPlain(
          chooseStudyRule([{ label: "R1", trace: one, timeZero, signalSpan: how.signalSpan ?? null }]),
        );
        if (result.status !== "found") expect(result.message).toMatch(/^\p{L}.{20,}\.$/u);
      }),
      { numRuns: 500 },
    );
    expect([...statuses].toSorted()).toEqual(["found", "too-few-points", "unusable"]);
  });

  it.each<[InitialRateOptions, string]>([
    [{ level: 0 }, "level is 0; a confidence level lies between 0 and 1"],
    [{ timeZero: Number.NaN }, "timeZero is NaN; the time of mixing is a finite number"],
    [{ window: [Number.NaN, 10] }, "window is NaN to 10; its ends are two numbers"],
  ])("settings that are none are a programmer's error: %o", (how, message) => {
    expect(() => estimateInitialRate({ time: [0, 1, 2, 3, 4], signal: [0, 1, 2, 3, 4] }, how)).toThrow(
      new RangeError(message),
    );
  });

  it.each([
    [[0, 1, 2, 3, 1e12], "cannot be told apart in a trace of length 1000000000000"],
    [[0, 1, 2, 3, 1e70], "The time of reading 5 is 1e+70 and so beyond what is computed with"],
    [[0, 1e-70, 2e-70, 3e-70, 4e-70], "All 5 readings lie within 4e-70 of each other in time"],
  ])("times of %j are refused by name", (time, message) => {
    expect(estimateInitialRate({ time, signal: [0, 1, 2, 3, 4] })).toMatchObject({
      status: "unusable",
      message: expect.stringContaining(message),
    });
  });
});

function expectPlain(value: unknown): void {
  expect(placesNotFinite(value)).toEqual([]);
}

/** Same choices, and slopes that differ by the factor to the digits that a double's rounding leaves. */
function expectAlike(after: InitialRate, before: InitialRate, factor: number): void {
  expect(after.status).toBe(before.status);
  if (after.status !== "found" || before.status !== "found") return;
  const choices = ({ estimator, degree, pair, points }: InitialRateFound) => ({
    estimator,
    degree,
    pair,
    points,
  });
  expect(choices(after)).toEqual(choices(before));
  const scale = Math.abs(factor) * (Math.abs(before.slope) + before.standardError);
  expect(Math.abs(after.slope - factor * before.slope)).toBeLessThan(1e-6 * scale);
  expect(Math.abs(after.standardError - Math.abs(factor) * before.standardError)).toBeLessThan(1e-6 * scale);
}
