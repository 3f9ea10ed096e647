import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { fitGlobal } from "./fit-global";
import type { GlobalFitInput } from "./global-fit";
import { simulateStudy } from "./simulated-study";

const input = simulateStudy({
  runs: 9,
  points: 80,
  orders: { A: 1, B: 0.5 },
  rateConstant: 2,
  betweenRuns: 0.03,
  noise: 0.003,
  seed: 5,
});

type Run = GlobalFitInput["runs"][number];

const withRuns = (change: (run: Run, index: number) => Run) => ({ ...input, runs: input.runs.map(change) });

describe("what a global fit cannot say", () => {
  it("is named where no trace changes beyond its noise", () => {
    const draws = randomDraws(2);
    const flat = withRuns((run) => ({
      ...run,
      signal: Array.from(run.signal, () => 0.1 + 0.003 * draws.normal()),
    }));
    expect(fitGlobal(flat).status).toBe("no-change");
    const exact = withRuns((run) => ({ ...run, signal: Array.from(run.signal, () => 0.1) }));
    expect(fitGlobal(exact).status).toBe("no-change");
  });

  it("is named by the signs where every trace goes the other way", () => {
    const formed = { ...input, species: input.species.map((one) => ({ ...one, stoichiometricNumber: 1 })) };
    expect(fitGlobal(formed)).toMatchObject({
      status: "wrong-direction",
      path: "followed",
      message: expect.stringContaining("The traces fall, where"),
    });
    const bleaching = { ...input, signalPerConcentration: { value: -250, standardUncertainty: 2.5 } };
    expect(fitGlobal(bleaching)).toMatchObject({
      status: "wrong-direction",
      message: expect.stringContaining("number −1 with a signal per concentration of −250 makes them rise"),
    });
  });

  it("is named where the reaction never begins", () => {
    const without = withRuns((run) => ({ ...run, concentrations: { ...run.concentrations, A: 0 } }));
    expect(fitGlobal(without)).toMatchObject({ status: "exhausted-at-first-reading", path: "runs" });
  });

  it("is named by its combination where two reactants are equal in every run", () => {
    const equal = withRuns((run) => {
      const { A = 0 } = run.concentrations;
      const k = 30;
      return {
        ...run,
        concentrations: { A, B: A },
        signal: Array.from(run.time, (t, i) => 0.1 + (250 * A) / (1 + k * A * t) + 0.003 * Math.sin(1.7 * i)),
      };
    });
    const both = fitGlobal(equal);
    if (both.status !== "not-determined") throw new Error(both.status);
    const combination = both.undetermined[0]?.combination ?? {};
    expect(combination.B).toBe(1);
    expect(combination.A).toBeCloseTo(-1, 6);
    const one = fitGlobal({ ...equal, law: { orders: { A: "free" } } });
    if (one.status !== "fitted") throw new Error(one.status);
    expect(one.orders.A?.estimate).toBeCloseTo(2, 1);
  });

  it("is named where a species of free order neither varies nor is used up", () => {
    const excess = {
      ...input,
      species: [
        { name: "A", stoichiometricNumber: -1 },
        { name: "B", stoichiometricNumber: 0 },
      ],
      runs: input.runs.slice(0, 3),
    };
    const fit = fitGlobal(excess);
    expect(fit.status).toBe("not-determined");
    expect(fit.status === "not-determined" && fit.message).toContain("B");
  });

  it("is said of a run that teaches nothing, while the others are fitted", () => {
    const fit = fitGlobal(
      withRuns((run, j) => (j > 0 ? run : { ...run, concentrations: { ...run.concentrations, B: 0 } })),
    );
    if (fit.status !== "fitted") throw new Error(fit.status);
    expect(fit.runs[0]?.logRateConstant.estimate).toBeNull();
    expect(fit.flags).toContainEqual(expect.objectContaining({ code: "run-without-rate" }));
  });

  it("is a stop where the caller asks for one", () => {
    expect(fitGlobal(input, { shouldStop: () => true }).status).toBe("stopped");
  });

  const first = input.runs[0];
  it.each<[string, Partial<GlobalFitInput>, string, RegExp]>([
    ["no run", { runs: [] }, "runs", /no run/],
    ["a stranger followed", { followed: "X" }, "followed", /X is not among/],
    [
      "a scale of zero",
      { signalPerConcentration: { value: 0, standardUncertainty: 1 } },
      "signalPerConcentration.value",
      /0/,
    ],
    [
      "a species named twice",
      { species: [...input.species, { name: "A", stoichiometricNumber: 1 }] },
      "species.2",
      /twice/,
    ],
    ["an order that is not a number", { law: { orders: { A: Number.NaN } } }, "law.orders.A", /finite/],
    ["two runs of one label", { runs: first === undefined ? [] : [first, first] }, "runs.1.label", /label/],
    [
      "a signal that is not a number",
      { runs: first === undefined ? [] : [{ ...first, signal: Array.from(first.signal, () => Number.NaN) }] },
      "runs.0.signal.0",
      /finite/,
    ],
    [
      "three readings",
      { runs: first === undefined ? [] : [{ ...first, time: [1, 2, 3], signal: [3, 2, 1] }] },
      "runs.0.time",
      /at least 4/,
    ],
  ])("refuses %s, says where, what and what is accepted", (_, change, path, message) => {
    const fit = fitGlobal({ ...input, ...change });
    if (fit.status === "fitted") throw new Error("fitted");
    expect(fit.path).toBe(path);
    expect(fit.message).toMatch(message);
  });
});
