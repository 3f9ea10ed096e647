import { estimateInitialRate } from "kinetics-core/initial-rate";
import { describe, expect, test } from "vitest";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { estimateView, inWords, type ShownTrace } from "./estimate-view";
import { traceScale } from "./trace-scale";
import { ratesView, runRateView, selectRun } from "./view";

/** First-order growth of P at 0.02 s⁻¹ from 50 µmol L⁻¹ with a ripple in place of noise, absorbance at 18 000 L mol⁻¹. */
const seconds = Array.from({ length: 120 }, (_, i) => i * 0.5);
const signal = seconds.map(
  (time, i) => 0.9 * (1 - Math.exp(-0.02 * time)) + 3e-4 * Math.sin(12.9898 * i * i),
);
const run = {
  label: "R01",
  mark: { series: "base", level: 0, levels: 1, repeat: false },
  setAside: false,
} as const;
const trace: ShownTrace = {
  run,
  seconds,
  signal,
  timeZeroSeconds: 0,
  places: seconds.map((_, index) => index),
  outside: [],
  spikes: [],
  counts: [0, 59.5],
};
const estimate = estimateInitialRate({ time: seconds, signal }, { signalSpan: 0.9 });

function sheetIn(timeUnit: "s" | "min") {
  const sheet = exampleSheet();
  return {
    ...sheet,
    study: { ...sheet.study, timeUnit },
    species: sheet.species.map((one) => (one.id === "P" ? { ...one, unit: "umol/L" as const } : one)),
  };
}

describe("an estimate on its trace", () => {
  test("prints the rate of reaction in the shown units, 1 µmol L⁻¹ s⁻¹ being 60 a minute", () => {
    const perSecond = estimateView(trace, traceScale(sheetIn("s")), estimate);
    const perMinute = estimateView(trace, traceScale(sheetIn("min")), estimate);
    // v = 0.02 s⁻¹ × 50 µmol L⁻¹
    expect(perSecond.exactRate).toBeCloseTo(1, 1);
    expect(perMinute.exactRate).toBeCloseTo(60 * (perSecond.exactRate ?? 0), 9);
    expect(perSecond.figure.note).toMatch(/^\*v\*_0 = \d\.\d+ ± 0\.0\d+ µmol L\^-1 s\^-1$/);
    expect(perMinute.figure.x.unit).toBe("min");
    expect(perMinute.figure.window[1]).toBeCloseTo((perSecond.figure.window[1] ?? 0) / 60, 12);
  });

  test("has a residual for every reading inside the window and none outside", () => {
    const { figure } = estimateView(trace, traceScale(sheetIn("s")), estimate);
    const inside = seconds.filter((time) => time >= figure.window[0] && time <= figure.window[1]);
    expect(figure.residuals?.x).toEqual(inside);
    expect(Math.max(...(figure.residuals?.y ?? []).map(Math.abs))).toBeLessThan(1.2e-3);
  });

  test("has no residual for a reading that is not fitted", () => {
    const { figure } = estimateView(
      { ...trace, outside: [0, 1], spikes: [4] },
      traceScale(sheetIn("s")),
      estimate,
    );
    const all = estimateView(trace, traceScale(sheetIn("s")), estimate).figure.residuals?.x ?? [];
    expect(figure.residuals?.x).toEqual(all.filter((time) => ![0, 0.5, 2].includes(time)));
    expect(figure).toMatchObject({ outside: [0, 1], spikes: [4] });
  });

  test("shares out its uncertainty between the fit and the calibration", () => {
    const { sources, combined } = estimateView(trace, traceScale(sheetIn("s")), estimate);
    expect(sources.map((one) => one.source)).toEqual([
      "Fit inside the window",
      "Calibration factor, shared by all runs",
    ]);
    expect(sources.reduce((sum, one) => sum + one.share, 0)).toBeCloseTo(1, 12);
    expect(combined).toMatch(/^\d\.\d %$/);
  });

  test("does not count the independent readings of a trace that is too sparse to hold two", () => {
    // Twelve readings without noise over three half-lives: what is left of them beside a polynomial is all curve.
    const time = Array.from({ length: 12 }, (_, index) => 10 * index);
    const signal = time.map((at) => 0.9 * (1 - Math.exp(-0.02 * at)));
    const sparse = estimateInitialRate({ time, signal }, { signalSpan: 0.9 });
    const view = estimateView({ ...trace, seconds: time, signal }, traceScale(sheetIn("s")), sparse);
    expect(view.facts.find((fact) => fact.name === "Noise")?.text).toBe("too few readings to judge it");
    const dense = estimateView(trace, traceScale(sheetIn("s")), estimate);
    expect(dense.facts.find((fact) => fact.name === "Noise")?.text).toMatch(/\d+ independent readings$/);
  });

  test("says why there is none, and draws the bare trace", () => {
    const none = estimateInitialRate({ time: [0, 1, 2], signal: [0, 1, 2] }, {});
    const view = estimateView(
      { ...trace, seconds: [0, 1, 2], signal: [0, 1, 2] },
      traceScale(sheetIn("s")),
      none,
    );
    expect(view.rate).toBeNull();
    expect(view.refusal).toContain("readings");
    expect(view.figure).toMatchObject({ window: [0, 2], curve: null, residuals: null });
  });

  test("is worded with its power of ten in brackets only where there is something to bracket", () => {
    expect(inWords({ value: "2.86", uncertainty: "0.07", power: -5 })).toBe("(2.86 ± 0.07) × 10^-5");
    expect(inWords({ value: "2.86", uncertainty: null, power: -5 })).toBe("2.86 × 10^-5");
    expect(inWords({ value: "11.8", uncertainty: "0.3", power: 0 })).toBe("11.8 ± 0.3");
  });
});

