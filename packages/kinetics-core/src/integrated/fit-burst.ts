import { fSurvival } from "kinetics-core/distributions";
import { exponentialOf, numberInWords } from "kinetics-core/quantities";
import { decayRatio, decayRatioSlope } from "kinetics-core/smooth-ratios";
import type { BurstFit, BurstInput, BurstResult } from "./burst";
import { BURST_LEVEL, LEAST_BURST_READINGS, LEAST_PHASE_DECAYS, READINGS_IN_PHASE } from "./constants";
import { type CourseLaw, rateParameter } from "./course-law";
import { freeOrderLaw } from "./course-laws";
import { type CourseFit, effectiveDeviation, fitCourse, type Gradient } from "./fit-course";
import { estimateQuantity } from "./quantity";
import { type ScaledReadings, scaledReadings } from "./scaled-reading";

/** Steady and first slope of a trace with a burst or a lag, or the named reason why none is seen. Never throws on data. */
export function fitBurst(input: BurstInput): BurstResult {
  const { timeZero = 0, level = 0.95 } = input;
  if (!(level > 0 && level < 1))
    throw new RangeError(`A confidence level lies between 0 and 1, got ${level}`);
  const scaled = scaledReadings(input, timeZero, { kind: "free" }, LEAST_BURST_READINGS);
  if (scaled.status !== "scaled") return scaled;
  const fit = fitCourse(burstLaw(), scaled.trace, { kind: "free" });
  if (fit.status !== "fitted") return fit;
  return objectionTo(fit, scaled) ?? reportOf(fit, scaled, level);
}

/** S = S₀ + v_s·τ + D·(1 − e^(−λτ))/λ, linear in S₀, v_s and D; D is v_0 − v_s at the first reading. θ: [ln λ]. */
function burstLaw(): CourseLaw {
  return {
    name: "burst",
    parameters: [rateParameter("phase")],
    species: 2,
    evaluate(time, [logRate = Number.NaN], [steady, phase], [byRate]) {
      const [steadyByRate, phaseByRate] = byRate ?? [];
      if (!steady || !phase || !steadyByRate || !phaseByRate)
        throw new RangeError("A burst has two parts and their derivatives");
      const rate = Math.exp(logRate);
      for (let i = 0; i < time.length; i++) {
        const t = time[i] ?? Number.NaN;
        steady[i] = t;
        phase[i] = t * decayRatio(rate * t);
        steadyByRate[i] = 0;
        phaseByRate[i] = rate * t * t * decayRatioSlope(rate * t);
      }
      return true;
    },
  };
}

type Objection = Extract<BurstResult, { status: "no-phase" }>;

function objectionTo(fit: CourseFit, scaled: ScaledReadings): Objection | null {
  const { trace } = scaled;
  const no = (code: Objection["code"], message: string): Objection => ({ status: "no-phase", code, message });
  const { residualSquares } = fit.found;
  const variance = effectiveDeviation(fit.noise) ** 2;
  const line = fitCourse(lineLaw(), trace, { kind: "free" });
  const gain =
    line.status === "fitted" ? (line.found.residualSquares - residualSquares) / variance : Infinity;
  if (fSurvival(Math.max(gain / 2, 0), 2, fit.noise.degreesOfFreedom) > BURST_LEVEL)
    return no(
      "straight",
      "A straight line describes these readings as well, so no burst and no lag is seen.",
    );
  const rate = Math.exp(fit.found.theta[0] ?? Number.NaN);
  if (rate < LEAST_PHASE_DECAYS)
    return no(
      "not-over",
      "The first phase lasts to the end of the trace, so that no steady rate is seen; follow the run for longer.",
    );
  const within = trace.time.reduce((count, time) => count + (time < 1 / rate ? 1 : 0), 0);
  if (within < READINGS_IN_PHASE)
    return no(
      "not-resolved",
      `The first phase is over within ${within} ${within === 1 ? "reading" : "readings"}, too few to tell its rate; read faster, or start later and take the steady rate alone.`,
    );
  const ordinary = fitCourse(freeOrderLaw(), trace, { kind: "free" });
  const asGood =
    ordinary.status === "fitted" &&
    (ordinary.found.theta[1] ?? Number.NaN) >= 0 &&
    fSurvival(
      Math.max((ordinary.found.residualSquares - residualSquares) / variance, 0),
      1,
      fit.noise.degreesOfFreedom,
    ) > BURST_LEVEL;
  return asGood
    ? no(
        "depletion",
        "An ordinary course that slows down towards its end describes these readings as well, so that no burst is shown.",
      )
    : null;
}

/** S = S₀ + v·τ, with nothing to search for: the one rate is held. */
function lineLaw(): CourseLaw {
  return {
    name: "line",
    parameters: [{ ...rateParameter("none"), bounds: [0, 0], starts: [0] }],
    species: 1,
    evaluate(time, _, [part], derivatives) {
      part?.set(time);
      derivatives[0]?.[0]?.fill(0);
      return true;
    },
  };
}

function reportOf(fit: CourseFit, scaled: ScaledReadings, level: number): BurstFit {
  const { duration, range, firstTime, firstSignal, trace } = scaled;
  const { theta, problem } = fit.found;
  const rate = Math.exp(theta[0] ?? Number.NaN);
  const [steady = Number.NaN, excess = Number.NaN] = problem.linear.scales;
  const slope = range / duration;
  // Back from the first reading to mixing, where the phase was stronger by e^(λt₁).
  const before = rate * (firstTime / duration);
  const stronger = Math.exp(before);
  const reach = (firstTime / duration) * decayRatio(-before);
  const freedom = fit.noise.degreesOfFreedom;
  const estimate = (value: number, gradient: Gradient) => estimateQuantity(fit, { value, gradient }, level);
  const logRate = estimate((theta[0] ?? Number.NaN) - Math.log(duration), { theta: [1], scales: [], end: 0 });
  const kind =
    Math.abs(steady + excess) > Math.abs(steady) && (steady + excess) * steady >= 0 ? "burst" : "lag";
  const first = firstTime / duration;
  return {
    status: "found",
    kind,
    steadyRate: estimate(slope * steady, { theta: [], scales: [slope], end: 0 }),
    rateAtMixing: estimate(slope * (steady + excess * stronger), {
      theta: [slope * excess * stronger * before],
      scales: [slope, slope * stronger],
      end: 0,
    }),
    phaseRateConstant: exponentialOf(logRate),
    initialSignal: estimate(firstSignal + range * (problem.linear.end - steady * first - excess * reach), {
      theta: [-range * excess * first * (stronger - decayRatio(-before))],
      scales: [-range * first, -range * reach],
      end: range,
    }),
    amplitude: estimate((range * excess * stronger) / rate, {
      theta: [(range * excess * stronger * (before - 1)) / rate],
      scales: [0, (range * stronger) / rate],
      end: 0,
    }),
    residualStandardDeviation: fit.noise.standardDeviation * range,
    degreesOfFreedom: freedom,
    autocorrelation: fit.noise.autocorrelation,
    points: trace.time.length,
    flags: [
      {
        code: kind,
        severity: "weakens",
        message:
          `The trace begins with a ${kind} of about ${numberInWords(duration / rate)} in time; its initial rate is the steady one ` +
          "after it, and a tangent at mixing is not.",
      },
    ],
  };
}
