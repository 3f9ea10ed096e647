import { evaluateCurve, type InitialRate, type InitialRateFound } from "kinetics-core/initial-rate";
import { printNumber, printUncertain } from "kinetics-core/quantities";
import type { MarkedRun, WindowFigureView } from "@/app/_figures/figure-view";
import type { PrintedNumber } from "@/app/_ui/law-view";
import { judgesNoise } from "@/app/_worksheet/judges-noise";
import type { TraceScale } from "./trace-scale";

/** A trace as it is drawn, thinned where it is long. Seconds are those of the stored readings, to the last bit. */
export interface ShownTrace {
  readonly run: MarkedRun;
  readonly seconds: readonly number[];
  /** In the shown unit. */
  readonly signal: readonly number[];
  readonly timeZeroSeconds: number;
  /** Place of each shown reading in the stored trace, from 0. */
  readonly places: readonly number[];
  /** Shown readings, by their index here, that are not fitted: in the dead time or outside the part that counts. */
  readonly outside: readonly number[];
  /** Shown readings, by their index here, that are marked as spikes. */
  readonly spikes: readonly number[];
  /** Part of the trace that counts, first and last second of it. */
  readonly counts: readonly [number, number];
}

/** One estimate on its trace, whether on record or a preview while a handle moves: the same function makes both. */
export interface EstimateView {
  readonly figure: WindowFigureView;
  /** Null where the trace gives no rate; `refusal` then says why. */
  readonly rate: PrintedNumber | null;
  readonly refusal: string | null;
  /** Rate of reaction in the shown unit at full precision; null where there is none. */
  readonly exactRate: number | null;
  readonly facts: readonly { readonly name: string; readonly text: string }[];
  readonly sources: readonly { readonly source: string; readonly share: number }[];
  /** "1.6 %": all sources together, of the rate. */
  readonly combined: string | null;
}

/** Points of the fitted curve that are drawn. */
const CURVE_POINTS = 60;

export function estimateView(trace: ShownTrace, scale: TraceScale, estimate: InitialRate): EstimateView {
  const axes = { x: { quantity: "time", unit: scale.timeUnit }, y: scale.signal };
  const time = trace.seconds.map((at) => at / scale.secondsPerTime);
  const bare = {
    run: trace.run,
    ...axes,
    time,
    signal: trace.signal,
    timeZero: trace.timeZeroSeconds / scale.secondsPerTime,
    outside: trace.outside,
    spikes: trace.spikes,
    counts: [trace.counts[0] / scale.secondsPerTime, trace.counts[1] / scale.secondsPerTime] as const,
    leastPoints: LEAST_POINTS,
  };
  if (estimate.status !== "found") {
    const ends = [time[0] ?? 0, time.at(-1) ?? 0] as const;
    return {
      figure: { ...bare, window: ends, curve: null, slope: null, residuals: null, note: "", noteDetail: "" },
      rate: null,
      refusal: estimate.message,
      exactRate: null,
      facts: [],
      sources: [],
      combined: null,
    };
  }
  const rate = shownRate(scale, estimate);
  return {
    figure: {
      ...bare,
      window: [estimate.window[0] / scale.secondsPerTime, estimate.window[1] / scale.secondsPerTime],
      curve: curveOf(trace, scale, estimate),
      slope: {
        x: trace.timeZeroSeconds / scale.secondsPerTime,
        y: evaluateCurve(estimate.curve, 0) * scale.signalFactor,
        slope: estimate.slope * scale.signalFactor * scale.secondsPerTime,
      },
      residuals: residualsOf(trace, scale, estimate),
      note: rate === null ? "" : `*v*_0 = ${inWords(rate)} ${scale.rateUnit}`,
      noteDetail: "slope at mixing, standard uncertainty",
    },
    rate,
    refusal: rate === null ? "The set-up does not yet say how a slope becomes a rate of reaction." : null,
    exactRate: scale.rateFactor === null ? null : estimate.slope * scale.rateFactor,
    facts: factsOf(scale, estimate),
    ...sourcesOf(scale, estimate),
  };
}

/** Fewer readings than a quadratic with two to spare carry no rate. */
const LEAST_POINTS = 5;

