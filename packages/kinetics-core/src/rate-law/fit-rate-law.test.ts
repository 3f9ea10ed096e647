import { studentTFactor } from "kinetics-core/distributions";
import { randomDraws } from "kinetics-core/random";
import { labelOf, nineRuns as scenario, simulateRuns } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { fitRateLaw } from "./fit-rate-law";
import type { RateLawFit, RateLawInput } from "./rate-law";

const study = simulateRuns(scenario, randomDraws(8).normal);

function law(input: RateLawInput): RateLawFit {
  const result = fitRateLaw(input);
  if (result.status !== "fitted") throw new Error(`expected a law, got ${result.status}: ${result.message}`);
  return result;
}

/** Every number of a fit that does not depend on the order of the runs. */
function numbers(fit: RateLawFit): readonly number[] {
  const flat = (value: unknown): number[] =>
    typeof value === "number"
      ? [value]
      : value !== null && typeof value === "object"
        ? Object.values(value).flatMap(flat)
        : [];
  return flat([
    fit.orders,
    fit.logRateConstant,
    fit.rateConstant,
    fit.centre,
    fit.covariance,
    fit.budget,
    fit.betweenRunStandardDeviation,
    fit.simpleOrders,
  ]);
}

function expectSameNumbers(got: readonly number[], wanted: readonly number[], relative: number): void {
  expect(got).toHaveLength(wanted.length);
  wanted.forEach((value, i) => {
    expect(Math.abs((got[i] ?? Number.NaN) - value)).toBeLessThanOrEqual(relative * Math.abs(value) + 1e-13);
  });
}

describe("what must not matter", () => {
  it("the order of the runs", () => {
    const shuffled = { ...study, runs: [3, 8, 1, 0, 6, 2, 7, 5, 4].flatMap((j) => study.runs[j] ?? []) };
    expectSameNumbers(numbers(law(shuffled)), numbers(law(study)), 1e-8);
  });

  it("the unit of concentration and of time, but for k itself", () => {
    const there = law(study);
    const inMillimolePerMinute = law({
      ...study,
      concentrationUnit: "mmol/L",
      timeUnit: "min",
      runs: study.runs.map((run) => ({
        ...run,
        concentrations: Object.fromEntries(
          Object.entries(run.concentrations).map(([name, c]) => [name, 1000 * c]),
        ),
        rate: run.rate * 60_000,
        rateStandardError: (run.rateStandardError ?? 0) * 60_000,
      })),
    });
    for (const name of study.species) {
      const [a, b] = [there.orders[name], inMillimolePerMinute.orders[name]];
      expect(b?.estimate).toBeCloseTo(a?.estimate ?? Number.NaN, 10);
      expect(b?.standardError).toBeCloseTo(a?.standardError ?? Number.NaN, 10);
    }
    const scale = inMillimolePerMinute.simpleOrders.rateConstant;
    // Overall order 3: (10³ mmol/mol)^(1 − 3) · 60 s/min.
    expect((scale.estimate ?? 0) / (there.simpleOrders.rateConstant.estimate ?? 1)).toBeCloseTo(6e-5, 12);
    expect(scale.unit).toBe("L^2 mmol^-2 min^-1");
    expect(inMillimolePerMinute.centre.rate.estimate).toBeCloseTo(
      60_000 * (there.centre.rate.estimate ?? 0),
      8,
    );
  });

  it("the scale of the rates: twice the rates, twice k, the same orders and relative errors", () => {
    const once = law(study);
    const twice = law({
      ...study,
      runs: study.runs.map((run) => ({
        ...run,
        rate: 2 * run.rate,
        rateStandardError: 2 * (run.rateStandardError ?? 0),
      })),
    });
    expect((twice.rateConstant.estimate ?? 0) / (once.rateConstant.estimate ?? 1)).toBeCloseTo(2, 9);
    expect(twice.orders.A?.estimate).toBeCloseTo(once.orders.A?.estimate ?? Number.NaN, 11);
    expect(twice.logRateConstant.standardError).toBeCloseTo(
      once.logRateConstant.standardError ?? Number.NaN,
      11,
    );
  });
});