describe("the list of rates", () => {
  const aside = { reason: "bubble", memberId: "m", at: "2026-01-05T10:00:00.000Z" };
  const sheet = {
    ...sheetIn("s"),
    runs: [exampleRun(0, { A: 5e-5, B: 2e-3 }, { setAside: aside }), exampleRun(1, { A: 5e-5, B: 2e-3 })],
  };
  const analysis = {
    hash: "",
    rule: null,
    law: { status: "no-law", missing: "", fit: null },
    checks: [],
    runs: sheet.runs.map((one, index) => ({
      runId: one.id,
      label: one.label,
      state: index === 0 ? ("set-aside" as const) : ("standing" as const),
      rate: { kind: "entered" as const, molarPerSecond: 1.2e-6 / (index + 1), standardError: 2e-8 },
      mark: run.mark,
    })),
  } as const;

  test("aligns its column and starts at the first standing run", () => {
    const view = ratesView(sheet, analysis);
    expect(view.runs.map((row) => row.rate)).toEqual([
      { value: "1.200", uncertainty: "0.020", power: 0 },
      { value: "0.600", uncertainty: "0.020", power: 0 },
    ]);
    expect(view.rates).toEqual({ integerDigits: 1, fractionDigits: 3 });
    expect(selectRun(analysis, undefined)?.label).toBe("R02");
    expect(selectRun(analysis, "R01")?.label).toBe("R01");
    expect(selectRun(analysis, "R99")).toBeNull();
  });

  test("shows what is not fitted, and every spike of a long trace", () => {
    const [first] = analysis.runs;
    if (first === undefined) throw new Error("there is a first run");
    const many = 20_000;
    const stored = {
      timeSeconds: Float64Array.from({ length: many }, (_, i) => i * 0.01),
      signal: Float64Array.from({ length: many }, (_, i) => i * 1e-5 + 1e-6 * Math.sin(i)),
    };
    const row = {
      ...exampleRun(0, { A: 5e-5, B: 2e-3 }),
      trace: { sha256: "0".repeat(64), points: many, uploadId: null, column: "" },
      deadTimeSeconds: 2,
      trim: { fromSeconds: 0, toSeconds: 190 },
      spikes: [7777, 12_345],
    };
    const rate = { kind: "estimated" as const, molarPerSecond: 1, standardError: 1, byHand: false };
    if (estimate.status !== "found") throw new Error(estimate.message);
    const { trace: drawn, marks } = runRateView(
      { ...sheet, runs: [row] },
      analysis,
      { ...first, rate: { ...rate, initialRate: estimate } },
      stored,
      [],
    );
    const shown = drawn?.shown;
    if (shown === undefined) throw new Error("the trace is drawn");
    expect(shown.places.length).toBeLessThan(5000);
    expect(shown.spikes.map((index) => shown.places[index])).toEqual([7777, 12_345]);
    const outside = new Set(shown.outside);
    expect(shown.seconds.filter((_, index) => outside.has(index))).toEqual(
      shown.seconds.filter((at) => at < 2 || at > 190),
    );
    expect(marks).toMatchObject({ deadTime: "2", from: "0", to: "190", end: "", ends: [0, 199.99] });
    expect(marks?.spikes[0]).toMatchObject({ place: 7777, time: "77.77" });
  });

  test("says of an entered rate what it is, with its neighbours and its recipe", () => {
    const [first] = analysis.runs;
    if (first === undefined) throw new Error("there is a first run");
    const view = runRateView(sheet, analysis, first, null, []);
    expect(view).toMatchObject({ trace: null, previous: null, next: "R02", setAside: "bubble" });
    expect(view.recipe).toBe("Base recipe, [A] 0.0500 mmol L^-1, [B] 2.00 mmol L^-1");
    expect(view.entered).toMatchObject({ value: "1.200", uncertainty: "0.020" });
  });
});
