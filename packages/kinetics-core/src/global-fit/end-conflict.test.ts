import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { endConflict } from "./end-conflict";
import { fitGlobal } from "./fit-global";
import type { GlobalFitInput } from "./global-fit";
import { simulateStudy } from "./simulated-study";

const RUNS = 6;
const POINTS = 60;
const END_ERROR = 0.002;

/** A study whose runs state their end signals, all of them off by `shift`. */
function studyWithEnds(seed: number, shift: number): GlobalFitInput {
  const input = simulateStudy({
    runs: RUNS,
    points: POINTS,
    orders: { A: 1, B: 1 },
    rateConstant: 3,
    betweenRuns: 0.02,
    noise: 0.002,
    seed,
  });
  // The simulation draws ln k, the offset, and then one error more than there are readings, run by run.
  const draws = randomDraws(seed);
  const ends = randomDraws(seed + 1000);
  const runs = input.runs.map((run) => {
    draws.normal();
    const offset = 0.05 * draws.normal();
    for (let i = 0; i <= POINTS; i++) draws.normal();
    const value = offset + shift + END_ERROR * ends.normal();
    return { ...run, endSignal: { value, standardUncertainty: END_ERROR } };
  });
  return { ...input, runs };
}

function conflictOf(input: GlobalFitInput) {
  const fit = fitGlobal(input);
  if (fit.status !== "fitted") throw new Error(fit.message);
  return endConflict(input, fit);
}

describe("stated end signals beside free ones", () => {
  it("agree in studies where they are true, but for the odd one in twenty a parameter", () => {
    const severities = Array.from({ length: 40 }, (_, seed) =>
      conflictOf(studyWithEnds(seed + 1, 0)).flags.map(({ severity }) => severity),
    ).flat();
    expect(severities.length).toBeLessThanOrEqual(9);
    expect(severities.filter((severity) => severity === "blocks").length).toBeLessThanOrEqual(2);
  });

  it.each([0.02, -0.02])("conflict where every end is off by %s, ten times what is stated", (shift) => {
    for (let seed = 1; seed <= 6; seed++) {
      expect(conflictOf(studyWithEnds(seed, shift))).toMatchObject({
        status: "compared",
        flags: [{ code: "end-conflict", severity: "blocks" }],
      });
    }
  });

  it("have nothing to be compared with where no end is stated", () => {
    const { runs, ...rest } = studyWithEnds(1, 0);
    const input = { ...rest, runs: runs.map(({ endSignal: _, ...run }) => run) };
    expect(conflictOf(input)).toEqual({ status: "nothing-to-compare", flags: [] });
  });
});
