import { describe, expect, it } from "vitest";
import type { Candidate, ExtensionFact, FittedCandidate } from "./candidate";
import { compareLaws } from "./compare-laws";

const runs = Array.from({ length: 10 }, (_, j) => ({ label: `R${j}`, weight: 1 }));

/** A candidate of so many parameters and so large a Σ w r²; its residuals are beside the point here. */
function law(
  id: string,
  parameters: number,
  runSquares: number,
  more: Partial<FittedCandidate> = {},
): Candidate {
  return {
    status: "fitted",
    id,
    law: `v = ${id}`,
    parameters,
    runSquares,
    onRates: null,
    estimates: [],
    lackOfFit: null,
    extensions: [],
    ...more,
  };
}

const added = (to: string, tStatistic: number): ExtensionFact => ({
  law: `v = ${to}`,
  parameter: "β",
  at: 0,
  tStatistic,
  degreesOfFreedom: 7,
  coversNull: tStatistic < 2.36,
  excludes: tStatistic < 2.36 ? "β above 0.03" : null,
});

const misses = { fStatistic: 40, degreesOfFreedom: [3, 3] as const, pValue: 0.0005 };
const readingsOf = (candidates: readonly Candidate[], of = runs) =>
  Object.fromEntries(compareLaws({ runs: of, candidates }).laws.map((one) => [one.id, one.reading]));

describe("readings", () => {
  it("rules out by F and AICc together, and the first stands", () => {
    const comparison = compareLaws({ runs, candidates: [law("a", 2, 0.01), law("b", 2, 0.2)] });
    expect(comparison.laws.map((one) => one.reading)).toEqual(["standing", "ruled-out"]);
    expect(comparison.verdict).toEqual({ kind: "standing", id: "a" });
    const [first, second] = comparison.laws;
    expect(first?.pValue).toBeNull();
    // 10 ln(20) and (0.2 − 0.01)/(0.01/8).
    expect(second?.deltaAicc).toBeCloseTo(10 * Math.log(20), 10);
    expect(second?.fStatistic).toBeCloseTo(152, 10);
    expect(second?.sentence).toContain(
      "fits the runs worse than v = a (F = 152.0, p < 0.0001, AICc 30.0 higher)",
    );
  });

  it("does not rule out by AICc alone or by F alone", () => {
    // A lead of 8 in AICc with p = 0.02 in F: 5 runs left beside the parameters say too little.
    const few = runs.slice(0, 7);
    expect(readingsOf([law("a", 3, 0.01), law("b", 2, 0.04)], few).b).not.toBe("ruled-out");
    const many = Array.from({ length: 60 }, (_, j) => ({ label: `R${j}`, weight: 1 }));
    expect(readingsOf([law("a", 3, 1), law("b", 1, 1.15)], many).b).toBe("close");
  });

  it("a lead below 2 leaves it undecided between the two; a third far behind is close", () => {
    const comparison = compareLaws({
      runs,
      candidates: [law("a", 2, 0.01), law("b", 2, 0.0112), law("c", 2, 0.016)],
    });
    expect(comparison.laws.map((one) => one.reading)).toEqual(["undecided", "undecided", "close"]);
    expect(comparison.verdict).toEqual({ kind: "undecided", between: ["a", "b"] });
    expect(comparison.sentences[0]).toContain("Undecided between v = a and v = b");
  });

  it("an extension whose term covers its null is not needed, and the sentence says what size is excluded", () => {
    const comparison = compareLaws({
      runs,
      candidates: [law("a", 2, 0.01), law("a+β", 3, 0.009, { extensions: [added("a", 0.9)] })],
    });
    expect(comparison.laws.map((one) => one.reading)).toEqual(["standing", "not-needed"]);
    expect(comparison.laws[1]?.sentence).toContain("β above 0.03 is excluded");
  });

  it("an extension of a law that is itself ruled out is not called idle", () => {
    expect(
      readingsOf([
        law("a", 2, 0.01, { lackOfFit: misses }),
        law("a+β", 3, 0.009, { extensions: [added("a", 0.9)], lackOfFit: { ...misses, pValue: 0.4 } }),
      ]),
    ).toEqual({ a: "ruled-out", "a+β": "standing" });
  });

  it("a parameter that would have to be impossible rules its law out", () => {
    const value = { estimate: 0, standardError: 0.1, interval: [0, 0.1] as const, level: 0.95 };
    const comparison = compareLaws({
      runs,
      candidates: [
        law("a", 2, 0.01),
        law("b", 2, 0.0101, {
          estimates: [{ name: "β", value, atBound: true, impossible: true }],
        }),
      ],
    });
    expect(comparison.laws[1]?.reading).toBe("ruled-out");
    expect(comparison.laws[1]?.atBound).toEqual(["β"]);
    expect(comparison.laws[1]?.sentence).toContain("interval of β");
  });

  it("none is adequate when all miss their replicates", () => {
    const comparison = compareLaws({
      runs,
      candidates: [law("a", 2, 0.01, { lackOfFit: misses }), law("b", 2, 0.2, { lackOfFit: misses })],
    });
    expect(comparison.verdict).toEqual({ kind: "none-adequate" });
    expect(comparison.adequacy).toBe("tested");
    expect(comparison.flags).toEqual([]);
  });

  it("says that adequacy was not tested where no recipe was repeated", () => {
    const comparison = compareLaws({ runs, candidates: [law("a", 2, 0.01), law("b", 2, 0.2)] });
    expect(comparison.adequacy).toBe("not-tested");
    expect(comparison.flags.map((flag) => flag.code)).toEqual(["adequacy-not-tested"]);
    expect(comparison.sentences[1]).toContain("not tested");
  });

  it("too few runs: m ≤ K + 1", () => {
    const few = runs.slice(0, 5);
    const comparison = compareLaws({ runs: few, candidates: [law("a", 3, 0.01), law("b", 2, 0.02)] });
    expect(comparison.laws.map((one) => one.reading)).toEqual(["too-few-runs", "standing"]);
    expect(comparison.laws[0]?.sentence).toContain("5 runs are too few to compare a law of 3 parameters; 6");
    expect(compareLaws({ runs: few, candidates: [law("a", 3, 0.01)] }).verdict.kind).toBe("too-few-runs");
    expect(compareLaws({ runs: few, candidates: [] }).verdict.kind).toBe("nothing-to-compare");
  });

  it("a law that could not be fitted keeps its sentence and does not disturb the others", () => {
    const failed: Candidate = { status: "failed", id: "x", law: "v = x", message: "R1 has no P." };
    const comparison = compareLaws({ runs, candidates: [failed, law("a", 2, 0.01)] });
    expect(comparison.laws.map((one) => one.reading)).toEqual(["not-compared", "standing"]);
    expect(comparison.laws[0]?.sentence).toContain("R1 has no P.");
  });
});
