import fc from "fast-check";
import type { Estimate } from "kinetics-core/quantities";
import { randomDraws } from "kinetics-core/random";
import { nineRecipes, type Scenario, simulateRuns } from "kinetics-core/simulation";
import { placesNotFinite } from "kinetics-core/testing";
import { describe, expect, it } from "vitest";
import { fitRateLaw } from "./fit-rate-law";
import type { RateLawFit, RateLawInput, RateLawRun } from "./rate-law";

fc.configureGlobal({ seed: 1850 });

/** Studies of every kind that a fit meets: even and uneven errors, shared stocks, pipetting, blocks, held orders. */
const study: fc.Arbitrary<RateLawInput> = fc
  .record({
    seed: fc.nat(),
    orders: fc.tuple(
      fc.double({ min: -1, max: 2.5, noNaN: true }),
      fc.double({ min: -1, max: 2.5, noNaN: true }),
    ),
    logRateConstant: fc.double({ min: -12, max: 5, noNaN: true }),
    scatter: fc.constantFrom(0, 0.01, 0.05),
    errors: fc.constantFrom(0, 0.01, 0.08, 0.25),
    pipetting: fc.constantFrom(0, 0.005),
    sharedStock: fc.boolean(),
    hasBlocks: fc.boolean(),
    held: fc.boolean(),
  })
  .map((one) => {
    const scenario: Scenario = {
      species: ["A", "B"],
      orders: one.orders,
      rateConstant: Math.exp(one.logRateConstant),
      recipes: nineRecipes,
      scatter: one.scatter,
      rateErrors: nineRecipes.map((_, j) => one.errors * (1 + (j % 3))),
      pipetting: one.pipetting,
      shared: one.sharedStock
        ? [
            { species: ["A"], relative: 0.01 },
            { species: [], onRate: true, relative: 0.02 },
          ]
        : [],
      ...(one.hasBlocks ? { blocks: nineRecipes.map((_, j) => `day ${j % 2}`), blockScatter: 0.02 } : {}),
    };
    const input = simulateRuns(scenario, randomDraws(one.seed).normal);
    return one.held ? { ...input, orders: { B: 1 } } : input;
  });

function fitted(input: RateLawInput): RateLawFit {
  const result = fitRateLaw(input);
  if (result.status !== "fitted") throw new Error(result.message);
  return result;
}

describe("a change of units", () => {
  const factor = fc.integer({ min: -6, max: 6 }).map((power) => 10 ** power);

  it("of concentration moves k as its unit says, and nothing else", () => {
    fc.assert(
      fc.property(study, factor, (input, scale) => {
        const before = fitted(input);
        const after = fitted(scaled(input, scale, scale));
        expectSameOrders(after, before);
        const overall = Object.values(before.orders).reduce(
          (sum, { estimate }) => sum + (estimate ?? Number.NaN),
          0,
        );
        expectMoved(after.logRateConstant, before.logRateConstant, (1 - overall) * Math.log(scale), null);
        expectMoved(logOf(after.centre.rate), logOf(before.centre.rate), Math.log(scale), 1e-7);
      }),
      { numRuns: 8 },
    );
  });

  it("of time moves k by its factor, with the same uncertainty", () => {
    fc.assert(
      fc.property(study, factor, (input, scale) => {
        const before = fitted(input);
        const after = fitted(scaled(input, 1, scale));
        expectSameOrders(after, before);
        expectMoved(after.logRateConstant, before.logRateConstant, Math.log(scale), 1e-7);
        expect(after.budget.map(({ source }) => source)).toEqual(before.budget.map(({ source }) => source));
      }),
      { numRuns: 8 },
    );
  });
});

describe("the order in which runs and species stand", () => {
  it("changes nothing", () => {
    fc.assert(
      fc.property(study, fc.nat(), (input, seed) => {
        const draws = randomDraws(seed);
        const runs = shuffled(input.runs, draws.whole);
        const before = fitted(input);
        const after = fitted({ ...input, runs });
        expectSameOrders(after, before);
        expectMoved(after.logRateConstant, before.logRateConstant, 0, 1e-7);
        expect(after.flags.map(({ code }) => code).toSorted()).toEqual(
          before.flags.map(({ code }) => code).toSorted(),
        );
        const turned = fitted({ ...input, species: input.species.toReversed() });
        expectSameOrders(turned, before);
        expectMoved(turned.logRateConstant, before.logRateConstant, 0, 1e-7);
      }),
      { numRuns: 8 },
    );
  });
});

