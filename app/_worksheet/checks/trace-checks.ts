import { evaluateCurve, type InitialRateFound } from "kinetics-core/initial-rate";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import type { Check } from "../analysis";
import { completeExtent, rateScale, signalSpan } from "../assemble";
import { lawName } from "../law-name";
import { followedSpecies, lawSpecies, presentRuns } from "../present-runs";
import { percent } from "./check";
import type { Checked } from "./find-checks";

/**
 * What a trace says about its recipe and its clock: where it starts, how far it goes, what was missed before the first
 * reading, and whether one reagent is in such excess as its fit takes for granted.
 */
export function traceChecks({ sheet, runs, law }: Checked): readonly Check[] {
  const rows = new Map(presentRuns(sheet).map((run) => [run.id, run]));
  return runs.flatMap(({ runId, rate }): readonly Check[] => {
    const run = rows.get(runId);
    if (run === undefined || rate.kind !== "estimated") return [];
    const seen: Seen = {
      sheet,
      run,
      estimate: rate.initialRate,
      scatter: law.fit?.betweenRunStandardDeviation ?? 0,
    };
    const order = (name: string) => law.fit?.orders[name]?.estimate ?? null;
    return [startOf(seen), balanceOf(seen), littleConversion(seen), deadTime(seen), excess(seen, order)]
      .filter((found) => found !== null)
      .map(({ severity, code, message, ofSeveral }) => ({
        code,
        severity,
        station: "rates",
        runId,
        message: `${run.label}: ${message}`,
        settled: run.setAside === null ? null : `Set aside: ${run.setAside.reason}`,
        ...(ofSeveral === undefined ? {} : { ofSeveral }),
      }));
  });
}

interface Seen {
  readonly sheet: Sheet;
  readonly run: SheetRun;
  readonly estimate: InitialRateFound;
  /** Standard deviation of ln v between runs, τ. */
  readonly scatter: number;
}

interface Found {
  readonly severity: Check["severity"];
  readonly code: string;
  readonly message: string;
  readonly ofSeveral?: string;
}

/** Standard uncertainties between the start of a trace and what its recipe says. */
const START_WEAKENS = 3;
const START_BLOCKS = 10;

/**
 * Time zero: the curve read back to mixing, S(0), against what was mixed, blank + (ε·l)·c₀ of the followed species. A clock
 * that was started late shows as a product already there. 3 u weakens, 10 u blocks; it needs the signal of the blank.
 *
 * The end of a polynomial of degree d through n readings has the leverage (d + 1)²/n, so that u(S(0)) is about
 * σ(d + 1)/√n, n counted as independent readings, and the slope's error over the stretch that nobody saw comes on top.
 */
function startOf({ sheet, run, estimate }: Seen): Found | null {
  const { signal } = sheet;
  const followed = followedSpecies(sheet);
  if (signal?.kind !== "calibrated" || signal.blank === null || followed === null) return null;
  const mixed = run.concentrations[followed.id] ?? null;
  // A product or reactant whose starting concentration no column holds: only a product starts from none.
  if (mixed === null && followed.stoichiometricNumber < 0) return null;
  const molar = mixed?.molar ?? 0;
  const expected = signal.blank.value + signal.perMolar.value * molar;
  const read = evaluateCurve(estimate.curve, 0);
  const parameters = (estimate.degree ?? 2) + 1;
  const independent = Math.max(1, Math.min(estimate.points, estimate.effectivePoints));
  const unseen = Math.max(0, estimate.window[0] - run.timeZeroSeconds);
  const u = Math.hypot(
    (estimate.noise * parameters) / Math.sqrt(independent),
    estimate.standardError * unseen,
    signal.blank.standardUncertainty,
    signal.perMolar.standardUncertainty * molar,
    signal.perMolar.value * molar * (mixed?.relativeUncertainty ?? 0),
  );
  const off = Math.abs(read - expected);
  if (off <= START_WEAKENS * u) return null;
  const number = (value: number) => `${Number(value.toPrecision(3))} ${signal.unit}`.trim();
  return {
    severity: off > START_BLOCKS * u ? "blocks" : "weakens",
    code: "time-zero",
    message: `read back to mixing its signal is ${number(read)}, but its recipe and the blank make ${number(expected)} ± ${number(u)}. Check the time of mixing, the dead time and the blank.`,
  };
}

const BALANCE_UNCERTAINTIES = 3;
const BALANCE_PART = 0.05;
/** Readings of the end whose scatter its median carries. */
const END_READINGS = 5;

/**
 * Mass balance: the signal cannot change by more than ε·l·c₀·|ν_followed/ν_limiting|; with a signal at the end the two are
 * equal. Told where they differ by more than 5 % and by more than three standard uncertainties of both.
 */
