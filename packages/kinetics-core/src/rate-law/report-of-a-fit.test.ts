import { randomDraws } from "kinetics-core/random";
import {
  labelOf,
  nineRecipes as recipes,
  nineRuns as scenario,
  simulateRuns,
} from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { fitRateLaw } from "./fit-rate-law";
import type { RateLawFit, RateLawInput } from "./rate-law";

const study = simulateRuns(scenario, randomDraws(8).normal);

function law(input: RateLawInput): RateLawFit {
  const result = fitRateLaw(input);
  if (result.status !== "fitted") throw new Error(`expected a law, got ${result.status}: ${result.message}`);
  return result;
}

describe("the parts of a report", () => {
  const fit = law(study);

  it("a held order is reported as held, without an uncertainty, with zeros in the covariance", () => {
    const held = law({ ...study, orders: { B: 2 } });
    expect(held.orders.B).toEqual({ estimate: 2, standardError: null, interval: null, level: 0.95 });
    expect(held.covariance?.map((row) => row[2])).toEqual([0, 0, 0]);
    expect(held.degreesOfFreedom).toBe(7);
    expect(held.simpleOrders.orders.B).toBe(2);
  });

  it("the centre is the geometric mean of the recipes, and k, orders and the rate there belong together", () => {
    const a = fit.centre.concentrations.A ?? 0;
    const b = fit.centre.concentrations.B ?? 0;
    const product = recipes.reduce((sum, row) => sum + Math.log(row[0]), 0) / recipes.length;
    expect(a).toBeCloseTo(Math.exp(product), 12);
    const predicted =
      (fit.rateConstant.estimate ?? 0) *
      a ** (fit.orders.A?.estimate ?? 0) *
      b ** (fit.orders.B?.estimate ?? 0);
    expect(predicted / (fit.centre.rate.estimate ?? 1)).toBeCloseTo(1, 10);
    const [kk, , kb] = fit.covariance?.[0] ?? [];
    expect(kk).toBeGreaterThan(0);
    // ln k at 1 mol/L lies above all runs: a larger order means a larger k.
    expect(kb).toBeGreaterThan(0);
  });

  it("the weighted slope of every added-variable plot is the order", () => {
    for (const plot of fit.addedVariables) {
      const sums = plot.points.reduce(
        ({ xy, xx }, point, j) => {
          const weight = fit.residuals[j]?.weight ?? 0;
          return { xy: xy + weight * (point.x ?? 0) * (point.y ?? 0), xx: xx + weight * (point.x ?? 0) ** 2 };
        },
        { xy: 0, xx: 0 },
      );
      expect(sums.xy / sums.xx).toBeCloseTo(fit.orders[plot.species]?.estimate ?? Number.NaN, 10);
      expect(plot.slope).toBe(fit.orders[plot.species]?.estimate);
    }
    const [first] = fit.addedVariables[0]?.points ?? [];
    const b = fit.centre.concentrations.B ?? 1;
    const moved = (study.runs[0]?.rate ?? 0) * (b / 0.02) ** (fit.orders.B?.estimate ?? 0);
    expect((first?.rateAtCentre ?? 0) / moved).toBeCloseTo(1, 12);
  });

  it("pairs are runs that differ in one concentration only, with the ratio's order and its propagated error", () => {
    const pair = fit.pairs.find((one) => one.runs[0] === "R01" && one.runs[1] === "R02");
    const [one, two] = study.runs;
    const order = Math.log((two?.rate ?? 1) / (one?.rate ?? 1)) / Math.log(2);
    expect(pair?.species).toBe("A");
    expect(pair?.order.estimate).toBeCloseTo(order, 12);
    const relative = [one, two].map((run) => (run?.rateStandardError ?? 0) / (run?.rate ?? 1));
    const b = fit.orders.B?.estimate ?? 0;
    const variance = relative.reduce((sum, u) => sum + u ** 2, 0) + 2 * 0.004 ** 2 * (order ** 2 + b ** 2);
    expect(pair?.order.standardError).toBeCloseTo(Math.sqrt(variance) / Math.log(2), 9);
    expect(fit.pairs.some((one_) => one_.runs.includes("R09"))).toBe(false);
    expect(fit.pairs.filter((one_) => one_.species === "A")).toHaveLength(9);
  });

  it("pairs of runs without stated errors have no made-up uncertainty", () => {
    const bare = law({
      ...study,
      runs: study.runs.map(({ label, concentrations, rate }) => ({ label, concentrations, rate })),
    });
    expect(bare.pairs[0]?.order).toMatchObject({ standardError: null, interval: null });
  });

  it("leaving a run out agrees with a fit without it where weights are equal", () => {
    const equal = {
      ...study,
      runs: study.runs.map(({ label, concentrations, rate }) => ({ label, concentrations, rate })),
    };
    const all = law(equal);
    const without = law({ ...equal, runs: equal.runs.filter((run) => run.label !== "R04") });
    const row = all.leaveOneOut.find((one) => one.label === "R04");
    expect(row?.orders.A).toBeCloseTo(without.orders.A?.estimate ?? Number.NaN, 11);
    expect((row?.rateConstant ?? 0) / (without.simpleOrders.rateConstant.estimate ?? 1)).toBeCloseTo(1, 11);
  });

  it("a run that departs is named, with the size of its departure", () => {
    const spoilt = law({
      ...study,
      runs: study.runs.map((run) => (run.label === "R06" ? { ...run, rate: 1.4 * run.rate } : run)),
    });
    const flag = spoilt.flags.find((one) => one.code === "influential-run");
    expect(flag?.message).toContain("R06");
    expect(flag?.severity).toBe("weakens");
    expect(fit.flags.some((one) => one.code === "influential-run")).toBe(false);
  });

  it("replicates that differ by more than their scatter allows are named", () => {
    const thrice = [...recipes, ...recipes, ...recipes];
    const large = simulateRuns(
      { ...scenario, recipes: thrice, rateErrors: thrice.map(() => 0.005) },
      randomDraws(12).normal,
    );
    const spoilt = law({
      ...large,
      runs: large.runs.map((run) => (run.label === "R14" ? { ...run, rate: 1.4 * run.rate } : run)),
    });
    const messages = spoilt.flags
      .filter((one) => one.code === "replicates-disagree")
      .map((one) => one.message);
    expect(messages).toHaveLength(1);
    expect(messages[0]).toContain("R14");
    expect(law(large).flags.some((one) => one.code === "replicates-disagree")).toBe(false);
  });

  it("replicates test the law's fit, with the freedom that they have", () => {
    expect(fit.lackOfFit?.degreesOfFreedom).toEqual([5, 1]);
    expect(fit.lackOfFit?.pValue).toBeGreaterThan(0.01);
  });

  it("rates entered twice are no replicates", () => {
    const levels = [0.01, 0.01, 0.03, 0.03, 0.1, 0.1, 0.3, 0.3];
    const twice = law({
      species: ["S"],
      runs: levels.map((c, j) => ({
        label: labelOf(j),
        concentrations: { S: c },
        rate: c * (1 + 0.02 * Math.cos(Math.floor(j / 2))),
      })),
    });
    expect(twice.lackOfFit).toBeNull();
  });

  it("a curved law is caught by replicates", () => {
    const levels = [0.01, 0.01, 0.03, 0.03, 0.1, 0.1, 0.3, 0.3];
    const saturating = law({
      species: ["S"],
      runs: levels.map((c, j) => ({
        label: labelOf(j),
        concentrations: { S: c },
        rate: (c / (0.05 + c)) * (1 + 0.01 * (j % 2 === 0 ? 1 : -1)),
      })),
    });
    expect(saturating.lackOfFit?.pValue).toBeLessThan(1e-4);
    expect(saturating.flags.some((one) => one.code === "lack-of-fit")).toBe(true);
  });
});

