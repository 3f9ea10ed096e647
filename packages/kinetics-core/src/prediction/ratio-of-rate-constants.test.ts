import { randomDraws } from "kinetics-core/random";
import { fitRateLaw } from "kinetics-core/rate-law";
import { nineRuns, simulateRuns } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { ratioOfRateConstants, type StudyConstant, studyConstantOf } from "./ratio-of-rate-constants";

const light: StudyConstant = {
  name: "H",
  logRateConstant: Math.log(0.42),
  unit: "L mol^-1 s^-1",
  budget: [
    { source: "Scatter of the runs", relative: 0.02 },
    { source: "stock of A", relative: 0.03 },
    { source: "ε·l", relative: 0.01 },
  ],
  degreesOfFreedom: 6,
};
const heavy: StudyConstant = {
  ...light,
  name: "D",
  logRateConstant: Math.log(0.07),
  budget: [
    { source: "Scatter of the runs", relative: 0.025 },
    { source: "stock of A", relative: 0.03 },
    { source: "ε·l", relative: 0.01 },
  ],
  degreesOfFreedom: 4,
};

function compared(first: StudyConstant, second: StudyConstant, shared: readonly string[]) {
  const result = ratioOfRateConstants(first, second, shared);
  if (result.status !== "compared") throw new Error(result.message);
  return result;
}

describe("the ratio of two rate constants", () => {
  it("keeps only the scatter where stock and calibration are shared", () => {
    const result = compared(light, heavy, ["stock of A", "ε·l"]);
    expect(result.ratio.estimate).toBeCloseTo(6, 12);
    expect(result.logRatio.standardError).toBeCloseTo(Math.hypot(0.02, 0.025), 12);
    expect(result.unsharedStandardError).toBeCloseTo(
      Math.sqrt(0.02 ** 2 + 0.025 ** 2 + 2 * 0.03 ** 2 + 2 * 0.01 ** 2),
      12,
    );
    expect(result.cancelled).toEqual(["stock of A", "ε·l"]);
    const sum = result.budget.reduce((total, line) => total + line.relative ** 2, 0);
    expect(Math.sqrt(sum)).toBeCloseTo(Number(result.logRatio.standardError), 12);
  });

  it("cancels a source in part where its effects differ", () => {
    const other = {
      ...heavy,
      budget: [...heavy.budget.slice(0, 1), { source: "stock of A", relative: 0.06 }],
    };
    const result = compared({ ...light, budget: light.budget.slice(0, 2) }, other, ["stock of A"]);
    expect(result.logRatio.standardError).toBeCloseTo(Math.hypot(0.02, 0.025, 0.03), 12);
  });

  it("cancels nothing that is not in both budgets, nor the scatter, and says so", () => {
    const result = compared(light, heavy, ["Scatter of the runs", "thermometer"]);
    expect(result.logRatio.standardError).toBeCloseTo(Number(result.unsharedStandardError), 12);
    expect(result.flags[0]).toMatchObject({ code: "shared-source-unknown" });
  });

  it("of a study with itself is 1, and turned over it is the reciprocal", () => {
    expect(compared(light, light, []).pValue).toBe(1);
    const one = compared(light, heavy, ["ε·l"]);
    const other = compared(heavy, light, ["ε·l"]);
    expect(Number(one.ratio.interval?.[0]) * Number(other.ratio.interval?.[1])).toBeCloseTo(1, 10);
  });

  it("does not exist between different units, and has no interval without freedom", () => {
    expect(ratioOfRateConstants(light, { ...heavy, unit: "s^-1" }, [])).toMatchObject({
      status: "different-units",
      place: "second.unit",
    });
    const bare = compared({ ...light, degreesOfFreedom: null }, heavy, []);
    expect(bare.ratio).toMatchObject({ standardError: null, interval: null });
    expect(bare.flags[0]).toMatchObject({ code: "no-freedom", severity: "blocks" });
  });

  it("covers the truth at 95 % between studies from one stock, where ignoring the stock is far too wide", () => {
    const replicates = 200;
    let covered = 0;
    let narrower = 0;
    const study = (seed: number, stockError: number, rateConstant: number) => {
      const input = simulateRuns(
        {
          ...nineRuns,
          scatter: 0.03,
          rateErrors: [],
          pipetting: 0,
          rateConstant: rateConstant * Math.exp(stockError),
        },
        randomDraws(seed).normal,
      );
      const fit = fitRateLaw({
        ...input,
        orders: { A: 1, B: 2 },
        shared: [{ species: ["A"], relative: 0.05, source: "stock of A" }],
      });
      const constant = fit.status === "fitted" ? studyConstantOf(`study ${seed}`, fit) : null;
      if (constant === null) throw new Error("no constant");
      return constant;
    };
    for (let seed = 0; seed < replicates; seed++) {
      // One stock, one error: both k move by it.
      const stockError = 0.05 * randomDraws(7000 + seed).normal();
      const result = compared(study(seed, stockError, 12), study(3000 + seed, stockError, 4), ["stock of A"]);
      const [low = 0, high = 0] = result.ratio.interval ?? [];
      if (low <= 3 && 3 <= high) covered++;
      if (Number(result.logRatio.standardError) < 0.5 * Number(result.unsharedStandardError)) narrower++;
    }
    // 0.5 % point of a binomial with 92.5 % in 200.
    expect(covered).toBeGreaterThanOrEqual(175);
    expect(narrower).toBe(replicates);
  });
});
