import { labelOf } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { fitRateLaw } from "./fit-rate-law";
import type { RateLawFit, RateLawInput, RateLawRun } from "./rate-law";

const good: RateLawInput = {
  species: ["A"],
  runs: [0.01, 0.02, 0.04, 0.08, 0.16, 0.32].map((c, j) => ({
    label: labelOf(j),
    concentrations: { A: c },
    rate: 0.5 * c * (1 + 0.01 * Math.sin(7 * j)),
    rateStandardError: 0.005 * c,
  })),
};

function law(input: RateLawInput): RateLawFit {
  const result = fitRateLaw(input);
  if (result.status !== "fitted") throw new Error(`expected a law, got ${result.status}: ${result.message}`);
  return result;
}

const withRun = (run: Partial<RateLawRun>): RateLawInput => ({
  ...good,
  runs: [...good.runs, { label: "R07", concentrations: { A: 0.05 }, rate: 0.025, ...run }],
});

describe("runs that cannot carry the law", () => {
  it.each([
    ["a rate of zero", { rate: 0 }, "rate-not-positive", "The rate of R07 is zero"],
    ["a negative rate", { rate: -0.02 }, "rate-not-positive", "The rate of R07 is below zero"],
    [
      "a negative rate far beyond its error",
      { rate: -0.02, rateStandardError: 0.001 },
      "rate-not-positive",
      "R07",
    ],
    ["a rate that is no number", { rate: Number.NaN }, "rate-missing", "R07 has no rate that is a number"],
    ["an infinite rate", { rate: Number.POSITIVE_INFINITY }, "rate-missing", "R07"],
    ["no concentration", { concentrations: {} }, "concentration-missing", "R07 has no concentration of A"],
    ["a concentration of zero", { concentrations: { A: 0 } }, "concentration-zero", "R07 holds no A"],
    ["a negative concentration", { concentrations: { A: -1 } }, "concentration-negative", "R07"],
  ] as const)("%s: the run is named and left out, the law of the others stands", (_, change, code, words) => {
    const fit = law(withRun(change));
    const flag = fit.flags.find((one) => one.code === code);
    expect(flag?.message).toContain(words);
    expect(flag?.message).toMatch(/[Ss]et (the run|it) aside/);
    expect(fit.orders).toEqual(law(good).orders);
    expect(fit.residuals.map((row) => row.label)).not.toContain("R07");
    expect(JSON.stringify(fit)).not.toMatch(/NaN|Infinity/);
  });

  it("no run with a usable rate is a status with a way out", () => {
    const result = fitRateLaw({
      ...good,
      runs: good.runs.map(({ rateStandardError: _, ...run }) => ({ ...run, rate: -run.rate })),
    });
    expect(result.status).toBe("no-positive-rates");
    expect(result.flags).toHaveLength(6);
  });

  it("a concentration of zero counts where the order is held at 0", () => {
    const fit = law({
      species: ["A", "inhibitor"],
      runs: good.runs.map((run, j) => ({
        ...run,
        concentrations: { ...run.concentrations, inhibitor: j % 2 },
      })),
      orders: { inhibitor: 0 },
    });
    expect(fit.residuals).toHaveLength(6);
    expect(fit.centre.concentrations.inhibitor).toBe(0.5);
    expect(JSON.stringify(fit)).not.toMatch(/NaN|Infinity/);
  });

  it("two runs of one name are both kept, and named", () => {
    const fit = law({
      ...good,
      runs: [...good.runs, { label: "R01", concentrations: { A: 0.05 }, rate: 0.025 }],
    });
    expect(fit.residuals).toHaveLength(7);
    expect(fit.flags.find((one) => one.code === "duplicate-label")?.message).toContain("R01");
  });

  it("a shared error of a species that the law lacks is named", () => {
    const fit = law({ ...good, shared: [{ species: ["Z"], relative: 0.01 }] });
    expect(fit.flags.find((one) => one.code === "shared-species-unknown")?.message).toContain("Z");
  });
});