describe("re-readings and blocks", () => {
  it("readings of one mixture count as one run", () => {
    const [first] = study.runs;
    if (first === undefined) throw new Error("the study has runs");
    const readings = [1.02, 0.98, 1].map((factor, i) => ({
      ...first,
      label: `R01${"abc"[i]}`,
      rate: first.rate * factor,
      mixture: "M1",
    }));
    const fit = law({ ...study, runs: [...readings, ...study.runs.slice(1)] });
    const plain = law(study);
    expect(fit.degreesOfFreedom).toBe(plain.degreesOfFreedom);
    expect(fit.residuals[0]?.readings).toEqual(["R01a", "R01b", "R01c"]);
    expect(fit.orders.A?.estimate).toBeCloseTo(plain.orders.A?.estimate ?? Number.NaN, 2);
  });

  it("readings of one mixture with different recipes are named and kept apart", () => {
    const fit = law({
      ...study,
      runs: study.runs.map((run, j) => (j < 2 ? { ...run, mixture: "M1" } : run)),
    });
    expect(fit.residuals).toHaveLength(study.runs.length);
    expect(fit.flags.find((flag) => flag.code === "mixture-differs")?.message).toContain("R01 and R02");
  });

  it("a difference between days widens k, not the orders that each day measured in full", () => {
    const days = [...recipes, ...recipes, ...recipes];
    const input = simulateRuns(
      {
        ...scenario,
        recipes: days,
        rateErrors: days.map(() => 0.005),
        blocks: days.map((_, j) => `day ${Math.floor(j / recipes.length) + 1}`),
        blockScatter: 0.15,
      },
      randomDraws(5).normal,
    );
    const blocked = law(input);
    const ignored = law({ ...input, runs: input.runs.map(({ block: _, ...run }) => run) });
    expect(blocked.betweenBlockStandardDeviation).toBeGreaterThan(0.05);
    expect(blocked.orders.A?.standardError ?? 1).toBeLessThan(0.5 * (ignored.orders.A?.standardError ?? 0));
    expect(blocked.simpleOrders.budget.find((line) => line.source === "Blocks")?.relative).toBeGreaterThan(
      0.03,
    );
  });

  it("says so where blocks cannot be told from the orders", () => {
    const fit = law({ ...study, runs: study.runs.map((run) => ({ ...run, block: run.label })) });
    expect(fit.flags.some((flag) => flag.code === "blocks-not-separable")).toBe(true);
    expect(fit.betweenBlockStandardDeviation).toBeNull();
  });
});
