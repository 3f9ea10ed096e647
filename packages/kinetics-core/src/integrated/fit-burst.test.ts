import { randomDraws } from "kinetics-core/random";
import { progressTo, simulateTrace } from "kinetics-core/simulation";
import { describe, expect, it } from "vitest";
import type { BurstFit } from "./burst";
import { fitBurst } from "./fit-burst";
import { fitIntegratedLaw } from "./fit-integrated-law";
import { phaseFlag } from "./phase-flag";

interface Truth {
  readonly steady: number;
  readonly atMixing: number;
  readonly phase: number;
  readonly firstTime: number;
}

/** S = 0.1 + v_s·t + (v_0 − v_s)(1 − e^(−λt))/λ over a hundred units of time. */
function burstTrace(
  { steady, atMixing, phase, firstTime }: Truth,
  readings: number,
  error: () => number,
  duration = 100,
) {
  const time = Array.from({ length: readings }, (_, i) => firstTime + (i * duration) / (readings - 1));
  const signal = time.map(
    (t) => 0.1 + steady * t + ((atMixing - steady) * -Math.expm1(-phase * t)) / phase + error(),
  );
  return { time, signal };
}

function found(result: ReturnType<typeof fitBurst>): BurstFit {
  if (result.status !== "found") throw new Error(`expected a burst, got ${result.status}: ${result.message}`);
  return result;
}

const BURST: Truth = { steady: 0.01, atMixing: 0.05, phase: 0.2, firstTime: 0 };
const LAG: Truth = { steady: -0.01, atMixing: 0, phase: 0.15, firstTime: 2 };

describe("a burst or a lag", () => {
  it.each([
    ["burst", BURST],
    ["lag", LAG],
  ] as const)("without noise gives its truth back: %s", (kind, truth) => {
    const fit = found(fitBurst(burstTrace(truth, 50, () => 0)));
    expect(fit.kind).toBe(kind);
    expect(fit.steadyRate.estimate).toBeCloseTo(truth.steady, 12);
    expect(fit.rateAtMixing.estimate).toBeCloseTo(truth.atMixing, 11);
    expect(fit.phaseRateConstant.estimate).toBeCloseTo(truth.phase, 10);
    expect(fit.initialSignal.estimate).toBeCloseTo(0.1, 11);
    expect(fit.amplitude.estimate).toBeCloseTo((truth.atMixing - truth.steady) / truth.phase, 10);
    expect(fit.flags).toContainEqual(expect.objectContaining({ code: kind, severity: "weakens" }));
  });

  it("covers its truth", () => {
    const draws = randomDraws(11);
    let [covered, counted] = [0, 0];
    for (let replicate = 0; replicate < 12; replicate++) {
      for (const truth of [BURST, LAG]) {
        const fit = found(fitBurst(burstTrace(truth, 60, () => 0.004 * draws.normal())));
        const pairs = [
          [fit.steadyRate, truth.steady],
          [fit.rateAtMixing, truth.atMixing],
          [fit.phaseRateConstant, truth.phase],
          [fit.initialSignal, 0.1],
        ] as const;
        for (const [{ interval }, value] of pairs) {
          counted++;
          if (interval !== null && interval[0] <= value && value <= interval[1]) covered++;
        }
      }
    }
    expect(covered / counted).toBeGreaterThan(0.9);
  });

  it("is named in the flags of an integrated law that it spoils", () => {
    const draws = randomDraws(3);
    const trace = burstTrace(BURST, 80, () => 0.004 * draws.normal());
    const law = fitIntegratedLaw({ ...trace, order: 0 });
    if (law.status !== "fitted") throw new Error(law.message);
    expect(law.flags.map(({ code }) => code)).toEqual(expect.arrayContaining(["lack-of-fit", "burst"]));
    const misfit = law.flags.find(({ code }) => code === "lack-of-fit");
    expect(misfit?.message).toContain("that this order does not describe; look");
  });
});

describe("the flag of a long trace", () => {
  it("names its burst, and nothing where there is none", () => {
    const draws = randomDraws(15);
    const error = () => 0.01 * draws.normal();
    expect(phaseFlag(burstTrace(BURST, 5003, error))).toMatchObject({ code: "burst", severity: "weakens" });
    expect(phaseFlag(burstTrace({ ...BURST, atMixing: 0.01 }, 5003, error))).toBeNull();
    expect(phaseFlag({ time: [0, 1], signal: [1] })).toBeNull();
  });
});

describe("no burst is reported where", () => {
  const noise = randomDraws(5);
  const error = () => 0.004 * noise.normal();

  it.each([
    ["the trace is straight", "straight", burstTrace({ ...BURST, atMixing: 0.01 }, 60, error)],
    ["the phase outlasts the trace", "not-over", burstTrace({ ...BURST, phase: 0.01 }, 60, error)],
    ["the phase is over at once", "not-resolved", burstTrace({ ...BURST, atMixing: 5, phase: 5 }, 60, error)],
  ] as const)("%s", (_, code, trace) => {
    const result = fitBurst(trace);
    expect(result).toMatchObject({ status: "no-phase", code, message: expect.stringMatching(/\.$/) });
  });

  it("an ordinary course slows down", () => {
    for (const order of [0, 1, 2]) {
      for (const conversion of [0.3, 0.6, 0.95]) {
        const course = { order, progress: progressTo(conversion, order), readings: 60, duration: 100 };
        const trace = simulateTrace(
          { ...course, start: 0.6, span: -0.6, noise: 0.003, autocorrelation: 0 },
          noise.normal,
        );
        expect(fitBurst(trace).status).toBe("no-phase");
      }
    }
  });

  it("the readings are too few or not in order", () => {
    expect(fitBurst({ time: [0, 1, 2], signal: [0, 1, 2] })).toMatchObject({
      status: "too-few-points",
      needed: 8,
    });
    const { time, signal } = burstTrace(BURST, 20, () => 0);
    expect(fitBurst({ time: time.toReversed(), signal })).toMatchObject({
      status: "unusable",
      code: "not-increasing",
    });
  });
});
