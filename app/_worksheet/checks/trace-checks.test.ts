import { estimateInitialRate, type InitialRateOptions } from "kinetics-core/initial-rate";
import { randomDraws } from "kinetics-core/random";
import { describe, expect, test } from "vitest";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import type { Check, RunAnalysis } from "../analysis";
import { rateOfReaction, rateOptions } from "../run-rate";
import { blockChecks } from "./block-checks";
import { traceChecks } from "./trace-checks";

/** P grows to 50 µmol L⁻¹ with 0.02 s⁻¹, at ε·l of 18 000 L mol⁻¹ and σ of 0.001: a height of 0.9 over a blank of 0.1. */
const seconds = Array.from({ length: 200 }, (_, i) => i);
const { normal } = randomDraws(11);
const ripple = seconds.map(() => 0.001 * normal());
const curve = (height: number, start = 0.1, last = 200) => ({
  time: seconds.slice(0, last),
  signal: seconds.slice(0, last).map((t, i) => start + height * (1 - Math.exp(-0.02 * t)) + (ripple[i] ?? 0)),
});

const recipe = { A: 5e-5, B: 2e-3 };

function signalOf(sheet: Sheet, blank: { value: number; standardUncertainty: number } | null): Sheet {
  return sheet.signal?.kind === "calibrated" ? { ...sheet, signal: { ...sheet.signal, blank } } : sheet;
}

function found(
  trace: ReturnType<typeof curve>,
  {
    run = {},
    molar = recipe,
    blank = null,
    options = {},
  }: {
    run?: Partial<SheetRun>;
    molar?: typeof recipe;
    blank?: { value: number; standardUncertainty: number } | null;
    options?: InitialRateOptions;
  } = {},
): readonly Check[] {
  const row = exampleRun(0, molar, run);
  const sheet = signalOf(exampleSheet({ runs: [row] }), blank);
  const rate = rateOfReaction(
    sheet,
    row,
    estimateInitialRate(trace, { ...rateOptions(sheet, row, null), ...options }),
  );
  const analysed: RunAnalysis = {
    runId: row.id,
    label: row.label,
    state: "standing",
    rate,
    mark: { series: "base", level: 0, levels: 1, repeat: false },
  };
  return traceChecks({
    sheet,
    rule: null,
    runs: [analysed],
    carrying: [],
    law: { status: "no-law", missing: "", fit: null },
  });
}

const codes = (checks: readonly Check[]) => checks.map((check) => check.code);

describe("what a trace says about its recipe and its clock", () => {
  test("is nothing where it starts at the blank and ends at ε·l·c₀", () => {
    expect(found(curve(0.9), { blank: { value: 0.1, standardUncertainty: 0.002 } })).toEqual([]);
    expect(found(curve(0.9))).toEqual([]);
  });

  test("a start off the blank weakens from 3 u and blocks from 10 u, and needs a blank", () => {
    const blank = { value: 0.1, standardUncertainty: 0.002 };
    const start = (off: number) => found(curve(0.9, 0.1 + off), { blank })[0];
    expect(start(0.004)).toBeUndefined();
    expect(start(0.012)).toMatchObject({ code: "time-zero", severity: "weakens" });
    expect(start(0.03)).toMatchObject({ code: "time-zero", severity: "blocks" });
    expect(start(0.03)?.message).toMatch(
      /^R01: read back to mixing its signal is 0\.1\d+, but .* make 0\.1 ± 0\.0\d+/,
    );
    expect(codes(found(curve(0.9, 0.13)))).toEqual([]);
  });

  test("a clock that runs late shows at the blank", () => {
    // Mixed ten seconds before what the clock says: 0.9·(1 − e^−0.2) = 0.163 is there already.
    const late = curve(0.9);
    const trace = { time: late.time.slice(10), signal: late.signal.slice(10) };
    const checks = found(trace, {
      blank: { value: 0.1, standardUncertainty: 0.002 },
      run: { timeZeroSeconds: 10 },
    });
    expect(codes(checks)).toContain("time-zero");
  });

  test("a change beyond ε·l·c₀ breaks the mass balance, less is a matter of time unless the end was read", () => {
    expect(found(curve(1.3))).toMatchObject([{ code: "mass-balance", severity: "weakens" }]);
    expect(found(curve(1.3))[0]?.message).toContain("of what its recipe allows");
    expect(codes(found(curve(0.93)))).toEqual([]);
    expect(codes(found(curve(0.6)))).toEqual([]);
    const endSignal = { value: 0.7, standardUncertainty: 0.005 };
    const short = found(curve(0.6), { run: { endSignal } });
    expect(short).toMatchObject([{ code: "mass-balance" }]);
    expect(short[0]?.message).toContain("its signal at the end stands for 67 %");
    expect(codes(found(curve(0.9), { run: { endSignal: { ...endSignal, value: 1 } } }))).toEqual([]);
  });

  test("a trace that hardly bends is noted", () => {
    expect(found(curve(0.9, 0.1, 100), { molar: { A: 5e-3, B: 5e-3 } })).toMatchObject([
      { code: "little-conversion", severity: "note" },
    ]);
  });

  test("a line behind a dead time is too low by what reacted meanwhile; a tangent is read back", () => {
    const whole = curve(0.9);
    const behind = { time: whole.time.slice(4, 40), signal: whole.signal.slice(4, 40) };
    const window = [4, 39] as const;
    const line = found(behind, { options: { estimator: "straight", window } });
    expect(line).toMatchObject([{ code: "dead-time-line", severity: "weakens" }]);
    expect(codes(found(behind, { options: { estimator: "tangent", window } }))).toEqual([]);
  });

  test("an exponential wants its other reactant in excess", () => {
    const fitted = (B: number) =>
      found(curve(0.9), { molar: { A: 5e-5, B }, options: { estimator: "exponential", window: [0, 199] } });
    expect(fitted(5e-3)).toEqual([]);
    expect(fitted(5e-4)).toMatchObject([{ code: "excess-ratio", severity: "weakens" }]);
    // x = 0.98 and r = 2: the bias is 0.98/4 = 25 %.
    expect(fitted(1e-4)).toMatchObject([{ code: "excess-ratio", severity: "blocks" }]);
    expect(fitted(1e-4)[0]?.message).toMatch(/B is in 2-fold excess only, .* off by 2[45] %/);
    expect(codes(found(curve(0.9), { molar: { A: 5e-5, B: 1e-4 } }))).toEqual([]);
  });
});

describe("blocks", () => {
  const check = (blocks: readonly (string | null)[]) =>
    blockChecks({
      sheet: exampleSheet(),
      rule: null,
      runs: [],
      carrying: blocks.map((block, index) => ({
        run: exampleRun(index, recipe, { block }),
        rate: { kind: "entered", molarPerSecond: 1e-6, standardError: null },
      })),
      law: { status: "no-law", missing: "", fit: null },
    });

  test("are named with their runs; where only some are named, that weakens", () => {
    expect(check([null, null])).toEqual([]);
    expect(check(["Monday", "Monday"])).toEqual([]);
    expect(check(["Monday", "Tuesday", "Monday"])).toMatchObject([
      { severity: "note", message: "The runs come from 2 blocks: Monday (2), Tuesday (1)." },
    ]);
    expect(check(["Monday", null])).toMatchObject([{ severity: "weakens", code: "blocks-differ" }]);
  });
});
