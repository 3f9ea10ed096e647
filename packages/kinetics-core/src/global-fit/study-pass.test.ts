import type { EquationValue, RateEquation } from "kinetics-core/rate-equation";
import { describe, expect, it } from "vitest";
import type { GlobalFitInput } from "./global-fit";
import { prepareStudy } from "./prepare-study";
import { type PreparedStudy, thinned } from "./prepared-study";
import { updateNuisances } from "./project-run";
import { simulateStudy } from "./simulated-study";
import { StudyPass } from "./study-pass";

const input = simulateStudy({
  runs: 4,
  points: 60,
  orders: { A: 1, B: 0.5 },
  rateConstant: 2,
  betweenRuns: 0.05,
  noise: 0.01,
  seed: 9,
});

function prepared(study: GlobalFitInput): PreparedStudy {
  const preparation = prepareStudy(study);
  if (preparation.status === "refused") throw new Error(preparation.failure.message);
  return preparation.study;
}

/** Σ r² by differences against −2 g, for every parameter. */
function expectGradient(study: PreparedStudy, theta: readonly number[], noise = 1e-4) {
  const pass = new StudyPass(study);
  pass.setNoise(noise);
  const squares = (at: Float64Array) => {
    expect(pass.at(at, 1e-12)).toBe(true);
    return pass.residualSquares;
  };
  for (let turn = 0; turn < 12; turn++) {
    squares(Float64Array.from(theta));
    for (const run of pass.runs) updateNuisances(study, run, new Float64Array(theta.length), 0);
  }
  squares(Float64Array.from(theta));
  const gradient = pass.gradient.slice();
  theta.forEach((_, i) => {
    const h = 1e-4;
    const moved = (by: number) =>
      squares(Float64Array.from(theta, (value, j) => (i === j ? value + by : value)));
    const slope = (moved(h) - moved(-h)) / (2 * h);
    expect((-2 * (gradient[i] ?? 0)) / slope).toBeCloseTo(1, 4);
  });
}

describe("a pass over a study", () => {
  it("gives the gradient of the sum of squares by every parameter", () => {
    expectGradient(prepared(input), [0.5, 0.9, 0.6, 1.02]);
  });

  it("gives it with orders at which a reactant is used up within the trace", () => {
    expectGradient(prepared(input), [-2.2, 0.4, 0.2, 0.99]);
  });

  it("gives it with an end reading for every run", () => {
    const runs = input.runs.map((run) => ({
      ...run,
      endSignal: { value: 0.01, standardUncertainty: 0.02 },
    }));
    expectGradient(prepared({ ...input, runs }), [0.5, 0.9, 0.6, 1.02]);
  });

  it("gives it with times zero and scales of their own, once these are at their best", () => {
    const runs = input.runs.map((run) => ({ ...run, timeZero: { value: -0.6, standardUncertainty: 0.05 } }));
    expectGradient(prepared({ ...input, runs, scaleDeviation: 0.02 }), [0.5, 0.9, 0.6, 1.02]);
  });

  it("gives it for a law that comes to equilibrium", () => {
    expectGradient(
      prepared({
        ...input,
        species: [
          { name: "A", stoichiometricNumber: -1 },
          { name: "B", stoichiometricNumber: 1 },
        ],
        law: { equation: reversible },
      }),
      [-6, 0.8, 1.1],
    );
  });

  it("centres by the offset: another zero of the signal changes nothing", () => {
    const moved = input.runs.map((run, j) => ({ ...run, signal: Array.from(run.signal, (y) => y + 3 + j) }));
    const theta = Float64Array.of(0.5, 0.9, 0.6, 1);
    const here = new StudyPass(prepared(input));
    const there = new StudyPass(prepared({ ...input, runs: moved }));
    here.at(theta, 1e-6);
    there.at(theta, 1e-6);
    expect(there.residualSquares).toBeCloseTo(here.residualSquares, 9);
    expect((there.runs[2]?.startSignal ?? 0) - (here.runs[2]?.startSignal ?? 0)).toBeCloseTo(5, 9);
  });

  it("reads unevenly spaced times as well as even ones", () => {
    const study = prepared(input);
    const loop = { ...study, runs: study.runs.map((run) => ({ ...run, spacing: 0 })) };
    const theta = Float64Array.of(0.5, 0.9, 0.6, 1);
    const even = new StudyPass(study);
    const uneven = new StudyPass(loop);
    expect(study.runs[0]?.spacing).toBeGreaterThan(0);
    even.at(theta, 1e-6);
    uneven.at(theta, 1e-6);
    even.gram.forEach((value, i) => {
      expect((uneven.gram[i] ?? 0) / value).toBeCloseTo(1, 9);
    });
  });

  it("keeps first and last reading when it thins", () => {
    const long = simulateStudy({ ...simulated, points: 500 });
    const few = thinned(prepared(long), 20).runs[0];
    expect(few?.time).toHaveLength(20);
    expect(few?.time[0]).toBe(long.runs[0]?.time[0]);
    expect(few?.time[19]).toBe(long.runs[0]?.time[499]);
  });
});

const simulated = {
  runs: 2,
  points: 60,
  orders: { A: 1, B: 1 },
  rateConstant: 2,
  betweenRuns: 0,
  noise: 0.01,
  seed: 1,
};

/** v = k ([A] − K [B]). */
const reversible: RateEquation = {
  form: "reversible",
  law: "v = k ([A] − K [B])",
  species: ["A", "B"],
  parameters: [
    {
      name: "K",
      kind: "constant",
      concentrationPower: () => 0,
      start: 1,
      bounds: [0, 100],
      nullValue: 0,
    },
  ],
  evaluate(c: Float64Array, theta: Float64Array, into: EquationValue) {
    const [K = 0] = theta;
    into.f = (c[0] ?? 0) - K * (c[1] ?? 0);
    into.byConcentration[0] = 1;
    into.byConcentration[1] = -K;
    into.byParameter[0] = -(c[1] ?? 0);
    return true;
  },
  reversible: true,
  overallOrder: () => 1,
  simpler: [],
};