describe("whatever is given", () => {
  const number = fc.oneof(
    { weight: 4, arbitrary: fc.double({ min: 1e-6, max: 10, noNaN: true }) },
    { weight: 1, arbitrary: fc.double() },
    {
      weight: 1,
      arbitrary: fc.constantFrom(0, -0, -1, 1e-320, 1e-300, 1e300, Number.NaN, Number.POSITIVE_INFINITY),
    },
  );
  const name = fc.constantFrom("A", "B", "constructor", "__proto__", "");
  const run: fc.Arbitrary<RateLawRun> = fc.record(
    {
      label: fc.constantFrom("R01", "R02", "R03", "R04", "R05"),
      concentrations: fc.dictionary(name, number),
      rate: number,
      rateStandardError: number,
      relativeUncertainty: fc.dictionary(name, number),
      block: fc.constantFrom("Monday", "Tuesday"),
      mixture: fc.constantFrom("M1", "M2"),
    },
    { requiredKeys: ["label", "concentrations", "rate"] },
  );
  const anything: fc.Arbitrary<RateLawInput> = fc.record(
    {
      species: fc.uniqueArray(name, { maxLength: 4 }),
      runs: fc.array(run, { maxLength: 12 }),
      orders: fc.dictionary(
        name,
        fc.oneof(fc.constant("free" as const), fc.constantFrom(0, 1, 2, -1), number),
      ),
      shared: fc.array(
        fc.record(
          {
            species: fc.array(name, { maxLength: 3 }),
            relative: number,
            onRate: fc.boolean(),
            runs: fc.array(fc.constantFrom("R01", "R02", "R09")),
          },
          { requiredKeys: ["species", "relative"] },
        ),
        { maxLength: 3 },
      ),
      temperatureRelative: fc.constantFrom(0, 0.01),
    },
    { requiredKeys: ["species", "runs"] },
  );

  it("no number comes back that is none, and a failure says what was found", () => {
    const statuses = new Set<string>();
    fc.assert(
      fc.property(anything, (input) => {
        const result = fitRateLaw(input);
        statuses.add(result.status);
        expect(placesNotFinite(result)).toEqual([]);
        if (result.status !== "fitted") expect(result.message).toMatch(/^\p{L}.{20,}\.$/u);
        for (const { code, message } of result.flags) {
          expect(code).toMatch(/^[a-z]+(-[a-z]+)*$/);
          expect(message).toMatch(/\.$/);
          expect(message).not.toMatch(/NaN|Infinity|undefined|null/);
        }
      }),
      { numRuns: 150 },
    );
    expect([...statuses]).toEqual(expect.arrayContaining(["fitted", "no-positive-rates", "no-species"]));
  });
});

describe("settings that are none", () => {
  const input = simulateRuns(
    {
      species: ["A", "B"],
      orders: [1, 1],
      rateConstant: 1,
      recipes: nineRecipes,
      scatter: 0,
      rateErrors: [],
    },
    () => 0,
  );
  it.each([
    [{ level: 1 }, "level is 1; a confidence level lies between 0 and 1"],
    [{ level: Number.NaN }, "level is NaN; a confidence level lies between 0 and 1"],
    [
      { temperatureRelative: Number.POSITIVE_INFINITY },
      "temperatureRelative is Infinity; a relative uncertainty is 0 or more",
    ],
  ])("%o is a programmer's error", (settings, message) => {
    expect(() => fitRateLaw({ ...input, ...settings })).toThrow(new RangeError(message));
  });

  it.each<[string, Partial<RateLawInput>, string]>([
    ["a rate", { runs: input.runs.map((run) => ({ ...run, rate: 1e40 })) }, "The rate of R01 is "],
    ["an order", { orders: { A: 1e5 } }, "The order of A is held at "],
    [
      "a shared error",
      { shared: [{ species: ["A"], relative: 1e9 }] },
      "A shared error has the relative uncertainty ",
    ],
    [
      "a relative uncertainty",
      { runs: input.runs.map((run) => ({ ...run, relativeUncertainty: { B: 1e7 } })) },
      "The relative uncertainty of B in R01 is ",
    ],
  ])("%s beyond all sizes is refused by name", (_, part, start) => {
    const result = fitRateLaw({ ...input, ...part });
    expect(result).toMatchObject({ status: "beyond-precision", message: expect.stringContaining(start) });
  });
});

/** `amount`: of everything in concentration; `rate`: of rates and their errors. */
function scaled(input: RateLawInput, amount: number, rate: number): RateLawInput {
  return {
    ...input,
    runs: input.runs.map((run) => ({
      ...run,
      concentrations: Object.fromEntries(
        Object.entries(run.concentrations).map(([name, c]) => [name, c * amount]),
      ),
      rate: run.rate * rate,
      ...(run.rateStandardError === undefined ? {} : { rateStandardError: run.rateStandardError * rate }),
    })),
  };
}

function shuffled<T>(items: readonly T[], whole: (below: number) => number): readonly T[] {
  const left = [...items];
  return items.flatMap(() => left.splice(whole(left.length), 1));
}

function expectSameOrders(after: RateLawFit, before: RateLawFit): void {
  for (const [name, order] of Object.entries(before.orders)) expectMoved(after.orders[name], order, 0, 1e-7);
}

/** `tolerance` of the standard error, relative; null where it changes by design. */
function expectMoved(
  after: Estimate | undefined,
  before: Estimate,
  by: number,
  tolerance: number | null,
): void {
  expect(Math.abs((after?.estimate ?? Number.NaN) - (before.estimate ?? Number.NaN) - by)).toBeLessThan(1e-7);
  if (tolerance === null) return;
  const error = before.standardError;
  if (error === null || after?.standardError === null) expect(after?.standardError).toBe(error);
  else
    expect(Math.abs((after?.standardError ?? Number.NaN) - error)).toBeLessThanOrEqual(
      tolerance * error + 1e-12,
    );
}

function logOf({ estimate, standardError, interval, level }: Estimate): Estimate {
  const value = estimate ?? Number.NaN;
  return {
    estimate: Math.log(value),
    standardError: standardError === null ? null : standardError / value,
    interval,
    level,
  };
}
