import { labelOf } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { fitRateLaw } from "./fit-rate-law";
import type { RateLawFit, RateLawInput } from "./rate-law";

function law(input: RateLawInput): RateLawFit {
  const result = fitRateLaw(input);
  if (result.status !== "fitted") throw new Error(`expected a law, got ${result.status}: ${result.message}`);
  return result;
}

function runsOf(
  species: readonly string[],
  recipes: readonly (readonly number[])[],
  rate: (c: readonly number[]) => number,
): RateLawInput {
  return {
    species,
    runs: recipes.map((recipe, j) => ({
      label: labelOf(j),
      concentrations: Object.fromEntries(species.map((name, i) => [name, recipe[i] ?? 0])),
      // A little scatter, so that intervals exist.
      rate: rate(recipe) * (1 + 0.01 * Math.sin(5 * j + 1)),
    })),
  };
}

describe("orders that cannot be told apart", () => {
  it("two species varied in proportion: only the sum of their orders is known, and it is given", () => {
    const recipes = [0.01, 0.02, 0.04, 0.08, 0.16].map((c) => [c, 2 * c]);
    const fit = law(runsOf(["A", "B"], recipes, ([a = 0, b = 0]) => 3 * a * b ** 0.5));
    expect(fit.separable).toBe(false);
    expect(fit.orders.A?.estimate).toBeNull();
    expect(fit.orders.B?.estimate).toBeNull();
    // ln k would need each order: B is twice A everywhere.
    expect(fit.rateConstant.estimate).toBeNull();
    expect(fit.covariance).toBeNull();
    expect(fit.simpleOrders.reading).toEqual({ A: "undetermined", B: "undetermined" });
    expect(fit.simpleOrders.orders).toEqual({});
    expect(fit.undetermined.map((one) => one.combination)).toEqual([{ A: 1, B: -1 }]);
    expect(fit.determined[0]?.combination).toEqual({ A: 1, B: 1 });
    expect(fit.determined[0]?.value.estimate).toBeCloseTo(1.5, 1);
    expect(fit.determined[0]?.value.interval).not.toBeNull();
    const message = fit.undetermined[0]?.message ?? "";
    expect(message).toContain("A and B were varied together");
    expect(message).toContain("the order in A plus that in B is known, 1.5");
    expect(message).toContain("A run like R03 with B at 0.04 or 0.16 mol L⁻¹ and everything else kept");
    expect(fit.flags.find((flag) => flag.code === "orders-not-separable")?.severity).toBe("blocks");
    // The rate at the centre is known all the same, and a budget stands behind it.
    expect(fit.centre.rate.interval).not.toBeNull();
    expect(fit.budget.length).toBeGreaterThan(0);
  });

  it("a species that goes as the square of another: the combination carries the factor", () => {
    const recipes = [0.1, 0.2, 0.4, 0.8].map((c) => [c, c ** 2]);
    const fit = law(runsOf(["A", "B"], recipes, ([a = 0, b = 0]) => a * b));
    expect(fit.undetermined[0]?.combination).toEqual({ A: 1, B: -0.5 });
    expect(fit.undetermined[0]?.message).toContain("the order in A plus 2 times that in B is known");
    expect(fit.determined[0]?.value.estimate).toBeCloseTo(3, 1);
    // Both pass through 1 mol/L in step, so k is known although the orders are not.
    expect(fit.rateConstant.estimate).not.toBeNull();
  });

  it("a species that was never varied: its order is open, the others stand, and holding it is the way out", () => {
    const recipes = [0.01, 0.02, 0.04, 0.08].map((c) => [c, 0.5]);
    const input = runsOf(["A", "B"], recipes, ([a = 0, b = 0]) => 2 * a * b);
    const fit = law(input);
    expect(fit.orders.A?.estimate).toBeCloseTo(1, 1);
    expect(fit.orders.A?.interval).not.toBeNull();
    expect(fit.orders.B?.estimate).toBeNull();
    expect(fit.undetermined).toHaveLength(1);
    expect(fit.undetermined[0]?.message).toContain("B was the same in every run, 0.5 mol L⁻¹");
    expect(fit.undetermined[0]?.message).toContain("with B at 0.25 or 1 mol L⁻¹");
    expect(fit.simpleOrders.orders).toEqual({ A: 1 });
    const held = law({ ...input, orders: { B: 0 } });
    expect(held.separable).toBe(true);
    expect(held.rateConstant.unit).toMatch(/s\^-1$/);
    expect(held.simpleOrders.rateConstant.estimate).toBeCloseTo(1, 1);
    expect(held.simpleOrders.rateConstant.unit).toBe("s^-1");
  });

  it("three species tied by one relation, a fourth free of it", () => {
    const recipes = [
      [0.1, 0.1, 0.1, 0.1],
      [0.2, 0.1, 0.2, 0.1],
      [0.1, 0.2, 0.2, 0.1],
      [0.2, 0.2, 0.4, 0.1],
      [0.1, 0.1, 0.1, 0.3],
      [0.4, 0.1, 0.4, 0.3],
    ];
    const fit = law(runsOf(["A", "B", "C", "D"], recipes, ([a = 0, b = 0, c = 0, d = 0]) => a * b * c * d));
    expect(fit.orders.D?.estimate).toBeCloseTo(1, 1);
    expect(["A", "B", "C"].map((name) => fit.orders[name]?.estimate)).toEqual([null, null, null]);
    expect(fit.undetermined[0]?.combination).toEqual({ A: 1, B: 1, C: -1 });
    expect(fit.undetermined[0]?.message).toContain("A, B and C were varied together");
    expect(fit.determined.map((one) => one.combination)).toEqual([
      { A: 1, C: 1 },
      { B: 1, C: 1 },
    ]);
  });

  it("species varied almost in step block although the arithmetic would go through", () => {
    const recipes = [
      [0.01, 0.02],
      [0.02, 0.041],
      [0.04, 0.079],
      [0.08, 0.162],
      [0.16, 0.318],
    ];
    const fit = law(runsOf(["A", "B"], recipes, ([a = 0, b = 0]) => a * b));
    expect(fit.separable).toBe(false);
    expect(fit.orders.A?.estimate).not.toBeNull();
    expect(fit.undetermined[0]?.message).toContain("A was varied almost in step with B");
    expect(fit.undetermined).toHaveLength(1);
  });

  it("a spread that pipetting alone could make blocks", () => {
    const recipes = [0.1, 0.11, 0.12, 0.13].map((c) => [c]);
    const input = runsOf(["A"], recipes, ([a = 0]) => a);
    expect(law(input).separability[0]?.severity).toBe("blocks");
    const wider = runsOf(
      ["A"],
      [0.1, 0.15, 0.2].map((c) => [c]),
      ([a = 0]) => a,
    );
    expect(law(wider).separability[0]?.severity).toBe("weakens");
    const poured = {
      ...wider,
      runs: wider.runs.map((run) => ({ ...run, relativeUncertainty: { A: 0.12 } })),
    };
    expect(law(poured).separability[0]?.severity).toBe("blocks");
  });

  it("the measure is that of the standard error: s over √m times the conditional spread", () => {
    const recipes = [
      [0.01, 0.02],
      [0.02, 0.03],
      [0.04, 0.02],
      [0.08, 0.05],
      [0.02, 0.08],
    ];
    const fit = law(runsOf(["A", "B"], recipes, ([a = 0, b = 0]) => a * b));
    const scatter = fit.betweenRunStandardDeviation ?? Number.NaN;
    for (const measure of fit.separability) {
      expect(fit.orders[measure.species]?.standardError).toBeCloseTo(
        scatter / (Math.sqrt(5) * measure.conditionalSpread),
        10,
      );
    }
  });
});

