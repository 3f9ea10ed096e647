import { describe, expect, it } from "vitest";
import { globalFitComputation, runComputation } from "../registry";
import { globalFitResponse } from "./schema";

/** A → P of first order at k = 0.02 s⁻¹ by its closed form, with a ripple in place of noise and scatter between runs. */
function study() {
  const runs = [1, 2, 4, 1.5, 3].map((level, j) => {
    const A = level * 1e-3;
    const k = 0.02 * (1 + 0.02 * Math.sin(7 * j + 1));
    const time = Array.from({ length: 60 }, (_, i) => 2 * (i + 1));
    const signal = time.map((t, i) => 0.05 + 300 * A * Math.exp(-k * t) + 0.002 * Math.sin(2.3 * i + j));
    return { label: `R${j + 1}`, concentrations: { A, P: 0 }, time, signal };
  });
  return {
    species: [
      { name: "A", stoichiometricNumber: -1 },
      { name: "P", stoichiometricNumber: 1 },
    ],
    followed: "A",
    signalPerConcentration: { value: 300, standardUncertainty: 3 },
    runs,
    orders: { A: "free" },
  };
}

const compute = (body: unknown) => runComputation(globalFitComputation, body);

function answerTo(body: unknown) {
  const computed = compute(body);
  if (!computed.ok) throw new Error(JSON.stringify(computed.errors));
  return computed.answer;
}

describe("global fit", () => {
  it("answers in its own described shape, without loss on the way through JSON", () => {
    const answer = answerTo(study());
    expect(globalFitResponse.parse(answer)).toEqual(answer);
    expect(JSON.parse(JSON.stringify(answer))).toEqual(answer);
  });

  it("finds order and rate constant of a first-order reaction, with an interval that holds them", () => {
    const { orders, logRateConstant, rateConstant, runs } = answerTo(study());
    const [low, high] = orders.A?.interval ?? [0, 0];
    expect(low).toBeLessThan(1);
    expect(high).toBeGreaterThan(1);
    expect(high - low).toBeLessThan(0.2);
    expect(Number(logRateConstant.interval?.[0])).toBeLessThan(Math.log(0.02));
    expect(Number(logRateConstant.interval?.[1])).toBeGreaterThan(Math.log(0.02));
    expect(rateConstant.unit).toContain("s^-1");
    expect(runs.map((run) => run.label)).toEqual(["R1", "R2", "R3", "R4", "R5"]);
    expect(runs[0]?.offset).toBeCloseTo(0.05, 1);
  });

  it("takes an end signal of every kind that an integrated law takes", () => {
    const withEnd = (endSignal: unknown) => {
      const { runs, ...rest } = study();
      return { ...rest, runs: runs.map((run) => ({ ...run, endSignal })) };
    };
    expect(answerTo(withEnd({ kind: "free" }))).toEqual(answerTo(study()));
    const known = { value: 0.05, standardUncertainty: 0.001 };
    expect(answerTo(withEnd({ kind: "known", ...known }))).toEqual(answerTo(withEnd(known)));
    expect(answerTo(withEnd({ kind: "zero" }))).toEqual(
      answerTo(withEnd({ value: 0, standardUncertainty: 0 })),
    );
    expect(answerTo(withEnd({ kind: "zero" }))).not.toEqual(answerTo(study()));
    const refused = compute(withEnd({ kind: "blank" }));
    expect(refused.ok ? [] : refused.errors.slice(0, 1)).toEqual([
      { path: "runs.0.endSignal", message: expect.stringContaining("value and standardUncertainty") },
    ]);
  });

  it("gives the unit of a held order in closed form", () => {
    const { rateConstant, orders } = answerTo({ ...study(), orders: { A: 1 }, timeUnit: "min" });
    expect(rateConstant.unit).toBe("min^-1");
    expect(rateConstant.estimate).toBeCloseTo(0.02, 3);
    expect(orders.A).toMatchObject({ estimate: 1, standardError: null, interval: null });
  });

  it("says null, not zero, where one run leaves no scatter to see, and flags it", () => {
    const answer = answerTo({ ...study(), runs: study().runs.slice(0, 1), orders: { A: 1 } });
    expect(answer.betweenRunStandardDeviation).toBeNull();
    expect(answer.logRateConstant).toMatchObject({ standardError: null, interval: null });
    expect(answer.logRateConstant.estimate).toBeCloseTo(Math.log(0.02), 1);
    expect(answer.flags).toContainEqual(expect.objectContaining({ severity: "blocks" }));
  });

  it("takes an end signal as one more observation", () => {
    const runs = study().runs.map((run) => ({
      ...run,
      endSignal: { value: 0.05, standardUncertainty: 0.001 },
    }));
    const answer = answerTo({ ...study(), runs });
    expect(answer.runs[0]?.offset).toBeCloseTo(0.05, 2);
  });

  const first = study().runs[0];
  it.each([
    ["no runs", { ...study(), runs: [] }, "runs"],
    ["a followed species that is none", { ...study(), followed: "X" }, "followed"],
    ["an order of an unknown species", { ...study(), orders: { X: "free" } }, "orders.X"],
    [
      "a run without a concentration",
      { ...study(), runs: [{ ...first, concentrations: { A: 1e-3 } }] },
      "runs.0.concentrations.P",
    ],
    [
      "times that fall",
      { ...study(), runs: [{ ...first, time: [...(first?.time ?? [])].reverse() }] },
      "runs.0.time.1",
    ],
    ["a signal too short", { ...study(), runs: [{ ...first, signal: [1, 2] }] }, "runs.0.signal"],
    [
      "three readings",
      { ...study(), runs: [{ ...first, time: [1, 2, 3], signal: [3, 2, 1] }] },
      "runs.0.time",
    ],
    [
      "an exact zero for ε·l",
      { ...study(), signalPerConcentration: { value: 0, standardUncertainty: 0 } },
      "signalPerConcentration.value",
    ],
  ])("refuses %s and names the place", (_, body, place) => {
    const computed = compute(body);
    expect(computed.ok).toBe(false);
    expect(computed.ok || computed.errors[0]?.path).toBe(place);
    expect(computed.ok || computed.errors[0]?.message).toMatch(/\w/);
  });
});