describe("rates too uncertain for a logarithm", () => {
  it("are fitted as rates, with the run named", () => {
    const fit = law(withRun({ rate: 0.031, rateStandardError: 0.008 }));
    expect(fit.scale).toBe("rate");
    expect(fit.flags.find((one) => one.code === "rate-scale")?.message).toContain(
      "The rate of R07 is known to 26 %",
    );
    expect(fit.orders.A?.estimate).toBeCloseTo(1, 1);
    expect(law(good).scale).toBe("logarithmic");
  });

  it("stand together in one sentence", () => {
    const runs = good.runs.map((run, j) => ({
      ...run,
      rateStandardError: (j === 0 ? 0.3 : 0.25) * run.rate,
    }));
    const { message } = law({ ...good, runs }).flags.find((one) => one.code === "rate-scale") ?? {};
    const labels = runs.map(({ label }) => label);
    expect(message).toContain(
      `The rates of ${labels.slice(0, -1).join(", ")} and ${labels.at(-1)} are known to 25 to 30 %: too uncertain`,
    );
  });

  it("may be zero or below within their error, and then still count", () => {
    const fit = law(withRun({ concentrations: { A: 0.001 }, rate: -0.0002, rateStandardError: 0.0006 }));
    expect(fit.scale).toBe("rate");
    expect(fit.residuals).toHaveLength(7);
    expect(fit.orders.A?.estimate).toBeCloseTo(1, 1);
    expect(fit.flags.find((one) => one.code === "rate-scale")?.message).toContain(
      "R07 cannot be told from zero",
    );
    expect(fit.pairs.some((pair) => pair.runs.includes("R07"))).toBe(false);
    expect(JSON.stringify(fit)).not.toMatch(/NaN|Infinity/);
  });

  it("solve the weighted equations on the rate scale: Σ v̂(v − v̂)x/(u² + v̂²f) = 0", () => {
    const input = withRun({ rate: 0.031, rateStandardError: 0.008 });
    const fit = law({
      ...input,
      runs: input.runs.map((run) => ({ ...run, rateStandardError: run.rateStandardError ?? 0.001 })),
    });
    const k = fit.rateConstant.estimate ?? Number.NaN;
    const order = fit.orders.A?.estimate ?? Number.NaN;
    const relative = input.runs.map((run) => {
      const expected = k * (run.concentrations.A ?? 1) ** order;
      return ((run.rateStandardError ?? 0.001) / expected) ** 2;
    });
    const stated = relative.reduce((sum, value) => sum + Math.min(value, 0.01), 0) / relative.length;
    const floor = Math.max((fit.betweenRunStandardDeviation ?? 0) ** 2, stated);
    const sums = input.runs.reduce(
      ({ level, slope, size }, run) => {
        const c = run.concentrations.A ?? 1;
        const expected = k * c ** order;
        const variance = (run.rateStandardError ?? 0.001) ** 2 + expected ** 2 * floor;
        const term = (expected * (run.rate - expected)) / variance;
        return {
          level: level + term,
          slope: slope + term * Math.log(c),
          size: size + expected ** 2 / variance,
        };
      },
      { level: 0, slope: 0, size: 0 },
    );
    expect(Math.abs(sums.level) / sums.size).toBeLessThan(1e-8);
    expect(Math.abs(sums.slope) / sums.size).toBeLessThan(1e-8);
  });

  it("between 10 and 20 % are named and stay on the logarithmic scale", () => {
    const fit = law(withRun({ rate: 0.025, rateStandardError: 0.0035 }));
    expect(fit.scale).toBe("logarithmic");
    expect(fit.flags.find((one) => one.code === "rate-precision")?.message).toContain(
      "The rate of R07 is known to 14 %",
    );
  });
});

describe("runs whose sizes no double can weigh against each other", () => {
  it("give a sentence and never an exception", () => {
    // ln v of the first run is known to 1 part in 10³⁰⁰, that of the others is not known at all.
    const runs = [
      { label: "R01", concentrations: { A: 0.2 }, rate: 1e300, rateStandardError: 1 },
      { label: "R02", concentrations: { A: 3 }, rate: 0.2, rateStandardError: 3 },
      { label: "R03", concentrations: { A: 1 }, rate: 1, rateStandardError: 0.1 },
    ];
    expect(fitRateLaw({ species: ["A"], runs })).toMatchObject({
      status: "beyond-precision",
      message: expect.stringMatching(/power of ten/),
    });
  });
});
