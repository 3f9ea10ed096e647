import { execFileSync } from "node:child_process";
import path from "node:path";
import { fitRateLaw, type RateLawInput } from "kinetics-core/rate-law";
import { beforeAll, describe, expect, it } from "vitest";
import { runInPoolWithin } from "@/app/_workers/pool";
import { fittedLaw } from "./fit-law";
import { isQuickFit } from "./quick-fit";

beforeAll(() => {
  // The pool loads its worker from dist/, as in production.
  execFileSync(process.execPath, [path.resolve(import.meta.dirname, "../_workers/build.mjs")]);
});

/** v = 2 [A] [B]² with a ripple of 2 % in place of scatter, in as many blocks as asked for. */
function law(runs: number, blocks: number): RateLawInput {
  return {
    species: ["A", "B"],
    runs: Array.from({ length: runs }, (_, i) => {
      const A = 1 + ((i * 7) % 11) / 10;
      const B = 1 + ((i * 5) % 13) / 10;
      return {
        label: `R${i + 1}`,
        concentrations: { A, B },
        rate: 2 * A * B ** 2 * (1 + 0.02 * Math.sin(12.9898 * i)),
        rateStandardError: 0.01,
        ...(blocks === 0 ? {} : { block: `day ${i % blocks}` }),
      };
    }),
  };
}

describe("a law's fit", () => {
  it("is quick for a study of the bench and goes to the pool where blocks or runs are many", () => {
    expect(isQuickFit(law(30, 5))).toBe(true);
    expect(isQuickFit(law(30, 15))).toBe(false);
    expect(isQuickFit(law(300, 0))).toBe(false);
    const { runs, ...rest } = law(30, 0);
    const oneNamed = runs.map((run, i) => (i === 0 ? { ...run, block: "Monday" } : run));
    expect(isQuickFit({ ...rest, runs: oneNamed })).toBe(false);
  });

  it("is the same from the pool as from here", async () => {
    const input = law(60, 15);
    expect(isQuickFit(input)).toBe(false);
    expect(await fittedLaw(input)).toEqual(fitRateLaw(input));
  });

  it("is ended at its deadline, and the pool works on", async () => {
    // Half a thousand blocks of two keep the search busy for minutes.
    expect(await runInPoolWithin("fitLargeLaw", law(1000, 500), 2000)).toEqual({ status: "too-long" });
    const next = await runInPoolWithin("fitLargeLaw", law(20, 0), 25_000);
    expect(next.status === "done" && next.value.status).toBe("fitted");
  });
});
