import { randomDraws } from "kinetics-core/random";
import { progressTo, simulateTrace } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import { chooseFromSurveys, chooseStudyRule } from "./choose-study-rule";
import { estimateInitialRate } from "./estimate-initial-rate";
import type { StudyTrace } from "./initial-rate";
import { surveyTrace, type TraceSurvey } from "./survey-trace";

function studyOf(
  conversions: number[],
  order: number,
  noise: number,
  readings = 120,
  seed = 17,
): StudyTrace[] {
  const deviate = randomDraws(seed).normal;
  return conversions.map((conversion, j) => ({
    label: `run ${j + 1}`,
    trace: simulateTrace(
      {
        order,
        progress: progressTo(conversion, order),
        readings,
        duration: 100,
        start: 0.1,
        span: 1,
        noise,
        autocorrelation: 0,
      },
      deviate,
    ),
    timeZero: 0,
    signalSpan: 1,
  }));
}

const conversions = [0.1, 0.2, 0.4, 0.6, 0.75, 0.85];

describe("the rule of a study", () => {
  const traces = studyOf(conversions, 2, 0.003);
  const choice = chooseStudyRule(traces);

  it("has the least criterion of all that were compared, and says so", () => {
    expect(choice?.rule).toEqual({
      conversionEnd: choice?.compared[0]?.conversionEnd,
      pair: choice?.compared[0]?.pair,
    });
    const criteria = choice?.compared.map(({ criterion }) => criterion) ?? [];
    expect(criteria).toEqual([...criteria].sort((a, b) => a - b));
    expect(choice?.compared.every(({ runs }) => runs === 6)).toBe(true);
    expect(choice?.reason).toMatch(/^A .+ checked by a .+, \d.* % of the rate, against .+\.$/);
  });

  it("pairs polynomials with ends up to 45 % and general orders with ends above", () => {
    for (const { conversionEnd, pair } of choice?.compared ?? []) {
      expect(pair === "exponential-general").toBe(conversionEnd > 0.45);
    }
  });

  it("follows its formula", () => {
    // 1/ΣU⁻² + 4(Σu⁻²δ/Σu⁻²)² from the estimates that runs give under the rule, line→quadratic to 12 %.
    const rule = { conversionEnd: 0.12, pair: "line-quadratic" } as const;
    let reported = 0;
    let weights = 0;
    let biases = 0;
    for (const { trace } of traces) {
      const upper = estimateInitialRate(trace, { signalSpan: 1, rule });
      const lower = estimateInitialRate(trace, { signalSpan: 1, rule, estimator: "straight" });
      if (upper.status !== "found" || lower.status !== "found") throw new Error("no estimate");
      const weight = (upper.slope / lower.standardError) ** 2;
      reported += (upper.slope / upper.standardError) ** 2;
      weights += weight;
      biases += (weight * (lower.slope - upper.slope)) / upper.slope;
    }
    const expected = 1 / reported + 4 * (biases / weights) ** 2;
    const compared = choice?.compared.find(
      ({ conversionEnd, pair }) => conversionEnd === rule.conversionEnd && pair === rule.pair,
    );
    expect(Number(compared?.criterion) / expected).toBeCloseTo(1, 9);
  });

  it("is what surveys kept from earlier give", () => {
    const kept = JSON.parse(JSON.stringify(traces.map(surveyTrace)));
    expect(chooseFromSurveys(kept)).toEqual(choice);
  });

  it("keeps to short windows where the signal is clean and to long ones where it is noisy", () => {
    const ends = [1e-5, 1e-3, 0.02].map((noise) => {
      const polynomial = chooseStudyRule(studyOf(conversions, 2, noise))?.compared.filter(
        ({ pair }) => pair === "line-quadratic",
      );
      return Number(polynomial?.[0]?.conversionEnd);
    });
    expect(ends).toEqual([...ends].sort((a, b) => a - b));
    expect(Number(ends[2])).toBeGreaterThan(Number(ends[0]));
  });

  it("never takes a general order that the traces contradict", () => {
    const lagging = studyOf([0.8, 0.85, 0.9], 1, 1e-4).map((study) => {
      const { time, signal } = study.trace;
      const bent = Array.from(signal, (s, i) => s + 0.05 * Math.sin(Number(time[i]) / 8));
      return { ...study, trace: { time, signal: bent } };
    });
    const choice = chooseStudyRule(lagging);
    expect(choice?.compared.some(({ pair }) => pair === "exponential-general")).toBe(false);
    expect(choice?.compared.length).toBeGreaterThan(0);
  });

  it("judges a rule by what the reported member knows, not by a lower one that happens to agree with it", () => {
    const lucky = { conversionEnd: 0.3, pair: "cubic-quartic" } as const;
    const solid = { conversionEnd: 0.7, pair: "exponential-general" } as const;
    const survey = (label: string): TraceSurvey => ({
      label,
      rules: [
        {
          ...lucky,
          lowerSlope: 1,
          lowerStandardError: 0.02,
          upperSlope: 1.001,
          upperStandardError: 0.3,
          lackOfFit: null,
        },
        {
          ...solid,
          lowerSlope: 1,
          lowerStandardError: 0.03,
          upperSlope: 1.02,
          upperStandardError: 0.04,
          lackOfFit: null,
        },
      ],
    });
    expect(chooseFromSurveys(["a", "b", "c"].map(survey))?.rule).toEqual(solid);
  });

  it("is the same with a run that stands still, which can follow no exponential and carries no weight", () => {
    const short = studyOf([0.5, 0.6, 0.7, 0.75, 0.8], 1, 0.004, 20);
    const [still] = studyOf([1e-9], 1, 0.004, 20);
    if (!still) throw new Error("a run was simulated");
    const without = chooseStudyRule(short);
    expect(without?.compared.some(({ pair }) => pair === "exponential-general")).toBe(true);
    const withStill = chooseStudyRule([...short, { ...still, label: "still" }]);
    expect(withStill?.rule).toEqual(without?.rule);
    expect(withStill?.compared.every(({ runs }) => runs === short.length)).toBe(true);
    const alone = chooseStudyRule([still]);
    expect(alone === null || alone.compared[0]?.runs === 1).toBe(true);
  });

  it("leaves out runs without a span and runs too short to choose on", () => {
    const [first, second, third] = studyOf([0.3, 0.4, 0.5], 1, 0.002);
    if (!first || !second || !third) throw new Error("three runs were simulated");
    const short = {
      ...third,
      trace: { time: [0, 1, 2, 3, 4, 5], signal: [0, 0.1, 0.2, 0.28, 0.35, 0.41] },
    };
    expect(chooseStudyRule([first, { ...second, signalSpan: null }, short])?.compared[0]?.runs).toBe(1);
    expect(chooseStudyRule([{ ...second, signalSpan: null }, short])).toBeNull();
    expect(chooseStudyRule([])).toBeNull();
  });
});