describe("shared errors", () => {
  const shared = [
    { species: ["B"], relative: 0.02, source: "Titre of stock B" },
    { species: [], onRate: true, relative: 0.01, source: "ε·l" },
  ];

  it("of all runs move ln k and not the orders", () => {
    const without = law({ ...study, orders: { A: 1, B: 2 } });
    const withThem = law({ ...study, orders: { A: 1, B: 2 }, shared, temperatureRelative: 0.007 });
    const free = law({ ...study, shared });
    expect(free.orders).toEqual(law(study).orders);
    expect(withThem.logRateConstant.estimate).toBe(without.logRateConstant.estimate);
    const scatter = without.logRateConstant.standardError ?? 0;
    // Σ n² u² by hand: order 2 in B doubles the titre's 2 %.
    const total = Math.sqrt(scatter ** 2 + 0.04 ** 2 + 0.01 ** 2 + 0.007 ** 2);
    expect(withThem.logRateConstant.standardError).toBeCloseTo(total, 12);
    expect(withThem.budget.map((line) => [line.source, Number(line.relative.toFixed(6))])).toEqual([
      ["Scatter of the runs", Number(scatter.toFixed(6))],
      ["Titre of stock B", 0.04],
      ["ε·l", 0.01],
      ["Temperature", 0.007],
    ]);
    // Welch: only the scatter spends freedom.
    expect(withThem.rateConstantDegreesOfFreedom).toBeCloseTo((8 * total ** 4) / scatter ** 4, 6);
  });

  it("make the budget add up to the variance of ln k, whatever is shared", () => {
    const chain = { species: ["A"], relative: 0.03, runs: ["R01", "R02", "R05"], source: "Dilution" };
    for (const fit of [
      law({ ...study, shared: [...shared, chain] }),
      law({ ...study, shared: [chain], temperatureRelative: 0.01 }),
      law(study),
    ]) {
      const sum = fit.budget.reduce((total, line) => total + line.relative ** 2, 0);
      expect(Math.sqrt(sum)).toBeCloseTo(fit.logRateConstant.standardError ?? Number.NaN, 12);
      expect(fit.covariance?.[0]?.[0]).toBeCloseTo(sum, 12);
      const ofSimple = fit.simpleOrders.budget.reduce((total, line) => total + line.relative ** 2, 0);
      expect(Math.sqrt(ofSimple)).toBeCloseTo(
        fit.simpleOrders.logRateConstant.standardError ?? Number.NaN,
        12,
      );
    }
  });

  it("of a dilution step widen the order of the species that was diluted", () => {
    const chain = { species: ["B"], relative: 0.05, runs: ["R06", "R07"] };
    const plain = law(study);
    const diluted = law({ ...study, shared: [chain] });
    // By how much depends on the scatter drawn beside it; a tenth is more than reweighting could undo.
    expect(diluted.orders.B?.standardError ?? 0).toBeGreaterThan(1.1 * (plain.orders.B?.standardError ?? 1));
    expect(diluted.budget.some((line) => line.source === "Stock of B (R06 and R07)")).toBe(true);
    expect(diluted.covariance?.[2]?.[2]).toBeCloseTo((diluted.orders.B?.standardError ?? 0) ** 2, 12);
  });

  it("cancel where one calibration gives the rates and the concentration of a first-order species", () => {
    const fit = law({
      ...study,
      orders: { A: 1, B: 2 },
      shared: [{ species: ["A"], onRate: true, relative: 0.05 }],
    });
    expect(fit.budget.find((line) => line.source === "Stock of A and the rate scale")?.relative).toBe(0);
  });
});

describe("the interval", () => {
  it("of k is that of ln k back-transformed, and lopsided", () => {
    const { rateConstant, logRateConstant } = law(study);
    const [low, high] = logRateConstant.interval ?? [Number.NaN, Number.NaN];
    expect(rateConstant.interval).toEqual([Math.exp(low), Math.exp(high)]);
    const k = rateConstant.estimate ?? Number.NaN;
    expect(high - low).toBeGreaterThan(0);
    expect((rateConstant.interval?.[1] ?? 0) - k).toBeGreaterThan(k - (rateConstant.interval?.[0] ?? 0));
  });

  it("of an order is t standard errors at m − q, at the level asked for", () => {
    const fit = law({ ...study, level: 0.99 });
    const { estimate, standardError, interval, level } = fit.orders.A ?? law(study).logRateConstant;
    expect(level).toBe(0.99);
    expect(fit.degreesOfFreedom).toBe(6);
    expect(interval?.[1]).toBeCloseTo((estimate ?? 0) + studentTFactor(0.99, 6) * (standardError ?? 0), 12);
  });

  it("with equal errors is that of ordinary least squares (three runs by hand)", () => {
    // ln v = 0, 1 + 0.03, 2 at ln c = 0, 1, 2: slope 1, residuals −0.01, 0.02, −0.01.
    const fit = law({
      species: ["A"],
      runs: [0, 1.03, 2].map((logarithm, j) => ({
        label: labelOf(j),
        concentrations: { A: Math.exp(j) },
        rate: Math.exp(logarithm),
      })),
    });
    expect(fit.orders.A?.estimate).toBeCloseTo(1, 12);
    expect(fit.orders.A?.standardError).toBeCloseTo(Math.sqrt(6e-4 / 2), 12);
    expect(fit.betweenRunStandardDeviation).toBeCloseTo(Math.sqrt(6e-4), 12);
    expect(fit.residuals.map((row) => Number(row.residual.toFixed(10)))).toEqual([-0.01, 0.02, -0.01]);
    expect(fit.residuals[0]?.leverage).toBeCloseTo(5 / 6, 12);
  });

  it("rests on one degree of freedom with a warning that names it, and is absent with none", () => {
    const two = { ...study, species: ["A"], runs: study.runs.slice(0, 2) };
    const exact = law(two);
    expect(exact.orders.A?.interval).toBeNull();
    expect(exact.rateConstant.interval).toBeNull();
    expect(exact.covariance).toBeNull();
    expect(exact.betweenRunStandardDeviation).toBeNull();
    expect(exact.simpleOrders.reading.A).toBe("nearest");
    expect(exact.flags.find((flag) => flag.code === "no-freedom")?.severity).toBe("blocks");
    const three = law({ ...two, runs: study.runs.slice(0, 3) });
    expect(three.orders.A?.interval).not.toBeNull();
    expect(three.flags.find((flag) => flag.code === "little-freedom")?.message).toContain(
      "one degree of freedom",
    );
  });
});

it("takes four times as long for four times the runs, and not sixteen times", () => {
  const many = (size: number) => {
    const big = Array.from({ length: size }, (_, j) => [0.01 * 1.01 ** (j % 97), 0.02 * 1.02 ** (j % 89)]);
    return simulateRuns(
      { ...scenario, recipes: big, rateErrors: big.map((_, j) => 0.01 + 0.001 * (j % 7)) },
      randomDraws(3).normal,
    );
  };
  const timed = (input: RateLawInput) => {
    // Processor time: a busy machine must not fail this.
    const before = process.cpuUsage();
    law(input);
    return process.cpuUsage(before).user;
  };
  timed(many(50));
  const small = Math.min(timed(many(125)), timed(many(125)), timed(many(125)));
  const large = Math.min(timed(many(500)), timed(many(500)), timed(many(500)));
  expect(large / small).toBeLessThan(16);
});
