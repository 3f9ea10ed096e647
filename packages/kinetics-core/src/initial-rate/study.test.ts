import { randomDraws } from "kinetics-core/random";
import { fitRateLaw } from "kinetics-core/rate-law";
import { catalysedRecipes, catalysedSpeeds, simulateTrace } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { chooseStudyRule } from "./choose-study-rule";
import { estimateInitialRate } from "./estimate-initial-rate";
import type { InitialRate, StudyTrace } from "./initial-rate";

/**
 * From traces to orders with known truth, v = k·aⁿ·b with b a catalyst: the study's rule against a line over one
 * window of the clock for all runs. Runs differ in conversion, carry 3 % of scatter in k and noisy readings.
 */

const DURATION = 100;
const RUN_SCATTER = 0.03;
const STUDIES = 15;

type SimulatedRun = StudyTrace & { readonly a: number; readonly b: number; readonly span: number };

/** `fastest`: conversion of the fastest run at the last reading. k follows from it. */
function simulateStudy(order: number, fastest: number, deviate: () => number) {
  const { speeds, rateConstant } = catalysedSpeeds(catalysedRecipes, { order, fastest, duration: DURATION });
  const runs: SimulatedRun[] = catalysedRecipes.map(({ a, b }, j) => {
    const speed = rateConstant * Number(speeds[j]) * Math.exp(RUN_SCATTER * deviate());
    const course = { order, progress: speed * DURATION, readings: 120, duration: DURATION };
    const signal = { start: 0.05, span: a, noise: 0.004, autocorrelation: 0.3 };
    const trace = simulateTrace({ ...course, ...signal }, deviate);
    return { label: `run ${j + 1}`, a, b, trace, timeZero: 0, signalSpan: a, span: a };
  });
  return { runs, rateConstant };
}

function ordersFrom(runs: SimulatedRun[], estimate: (run: SimulatedRun) => InitialRate) {
  const fit = fitRateLaw({
    species: ["a", "b"],
    runs: runs.map((run) => {
      const found = estimate(run);
      if (found.status !== "found") throw new Error(found.message);
      const rates = { rate: found.slope, rateStandardError: found.standardError };
      return { label: run.label, concentrations: { a: run.a, b: run.b }, ...rates };
    }),
  });
  if (fit.status !== "fitted") throw new Error(fit.status);
  return fit;
}

function covers({ interval }: { interval: readonly [number, number] | null }, truth: number): boolean {
  return interval !== null && interval[0] <= truth && truth <= interval[1];
}

describe.each([
  { order: 1, fastest: 0.4, clockOrderAtMost: 0.96 },
  { order: 1, fastest: 0.8, clockOrderAtMost: 0.85 },
  { order: 2, fastest: 0.4, clockOrderAtMost: 0.9 },
  { order: 2, fastest: 0.8, clockOrderAtMost: 0.6 },
])("a study of order $order up to conversion $fastest", ({ order, fastest, clockOrderAtMost }) => {
  const deviate = randomDraws(100 * order + 10 * fastest).normal;
  const studies = Array.from({ length: STUDIES }, () => {
    const { runs, rateConstant } = simulateStudy(order, fastest, deviate);
    const rule = chooseStudyRule(runs)?.rule;
    if (!rule) throw new Error("no rule");
    const byRule = ordersFrom(runs, ({ trace, span }) =>
      estimateInitialRate(trace, { signalSpan: span, rule }),
    );
    const byClock = ordersFrom(runs, ({ trace }) =>
      estimateInitialRate(trace, { estimator: "straight", window: [0, DURATION / 2] }),
    );
    return { byRule, byClock, rateConstant };
  });

  it("has orders and ln k within their 95 % intervals", () => {
    // Of 45 intervals about 43 are expected; with independent 95 % intervals fewer than 38 has a chance of 0.2 %.
    const covered = studies.flatMap(({ byRule, rateConstant }) => [
      covers(byRule.orders.a ?? { interval: null }, order),
      covers(byRule.orders.b ?? { interval: null }, 1),
      covers(byRule.logRateConstant, Math.log(rateConstant)),
    ]);
    expect(covered.filter(Boolean).length).toBeGreaterThanOrEqual(38);
  });

  it("has no bias in the order of the catalyst, which a common clock pulls down", () => {
    const mean = (of: "byRule" | "byClock") =>
      studies.reduce((sum, study) => sum + Number(study[of].orders.b?.estimate), 0) / STUDIES;
    expect(Math.abs(mean("byRule") - 1)).toBeLessThan(0.04);
    expect(mean("byClock")).toBeLessThan(clockOrderAtMost);
  });
});