function balanceOf({ sheet, run, estimate }: Seen): Found | null {
  const scale = rateScale(sheet);
  const span = signalSpan(sheet, run);
  if (scale.status !== "known" || span === null || estimate.reached === null) return null;
  const whole = run.endSignal;
  const part =
    whole === null ? estimate.reached : Math.abs(whole.value - evaluateCurve(estimate.curve, 0)) / span;
  const own = whole === null ? estimate.noise / Math.sqrt(END_READINGS) : whole.standardUncertainty;
  const u = Math.hypot(scale.sharedRelative * part, limitingRelative(sheet, run) * part, own / span);
  const off = part - 1;
  const far = (size: number) => size > BALANCE_PART && size > BALANCE_UNCERTAINTIES * u;
  if (far(off))
    return {
      severity: "weakens",
      code: "mass-balance",
      message: `its signal changes by ${percent(part)} of what its recipe allows. Check the calibration factor, the starting concentrations and what else absorbs or reacts.`,
    };
  if (whole !== null && far(-off))
    return {
      severity: "weakens",
      code: "mass-balance",
      message: `its signal at the end stands for ${percent(part)} of its limiting reactant. Check the calibration factor and the starting concentrations, or follow it to its end; an equilibrium stops short of it too.`,
    };
  return null;
}

/** Relative standard uncertainty of the concentration that limits the run. */
function limitingRelative(sheet: Sheet, run: SheetRun): number {
  const extent = completeExtent(sheet, run);
  const limiting = lawSpecies(sheet).find((species) => {
    const molar = run.concentrations[species.id]?.molar;
    return (
      molar !== undefined &&
      species.stoichiometricNumber < 0 &&
      molar / -species.stoichiometricNumber === extent
    );
  });
  return limiting === undefined ? 0 : (run.concentrations[limiting.id]?.relativeUncertainty ?? 0);
}

/** Below this the rate may be sound, but the trace does not say how it falls. Common practice. */
const LITTLE_CONVERSION = 0.05;

/** Too little conversion: a trace that hardly bends shows no order of its own and no slowing that a curve could be fitted to. */
function littleConversion({ estimate }: Seen): Found | null {
  const { reached } = estimate;
  if (reached === null || reached >= LITTLE_CONVERSION || reached < 0) return null;
  return {
    severity: "note",
    code: "little-conversion",
    message: `the whole trace ends at ${percent(reached)} conversion. Its rate at mixing stands, but its course shows no order; follow it for longer where that is wanted.`,
    ofSeveral: `their traces end below ${percent(LITTLE_CONVERSION)} conversion, so that their courses show no order.`,
  };
}

/** Of the rate, as the table of the dead time has it; past x = 0.2 the estimate's own flag blocks. */
const DEAD_TIME_PART = 0.02;

/**
 * Dead time: before the first reading that counts x_d = v₀·t_d/c₀ reacts, and a rate that is not read back to mixing is too low
 * by n·x_d, n being the order in what is used up, taken as 1. A straight line is not read back; all other estimators are.
 */
function deadTime({ sheet, run, estimate }: Seen): Found | null {
  const span = signalSpan(sheet, run);
  if (span === null) return null;
  const missed = (Math.abs(estimate.slope) * Math.max(0, estimate.window[0] - run.timeZeroSeconds)) / span;
  if (missed <= DEAD_TIME_PART || estimate.estimator !== "straight") return null;
  return {
    severity: "weakens",
    code: "dead-time-line",
    message: `${percent(missed)} reacts before its first reading, and a straight line does not read the rate back to mixing: it is too low by about as much. Let a curve be fitted, or start the window earlier.`,
  };
}

const EXCESS_PART = 0.02;
/** Under this ratio no correction of a pseudo-order holds. */
const LEAST_EXCESS = 3;

/**
 * Excess ratio: a single exponential takes every other reactant as constant. With r times as much of B as the run can use up,
 * [B] falls by x/r up to the conversion x, and the rate constant from the whole window is off by −n_B·x/(2r). Over 2 % or half the
 * scatter of the runs it weakens, at r under 3 it blocks. Fits of polynomials and of general order take nothing for constant.
 */
function excess(
  { sheet, run, estimate, scatter }: Seen,
  order: (name: string) => number | null,
): Found | null {
  const extent = completeExtent(sheet, run);
  if (estimate.estimator !== "exponential" || extent === null || estimate.conversion === null) return null;
  for (const species of lawSpecies(sheet)) {
    const molar = run.concentrations[species.id]?.molar;
    if (molar === undefined || species.stoichiometricNumber >= 0) continue;
    const ratio = molar / -species.stoichiometricNumber / extent;
    // The limiting reactant itself.
    if (ratio === 1) continue;
    const name = lawName(species);
    const bias = (Math.abs(order(name) ?? 1) * estimate.conversion) / (2 * ratio);
    const isTooLittle = ratio < LEAST_EXCESS && bias > EXCESS_PART;
    if (!isTooLittle && bias <= Math.max(EXCESS_PART, scatter / 2)) continue;
    return {
      severity: isTooLittle ? "blocks" : "weakens",
      code: "excess-ratio",
      message: `${name} is in ${Number(ratio.toPrecision(2))}-fold excess only, and an exponential that takes it as constant is off by ${percent(bias)}. Take more of it, or let a polynomial or a general order be fitted to a shorter window.`,
    };
  }
  return null;
}
