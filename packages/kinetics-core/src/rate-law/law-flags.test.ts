import { labelOf } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { fitRateLaw } from "./fit-rate-law";

/** Rates k·cⁿ at c = 1, 2, 4 …, each times its own factor. */
function flagsOf(order: number, factors: readonly number[]) {
  const fit = fitRateLaw({
    species: ["A"],
    runs: factors.map((factor, j) => ({
      label: labelOf(j),
      concentrations: { A: 2 ** j },
      rate: 3 * 2 ** (j * order) * factor,
    })),
  });
  if (fit.status !== "fitted") throw new Error(fit.message);
  return fit.flags;
}

const messageOf = (code: string, order: number, factors: readonly number[]) =>
  flagsOf(order, factors).find((flag) => flag.code === code)?.message;

describe("findings on a law as a whole", () => {
  it("name a table that is exact even where only the simple orders leave freedom to see it", () => {
    expect(messageOf("exact-table", 1, [1, 1])).toContain("say nothing about a measurement");
    expect(messageOf("exact-table", 1, [1, 1.02])).toBeUndefined();
    expect(messageOf("exact-table", 1, [1, 1, 1])).toContain("say nothing about a measurement");
    expect(messageOf("exact-table", 1, [1, 1.02, 1])).toBeUndefined();
  });

  it("say how far a run lies off in percent, and in factors where percents say nothing", () => {
    const off = (factor: number) =>
      messageOf("influential-run", 1, [1.01, 0.99, 1.01, factor, 0.99, 1.01, 0.99, 1, 1.01]);
    expect(off(1.3)).toMatch(/^R04 lies \d\d % above the law, /);
    expect(off(0.01)).toMatch(/^R04 lies a factor of \d+ below the law, /);
    expect(off(1e25)).toMatch(/^R04 lies a factor of \S+ × 10\S+ above the law, /);
  });

  it("print the limits of an order with places enough to tell them apart", () => {
    const factors = [1, 1.00002, 0.99999, 1.00001, 0.99998];
    const [, low, high] =
      /lies between ([\d.]+) and ([\d.]+), which/.exec(messageOf("order-not-simple", 0.98, factors) ?? "") ??
      [];
    expect(Number(low)).toBeLessThan(0.98);
    expect(Number(high)).toBeGreaterThan(0.98);
    expect(Number(high) - Number(low)).toBeLessThan(1e-3);
    expect(messageOf("order-not-simple", 0.8, [1, 1.02, 0.99, 1.01, 0.98])).toMatch(
      /between 0\.\d{2,3} and 0\.\d{2,3},/,
    );
  });
});
