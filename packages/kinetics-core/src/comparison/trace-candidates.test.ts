import { describe, expect, it } from "vitest";
import { compareLaws, extensionByStandardError, traceCandidates, traceDisagreement } from "./index";

const runs = Array.from({ length: 8 }, (_, j) => ({ label: `R${j}`, weight: 1 }));
const levels = [0.9, -1.1, 0.4, -0.3, 1.2, -0.8, 0.2, -0.5].map((residual) => ({ residual, weight: 1 }));
const squaresOf = (betweenRuns: number, shape: number) =>
  ({ status: "determined", betweenRuns, shape, runs: levels }) as const;
const fit = (id: string, parameters: number, betweenRuns: number, shape: number) => ({
  id,
  law: `v = ${id}`,
  parameters,
  squares: squaresOf(betweenRuns, shape),
  estimates: [],
  extensions: [],
});

describe("laws fitted to traces", () => {
  it("are compared by their runs' ln k and by the shape they miss beyond the best, not by the readings", () => {
    const candidates = traceCandidates([fit("a", 2, 6, 400), fit("b", 2, 6, 480), fit("c", 2, 80, 402)], []);
    expect(candidates.map((one) => one.runSquares)).toEqual([6, 86, 82]);
    expect(compareLaws({ runs, candidates }).laws.map((one) => one.reading)).toEqual([
      "standing",
      "ruled-out",
      "ruled-out",
    ]);
    // A hundred times the readings and the same distances: the same verdict.
    const longer = traceCandidates([fit("a", 2, 6, 40_000), fit("b", 2, 6, 40_002)], []);
    expect(compareLaws({ runs, candidates: longer }).verdict.kind).toBe("standing");
  });

  it("have their replicates' lack of fit from the runs' own ln k", () => {
    const recipes = [[1], [1], [2], [2], [3], [3], [4], [4]];
    const [candidate] = traceCandidates([fit("a", 2, 6, 400)], recipes);
    expect(candidate?.lackOfFit?.degreesOfFreedom).toEqual([2, 4]);
    expect(traceCandidates([fit("a", 2, 6, 400)], [])[0]?.lackOfFit).toBeNull();
  });
});

describe("an added term of a fit of traces", () => {
  const term = { law: "v = k [A]", parameter: "β", at: 0, degreesOfFreedom: 6 };
  it("covers its null by t with m − r degrees of freedom, and tells what size is excluded", () => {
    const idle = extensionByStandardError({ ...term, estimate: 0.02, standardError: 0.01 });
    expect([idle?.tStatistic, idle?.coversNull]).toEqual([2, true]);
    // 0.02 + 2.447 · 0.01
    expect(idle?.excludes).toBe("β further from 0 than 0.04447");
    expect(extensionByStandardError({ ...term, estimate: 0.03, standardError: 0.01 })?.coversNull).toBe(
      false,
    );
    expect(extensionByStandardError({ ...term, estimate: 0.03, standardError: 0 })).toBeNull();
  });

  it("whose null is at infinity is judged by its reciprocal", () => {
    const end = { ...term, parameter: "K", at: Number.POSITIVE_INFINITY };
    const idle = extensionByStandardError({ ...end, estimate: 0.1, standardError: 0.05 });
    expect(idle?.coversNull).toBe(true);
    // 1/K = 10 ± 5: 10 + 2.447 · 5 = 22.23, and its reciprocal.
    expect(idle?.excludes).toBe("K below 0.04498");
  });
});

describe("rates against traces", () => {
  const value = (estimate: number, standardError: number) => ({
    estimate,
    standardError,
    interval: null,
    level: 0.95,
  });
  it("weakens from two standard uncertainties of the less certain on", () => {
    expect(traceDisagreement({ n_A: value(1, 0.05) }, { n_A: value(1.09, 0.01) })).toEqual([]);
    const [flag] = traceDisagreement({ n_A: value(1, 0.05) }, { n_A: value(1.11, 0.01) });
    expect([flag?.code, flag?.severity]).toEqual(["trace-fit-disagrees", "weakens"]);
    expect(flag?.message).toContain("2.2 standard uncertainties");
  });

  it("says nothing of what one of them does not know", () => {
    expect(traceDisagreement({ n_A: value(1, 0.01) }, {})).toEqual([]);
    expect(
      traceDisagreement({ n_A: value(1, 0.01) }, { n_A: { ...value(2, 0), standardError: null } }),
    ).toEqual([]);
  });
});