function shownRate(scale: TraceScale, estimate: InitialRateFound): PrintedNumber | null {
  if (scale.rateFactor === null) return null;
  return printUncertain(
    estimate.slope * scale.rateFactor,
    Math.abs(estimate.standardError * scale.rateFactor),
  );
}

/** "1.182 ± 0.018", "(2.86 ± 0.07) × 10^-5". */
export function inWords({ value, uncertainty, power }: PrintedNumber): string {
  const pair = uncertainty === null ? value : `${value} ± ${uncertainty}`;
  if (power === 0) return pair;
  return `${uncertainty === null ? pair : `(${pair})`} × 10^${power}`;
}

function curveOf(trace: ShownTrace, scale: TraceScale, estimate: InitialRateFound) {
  const [from, to] = estimate.window;
  const seconds = Array.from(
    { length: CURVE_POINTS + 1 },
    (_, index) => from + ((to - from) * index) / CURVE_POINTS,
  );
  return {
    x: seconds.map((at) => at / scale.secondsPerTime),
    y: seconds.map((at) => evaluateCurve(estimate.curve, at - trace.timeZeroSeconds) * scale.signalFactor),
  };
}

function residualsOf(trace: ShownTrace, scale: TraceScale, estimate: InitialRateFound) {
  const [from, to] = estimate.window;
  const x: number[] = [];
  const y: number[] = [];
  const notFitted = new Set([...trace.outside, ...trace.spikes]);
  for (const [index, seconds] of trace.seconds.entries()) {
    if (seconds < from || seconds > to || notFitted.has(index)) continue;
    const fitted = evaluateCurve(estimate.curve, seconds - trace.timeZeroSeconds);
    x.push(seconds / scale.secondsPerTime);
    y.push((trace.signal[index] ?? 0) - fitted * scale.signalFactor);
  }
  return { x, y };
}

function factsOf(scale: TraceScale, estimate: InitialRateFound) {
  const at = (seconds: number) =>
    `${Number((seconds / scale.secondsPerTime).toPrecision(4))} ${scale.timeUnit}`;
  const conversion =
    estimate.conversion === null ? "" : `, ${(estimate.conversion * 100).toFixed(0)} % conversion`;
  const noise = printUncertain(estimate.noise * scale.signalFactor, estimate.noise * scale.signalFactor);
  return [
    { name: "From", text: at(estimate.window[0]) },
    { name: "To", text: `${at(estimate.window[1])}${conversion}` },
    { name: "Points", text: String(estimate.points) },
    { name: "Fit", text: fitInWords(estimate) },
    { name: "Scatter", text: `${inWords({ ...noise, uncertainty: null })} ${scale.signal.unit}`.trim() },
    {
      name: "Noise",
      text: judgesNoise(estimate)
        ? `*ρ* ${estimate.autocorrelation.toFixed(2)}, ${Math.round(estimate.effectivePoints)} independent readings`
        : "too few readings to judge it",
    },
  ];
}

const DEGREES = ["", "straight line", "second degree", "third degree", "fourth degree"] as const;

export function fitInWords({ estimator, degree }: Pick<InitialRateFound, "estimator" | "degree">): string {
  if (estimator === "exponential") return "exponential, slope at mixing";
  if (estimator === "integrated") return "integrated law of general order, slope at mixing";
  const name = DEGREES[degree ?? 1] ?? `degree ${degree}`;
  return degree === 1 || degree === null ? name : `${name}, slope at mixing`;
}

/** Shares of u²: what the fit leaves open, and what all rates share. */
function sourcesOf(
  scale: TraceScale,
  estimate: InitialRateFound,
): Pick<EstimateView, "sources" | "combined"> {
  if (estimate.slope === 0 || scale.rateFactor === null) return { sources: [], combined: null };
  const own = (estimate.standardError / estimate.slope) ** 2;
  const shared = scale.sharedRelative ** 2;
  const total = own + shared;
  if (total === 0) return { sources: [], combined: null };
  return {
    sources: [
      { source: "Fit inside the window", share: own / total },
      ...(shared === 0 ? [] : [{ source: "Calibration factor, shared by all runs", share: shared / total }]),
    ],
    combined: `${printNumber(Math.sqrt(total) * 100, 2)} %`,
  };
}
