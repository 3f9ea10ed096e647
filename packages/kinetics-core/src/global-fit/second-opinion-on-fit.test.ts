import { describe, expect, it } from "vitest";
import { prepareStudy } from "./prepare-study";
import { evaluatePoints } from "./run-points";
import { secondOpinionOnFit } from "./second-opinion-on-fit";
import { simulateStudy } from "./simulated-study";
import { StudyPass } from "./study-pass";

const study = {
  runs: 5,
  points: 40,
  orders: { A: 1, B: 0.5 },
  rateConstant: 2,
  betweenRuns: 0.04,
  noise: 0.003,
  seed: 6,
};

describe("a second opinion on a global fit", () => {
  it.each([0.04, 0])("agrees to six digits with scatter %d between runs", (betweenRuns) => {
    const opinion = secondOpinionOnFit(simulateStudy({ ...study, betweenRuns }));
    if (opinion.status !== "agrees") throw new Error(opinion.message);
    expect(opinion.digits).toBeGreaterThan(6);
    expect(opinion.message).toMatch(/Two optimisers agree to \d+ digits/);
  });

  it("agrees where end readings, times zero and scales are observed too", () => {
    const input = simulateStudy(study);
    const runs = input.runs.map((run) => ({
      ...run,
      endSignal: { value: 0.02, standardUncertainty: 0.05 },
      timeZero: { value: -0.1, standardUncertainty: 0.02 },
    }));
    const opinion = secondOpinionOnFit({ ...input, runs, scaleDeviation: 0.01 });
    if (opinion.status !== "agrees") throw new Error(opinion.message);
    expect(opinion.digits).toBeGreaterThan(4);
  });

  it("forms at every reading what the pass sums without forming it", () => {
    const prepared = prepareStudy(simulateStudy(study));
    if (prepared.status === "refused") throw new Error(prepared.failure.message);
    const pass = new StudyPass(prepared.study);
    const theta = Float64Array.of(0.5, 0.9, 0.6, 1.01);
    pass.at(theta, 1e-10);
    prepared.study.runs.forEach((run, j) => {
      const signal = new Float64Array(40);
      const columns = Array.from(theta, () => new Float64Array(40));
      const place = {
        logRateConstant: 0.5,
        parameters: [0.9, 0.6],
        scale: 1.01,
        ownScale: 1,
        timeZero: 0,
        tolerance: 1e-10,
      };
      expect(evaluatePoints(prepared.study, run, place, signal, columns)).toBe(true);
      const centred = (values: Float64Array) => {
        const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
        return values.map((value) => value - mean);
      };
      const residual = centred(run.signal.map((y, i) => y - (signal[i] ?? 0)));
      columns.forEach((column, a) => {
        const dot = centred(column).reduce((sum, value, i) => sum + value * (residual[i] ?? 0), 0);
        expect((pass.runs[j]?.gradient[a] ?? 0) / dot).toBeCloseTo(1, 5);
      });
    });
  });
});
