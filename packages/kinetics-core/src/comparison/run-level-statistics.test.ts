import { describe, expect, it } from "vitest";
import { holm, leaveOneOutOpinion, runLevelAicc, runLevelF } from "./run-level-statistics";

describe("statistics on the level of runs", () => {
  it("AICc by its formula, with the variance among the parameters", () => {
    // 10 ln(0.02/10) + 2·4 + 2·4·5/(10 − 5), p = 3.
    expect(runLevelAicc(0.02, 10, 3)).toBeCloseTo(10 * Math.log(0.002) + 8 + 8, 12);
    expect(runLevelAicc(0.02, 5, 3)).toBeNull();
    expect(runLevelAicc(0.02, 6, 3)).not.toBeNull();
  });

  it("F against F(1, m − p_best), its p-value from SciPy 1.17", () => {
    const f = runLevelF(0.05, { runSquares: 0.02, parameters: 3 }, 10);
    expect(f?.fStatistic).toBeCloseTo(10.5, 12);
    // scipy.stats.f.sf(10.5, 1, 7)
    expect(f?.pValue).toBeCloseTo(0.014245753043853024, 12);
    expect(runLevelF(0.01, { runSquares: 0.02, parameters: 3 }, 10)).toBeNull();
  });

  it("Holm's adjustment, checked by hand", () => {
    expect(holm([0.01, null, 0.04, 0.03])).toEqual([0.03, null, 0.06, 0.06]);
    expect(holm([0.5, 0.9])).toEqual([1, 1]);
    expect(holm([])).toEqual([]);
  });

  it("leave-one-run-out error and paired t, checked by hand", () => {
    const opinion = leaveOneOutOpinion([0.2, 0.1, null, 0.4], [0.1, 0.1, 0.1, 0.1], [1, 1, 1, 2]);
    expect(opinion?.error).toBeCloseTo(Math.sqrt((0.04 + 0.01 + 2 * 0.16) / 4), 12);
    const [a, b, c] = [0.03, 0, 0.3];
    const mean = (a + b + c) / 3;
    const deviation = Math.sqrt(((a - mean) ** 2 + (b - mean) ** 2 + (c - mean) ** 2) / 2);
    expect(opinion?.pairedT).toBeCloseTo((mean * Math.sqrt(3)) / deviation, 10);
    expect(leaveOneOutOpinion([null, null], null, [1, 1])).toBeNull();
  });
});