describe("small and degenerate studies", () => {
  it("all runs equal: no order, no k, the rate there with its interval, each said in words", () => {
    const fit = law(
      runsOf(
        ["A", "B"],
        [1, 2, 3, 4].map(() => [0.1, 0.2]),
        () => 5e-6,
      ),
    );
    expect(fit.orders.A?.estimate).toBeNull();
    expect(fit.orders.B?.estimate).toBeNull();
    expect(fit.rateConstant.estimate).toBeNull();
    expect(fit.undetermined.map((one) => one.message.split(",")[0])).toEqual([
      "A was the same in every run",
      "B was the same in every run",
    ]);
    expect(fit.centre.rate.estimate).toBeGreaterThan(4.9e-6);
    expect(fit.centre.rate.interval).not.toBeNull();
    expect(fit.degreesOfFreedom).toBe(3);
  });

  it("all runs equal to the last digit: no zero divides anything", () => {
    const runs = [1, 2, 3].map((j) => ({ label: `R${j}`, concentrations: { A: 0.1 }, rate: 2e-5 }));
    const fit = law({ species: ["A"], runs });
    expect(JSON.stringify(fit)).not.toMatch(/NaN|Infinity/);
    expect(fit.centre.rate.estimate).toBeCloseTo(2e-5, 12);
  });

  it("one run: too few for an order, enough for k with the orders held", () => {
    const input: RateLawInput = {
      species: ["A"],
      runs: [{ label: "R01", concentrations: { A: 0.1 }, rate: 2e-3 }],
    };
    const result = fitRateLaw(input);
    expect(result.status).toBe("too-few-runs");
    if (result.status === "too-few-runs") expect(result.message).toContain("R01 alone");
    const held = law({ ...input, orders: { A: 1 } });
    expect(held.rateConstant.estimate).toBeCloseTo(0.02, 12);
    expect(held.rateConstant.interval).toBeNull();
    expect(held.flags.some((flag) => flag.code === "no-freedom")).toBe(true);
  });

  it("two runs for two orders: what they determine is given, the rest is open", () => {
    const fit = law(
      runsOf(
        ["A", "B"],
        [
          [0.1, 0.1],
          [0.2, 0.1],
        ],
        ([a = 0]) => a,
      ),
    );
    expect(fit.orders.A?.estimate).not.toBeNull();
    expect(fit.orders.B?.estimate).toBeNull();
    expect(fit.orders.A?.interval).toBeNull();
  });

  it("no species and no runs are said in words", () => {
    expect(fitRateLaw({ species: [], runs: [] }).status).toBe("no-species");
    const empty = fitRateLaw({ species: ["A"], runs: [] });
    expect(empty.status).toBe("no-positive-rates");
    if (empty.status === "no-positive-rates") expect(empty.message).toContain("There is no run yet");
  });
});
