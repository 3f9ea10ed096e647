import fc from "fast-check";
import type { Estimate } from "kinetics-core/quantities";
import { randomDraws } from "kinetics-core/random";
import { expressionEquation, type RateEquation } from "kinetics-core/rate-equation";
import { placesNotFinite } from "kinetics-core/testing";
import { describe, expect, it } from "vitest";
import { fitGlobal } from "./fit-global";
import type { GlobalFit, GlobalFitInput } from "./global-fit";
import { simulateStudy } from "./simulated-study";

fc.configureGlobal({ seed: 1895 });

const study: fc.Arbitrary<GlobalFitInput> = fc
  .record({
    seed: fc.nat(),
    orders: fc.record({ A: fc.constantFrom(0.5, 1, 1.5, 2), B: fc.constantFrom(0, 0.5, 1) }),
    logRateConstant: fc.double({ min: -8, max: 3, noNaN: true }),
    betweenRuns: fc.constantFrom(0, 0.03),
    noise: fc.constantFrom(1e-4, 2e-3),
    autocorrelation: fc.constantFrom(0, 0.5),
  })
  .map(({ logRateConstant, ...rest }) =>
    simulateStudy({ runs: 6, points: 25, rateConstant: Math.exp(logRateConstant), ...rest }),
  );

describe("a change of units", () => {
  it("of concentration and time moves k as its unit says, and nothing else", () => {
    fc.assert(
      fc.property(
        study,
        fc.constantFrom(1e-3, 1e3, 1e6),
        fc.constantFrom(1 / 60, 60),
        (input, amount, time) => {
          const before = fitted(input);
          const after = fitted(scaled(input, amount, time));
          const overall =
            (before.orders.A?.estimate ?? Number.NaN) + (before.orders.B?.estimate ?? Number.NaN);
          expectSameOrders(after, before);
          expectMoved(
            after.logRateConstant,
            before.logRateConstant,
            (1 - overall) * Math.log(amount) - Math.log(time),
          );
        },
      ),
      { numRuns: 8 },
    );
  });
});

describe("the order in which runs stand", () => {
  it("changes nothing", () => {
    fc.assert(
      fc.property(study, fc.nat(), (input, seed) => {
        const { whole } = randomDraws(seed);
        const left = [...input.runs];
        const runs = input.runs.flatMap(() => left.splice(whole(left.length), 1));
        const before = fitted(input);
        const after = fitted({ ...input, runs });
        expectSameOrders(after, before);
        expectMoved(after.logRateConstant, before.logRateConstant, 0);
        expectMoved(after.pooled.logRateConstant, before.pooled.logRateConstant, 0);
      }),
      { numRuns: 8 },
    );
  });
});

describe("a law that a user wrote out", () => {
  it("is fitted as the one of the same form that is built in", () => {
    const read = expressionEquation("k [A]^n_A [B]^n_B", { species: ["A", "B"] });
    if (read.status !== "equation") throw new Error(read.message);
    const { equation } = read;
    fc.assert(
      fc.property(study, (input) => {
        const builtIn = fitted(input);
        const written = fitted({ ...input, law: { equation } });
        expectMoved(written.logRateConstant, builtIn.logRateConstant, 0);
        expectMoved(written.parameters.n_A, builtIn.orders.A, 0);
        expectMoved(written.parameters.n_B, builtIn.orders.B, 0);
      }),
      { numRuns: 6 },
    );
  });
});

describe("one number gone wrong in a study", () => {
  const wrong = fc.oneof(
    fc.double(),
    fc.constantFrom(0, -0, -1, 1e-320, 1e-30, 1e30, 1e300, Number.NaN, Number.POSITIVE_INFINITY),
  );
  const place = fc.constantFrom("concentration", "time", "signal", "value", "standardUncertainty");
  const law: fc.Arbitrary<GlobalFitInput["law"]> = fc.constantFrom(
    { orders: { A: "free" as const, B: "free" as const } },
    { orders: { A: 1, B: "free" as const } },
    { equation: reversible() },
  );

  it("ends in a fit without NaN or in a failure that names its place", () => {
    const statuses = new Set<string>();
    fc.assert(
      fc.property(study, law, place, fc.nat(5), fc.nat(24), wrong, (input, form, what, j, i, number) => {
        const result = fitGlobal({ ...spoiled(input, what, j, i, number), law: form });
        statuses.add(result.status);
        expect(placesNotFinite(result)).toEqual([]);
        if (result.status === "fitted") return;
        expect(result.path).toMatch(/^[a-zA-Z]/);
        expect(result.message).toMatch(/^\S.{20,}\.$/);
      }),
      { numRuns: 60 },
    );
    expect([...statuses]).toEqual(expect.arrayContaining(["fitted", "bad-input"]));
  });
});

function spoiled(input: GlobalFitInput, what: string, j: number, i: number, number: number): GlobalFitInput {
  const { signalPerConcentration } = input;
  if (what === "value" || what === "standardUncertainty")
    return { ...input, signalPerConcentration: { ...signalPerConcentration, [what]: number } };
  return {
    ...input,
    runs: input.runs.map((run, place) => {
      if (place !== j) return run;
      if (what === "concentration") return { ...run, concentrations: { ...run.concentrations, A: number } };
      if (what === "time") return { ...run, time: Array.from(run.time).with(i, number) };
      return { ...run, signal: Array.from(run.signal).with(i, number) };
    }),
  };
}

function reversible(): RateEquation {
  const read = expressionEquation("k ([A] − [B]/K)", { species: ["A", "B"] });
  if (read.status !== "equation") throw new Error(read.message);
  return read.equation;
}

function fitted(input: GlobalFitInput): GlobalFit {
  const result = fitGlobal(input);
  if (result.status !== "fitted") throw new Error(`${result.path}: ${result.message}`);
  return result;
}

function scaled(input: GlobalFitInput, amount: number, time: number): GlobalFitInput {
  const { value, standardUncertainty } = input.signalPerConcentration;
  return {
    ...input,
    signalPerConcentration: { value: value / amount, standardUncertainty: standardUncertainty / amount },
    runs: input.runs.map((run) => ({
      ...run,
      concentrations: Object.fromEntries(
        Object.entries(run.concentrations).map(([name, c]) => [name, c * amount]),
      ),
      time: Array.from(run.time, (t) => t * time),
    })),
  };
}

function expectSameOrders(after: GlobalFit, before: GlobalFit): void {
  for (const [name, order] of Object.entries(before.orders)) expectMoved(after.orders[name], order, 0);
}

/** Equal to a hundredth of the standard error: where a search of steps ends is settled no further. */
function expectMoved(after: Estimate | undefined, before: Estimate | undefined, by: number): void {
  const error = before?.standardError ?? Number.NaN;
  const moved = (after?.estimate ?? Number.NaN) - (before?.estimate ?? Number.NaN) - by;
  expect(Math.abs(moved)).toBeLessThan(0.01 * error);
}
