import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { recipesOf, simulateVerdict, type TrueLaw, trueLaws } from "./simulated-verdict";

const REPLICATES = 30;

describe("readings of studies with a known law, fixed seeds", () => {
  let ruledOut = 0;
  let all = 0;

  it.each(Object.entries(trueLaws).map(([id, truth], seed) => [id, truth, seed] as const))(
    "the %s law stands or is undecided, and wrong laws go",
    (id: string, truth: TrueLaw, seed: number) => {
      const draws = randomDraws(300 + seed);
      let stands = 0;
      let wrong = 0;
      for (let replicate = 0; replicate < REPLICATES; replicate++) {
        const { laws, verdict } = simulateVerdict(
          { name: id, truth, recipes: recipesOf(10, 2), scatter: 0.04 },
          draws,
        );
        const own = laws.find((law) => law.id === id);
        if (own?.reading === "ruled-out") ruledOut += 1;
        if (verdict.kind === "standing" && verdict.id === id) stands += 1;
        // Where the simple law is true all others extend it, so that none of them is wrong.
        wrong += laws.filter((law) => law.id !== id && law.reading === "ruled-out").length;
      }
      all += REPLICATES;
      expect(stands / REPLICATES).toBeGreaterThan(0.7);
      if (id !== "simple") expect(wrong / (4 * REPLICATES)).toBeGreaterThan(0.8);
    },
  );

  it("the true law is ruled out in no more than chance would make of 1 %", () => {
    expect(all).toBe(150);
    // 99.9 % point of a binomial of 150 at 1 %: 6 (computed with SciPy 1.17).
    expect(ruledOut).toBeLessThanOrEqual(6);
  });
});
