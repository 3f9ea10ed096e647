import { describe, expect, it } from "vitest";
import { integratedLawComputation, runComputation } from "../registry";
import { integratedLawResponse } from "./schema";

/** SO₂Cl₂ → SO₂ + Cl₂, OpenStax Chemistry 2e, section 12.4: first order, k = 2.2 × 10⁻⁵ s⁻¹. */
const SULFURYL_CHLORIDE = {
  time: [0, 5000, 10000, 15000, 25000, 30000, 40000],
  signal: [0.1, 0.0896, 0.0802, 0.0719, 0.0577, 0.0517, 0.0415],
};

const compute = (body: unknown) => runComputation(integratedLawComputation, body);

function answerTo(body: unknown) {
  const computed = compute(body);
  if (!computed.ok) throw new Error(JSON.stringify(computed.errors));
  return computed.answer;
}

function faultsOf(body: unknown) {
  const computed = compute(body);
  return computed.ok ? [] : computed.errors;
}

describe("integrated-law", () => {
  it("answers in its own described shape, without loss on the way through JSON", () => {
    for (const order of [0, 1, "free"]) {
      for (const endSignal of [
        { kind: "zero" },
        { kind: "free" },
        { kind: "known", value: 0, standardUncertainty: 1e-4 },
      ]) {
        const answer = answerTo({ ...SULFURYL_CHLORIDE, order, endSignal });
        expect(integratedLawResponse.parse(answer)).toEqual(answer);
        expect(JSON.parse(JSON.stringify(answer))).toEqual(answer);
      }
    }
  });

  it("finds the published constant, with its unit in the words that were given", () => {
    const request = { ...SULFURYL_CHLORIDE, order: 1, endSignal: { kind: "zero" } };
    const { rateConstant, halfLife, order } = answerTo(request);
    expect(rateConstant.estimate).toBeCloseTo(2.2e-5, 6);
    expect(rateConstant.unit).toBe("time^-1");
    expect(halfLife.estimate).toBeCloseTo(Math.LN2 / (rateConstant.estimate ?? 1), 6);
    expect(order).toEqual({ estimate: 1, standardError: null, interval: null, level: 0.95 });
    const second = answerTo({ ...request, order: 2, signalUnit: "mol/L", timeUnit: "s" });
    expect(second.rateConstant.unit).toBe("L mol^-1 s^-1");
  });

  it("takes an end signal that is not given as free, and flags it", () => {
    const { flags, endSignal } = answerTo({ ...SULFURYL_CHLORIDE, order: 1 });
    expect(flags).toContainEqual(expect.objectContaining({ code: "end-signal-free", severity: "weakens" }));
    expect(endSignal.standardError).toBeGreaterThan(0);
  });

  it("says nothing where two readings leave nothing to judge by", () => {
    const answer = answerTo({
      time: [0, 1000],
      signal: [0.0028, 0.0015],
      order: 0,
      endSignal: { kind: "zero" },
    });
    expect(answer.rateConstant.estimate).toBeCloseTo(1.3e-6, 15);
    expect(answer.rateConstant).toMatchObject({ standardError: null, interval: null });
    expect(answer.residualStandardDeviation).toBeNull();
    expect(answer.aicc).toBeNull();
    expect(answer.flags).toContainEqual(expect.objectContaining({ code: "few-points", severity: "blocks" }));
  });

  it.each([
    ["order", { ...SULFURYL_CHLORIDE }],
    ["order", { ...SULFURYL_CHLORIDE, order: 9 }],
    ["endSignal.kind", { ...SULFURYL_CHLORIDE, order: 1, endSignal: { kind: "guessed" } }],
    [
      "endSignal.standardUncertainty",
      { ...SULFURYL_CHLORIDE, order: 1, endSignal: { kind: "known", value: 0 } },
    ],
    [
      "endSignal.standardUncertainty",
      { ...SULFURYL_CHLORIDE, order: 1, endSignal: { kind: "known", value: 0, standardUncertainty: -1 } },
    ],
    ["signal", { time: [0, 1, 2], signal: [1, 0.5], order: 1 }],
    ["signal.1", { time: [0, 1, 2], signal: [1, null, 0.3], order: 1 }],
    ["signal", { time: [0, 1, 2, 3], signal: [1, 1, 1, 1], order: 1 }],
    ["time", { time: [0, 2, 1, 3], signal: [1, 0.7, 0.5, 0.3], order: 1 }],
    ["time", { time: [0, 1], signal: [1, 0.7], order: 1 }],
    ["time", { time: [], signal: [], order: 1 }],
  ])("refuses at %s: %j", (path, body) => {
    expect(faultsOf(body).map((fault) => fault.path)).toContain(path);
  });
});
