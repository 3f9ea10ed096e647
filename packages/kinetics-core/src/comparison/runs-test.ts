import { normalCdf } from "kinetics-core/distributions";
import { MOST_COUNTED_SIGNS } from "./constants";

/**
 * Wald and Wolfowitz' test of runs of equal sign (Ann. Math. Stat. 11, 147, 1940): few where a law of the wrong form
 * leaves a wave in the residuals. Residuals in order; those of 0 have no sign and are left out.
 */
export interface RunsTest {
  /** Stretches of equal sign. */
  readonly stretches: number;
  readonly positive: number;
  readonly negative: number;
  /** Two-sided: twice the smaller tail. */
  readonly pValue: number;
  /** `exact` counts all arrangements; `normal` with continuity correction beyond 40 signs. */
  readonly method: "exact" | "normal";
}

/** Null where all signs are equal or there are fewer than four: nothing is left to arrange. */
export function runsTest(residuals: readonly number[]): RunsTest | null {
  const signs = residuals.filter((value) => value !== 0).map((value) => value > 0);
  const positive = signs.filter(Boolean).length;
  const negative = signs.length - positive;
  if (signs.length < 4 || positive === 0 || negative === 0) return null;
  const stretches = signs.filter((sign, i) => i === 0 || sign !== signs[i - 1]).length;
  const exact = signs.length <= MOST_COUNTED_SIGNS;
  const { lower, upper } = exact
    ? countedTails(stretches, positive, negative)
    : normalTails(stretches, positive, negative);
  return {
    stretches,
    positive,
    negative,
    pValue: Math.min(1, 2 * Math.min(lower, upper)),
    method: exact ? "exact" : "normal",
  };
}

interface BothTails {
  /** P(R ≤ r). */
  readonly lower: number;
  /** P(R ≥ r). */
  readonly upper: number;
}

/** P(R = 2s) = 2 C(a−1, s−1) C(b−1, s−1)/C(a+b, a), P(R = 2s + 1) with one of the two raised by one. */
function countedTails(stretches: number, a: number, b: number): BothTails {
  const all = choose(a + b, a);
  let lower = 0;
  let upper = 0;
  for (let r = 2; r <= a + b; r++) {
    const s = Math.floor(r / 2);
    const ways =
      r % 2 === 0
        ? 2 * choose(a - 1, s - 1) * choose(b - 1, s - 1)
        : choose(a - 1, s) * choose(b - 1, s - 1) + choose(a - 1, s - 1) * choose(b - 1, s);
    if (r <= stretches) lower += ways / all;
    if (r >= stretches) upper += ways / all;
  }
  return { lower, upper };
}

function choose(n: number, k: number): number {
  if (k < 0 || k > n) return 0;
  let ways = 1;
  for (let i = 1; i <= k; i++) ways = (ways * (n - k + i)) / i;
  return ways;
}

function normalTails(stretches: number, a: number, b: number): BothTails {
  const n = a + b;
  const mean = 1 + (2 * a * b) / n;
  const deviation = Math.sqrt((2 * a * b * (2 * a * b - n)) / (n * n * (n - 1)));
  return {
    lower: normalCdf((stretches + 0.5 - mean) / deviation),
    upper: normalCdf(-(stretches - 0.5 - mean) / deviation),
  };
}
