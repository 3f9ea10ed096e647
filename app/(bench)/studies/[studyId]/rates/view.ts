import type { InitialRate, InitialRateOptions, SlopeAtEnd, TraceCounts } from "kinetics-core/initial-rate";
import { printNumber, printUncertain } from "kinetics-core/quantities";
import type { DependenceView } from "@/app/_figures/figure-view";
import type { PrintedNumber } from "@/app/_ui/law-view";
import type { Check, RunAnalysis, StudyAnalysis } from "@/app/_worksheet/analysis";
import { concentrationDisplay, rateDisplay } from "@/app/_worksheet/display-units";
import { lawName } from "@/app/_worksheet/law-name";
import { lawSpecies } from "@/app/_worksheet/present-runs";
import { columnOf, type PrintedColumn } from "@/app/_worksheet/printed-column";
import { rateOptions } from "@/app/_worksheet/run-rate";
import { traceCounts } from "@/app/_worksheet/trace-counts";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import { fitInWords, inWords, type ShownTrace } from "./estimate-view";
import { marksOf, type StoredTrace, shownTrace, type TraceMarksView } from "./shown-trace";
import { type TraceScale, traceScale } from "./trace-scale";

/** Plain props of the Rates station: every run's rate, and one run's trace with how its rate came about. */

export interface RatesView {
  readonly rateUnit: string;
  /** Power of ten that the column head carries. */
  readonly ratePower: number;
  readonly rates: PrintedColumn;
  readonly runs: readonly RateRow[];
  /** Sentence about the rule that all windows follow; null without a rule. */
  readonly rule: RuleView | null;
}

export interface RateRow {
  readonly runId: string;
  readonly label: string;
  readonly mark: RunAnalysis["mark"];
  readonly state: RunAnalysis["state"];
  readonly rate: { readonly value: string; readonly uncertainty: string | null } | null;
  readonly origin: "trace" | "by hand" | "entered" | "none";
}

export interface RuleView {
  readonly sentence: string;
  readonly reason: string;
}

export interface RunRateView {
  readonly runId: string;
  readonly label: string;
  /** "Base recipe, [A] 50.0 µmol L^-1, [B] 2.00 mmol L^-1"; prose. */
  readonly recipe: string;
  readonly byHand: boolean;
  readonly setAside: string | null;
  /** Null for a run without a trace. */
  readonly trace: TraceOfRun | null;
  readonly entered: PrintedNumber | null;
  readonly reason: string | null;
  readonly estimators: readonly EstimatorRow[];
  readonly dependence: DependenceView | null;
  /** "Windows that end anywhere from 6 s to 16 s give rates from 1.13 to 1.18."; null where not swept. */
  readonly dependenceInWords: string | null;
  readonly checks: readonly Check[];
  readonly previous: string | null;
  readonly next: string | null;
  /** What the run says of its trace, as it stands in boxes; null for a run without a trace, which has no clock. */
  readonly marks: TraceMarksView | null;
  readonly timeScale: Pick<TraceScale, "timeUnit" | "secondsPerTime">;
}

/** What the browser needs to draw the record, and to preview another window with the same function. */
export interface TraceOfRun {
  readonly sha256: string;
  readonly shown: ShownTrace;
  readonly scale: TraceScale;
  readonly estimate: InitialRate;
  /** Which readings are fitted. */
  readonly counts: TraceCounts;
  /** As the server estimates, but for the window. */
  readonly options: Omit<InitialRateOptions, "window">;
}

export interface EstimatorRow {
  readonly name: string;
  readonly window: string;
  readonly rate: PrintedNumber;
  readonly reported: boolean;
}

export function ratesView(sheet: Sheet, analysis: StudyAnalysis): RatesView {
  const display = rateDisplay(sheet);
  const numbers = analysis.runs.map(({ rate }) =>
    rate.kind === "none"
      ? null
      : {
          value: rate.molarPerSecond * display.factor,
          uncertainty: rate.standardError === null ? null : rate.standardError * display.factor,
        },
  );
  const { power, printed, column } = columnOf(numbers);
  return {
    rateUnit: display.unit,
    ratePower: power,
    rates: column,
    runs: analysis.runs.map((run, index) => ({
      runId: run.runId,
      label: run.label,
      mark: run.mark,
      state: run.state,
      rate: printed[index] ?? null,
      origin: originOf(run),
    })),
    rule: ruleView(analysis),
  };
}

function originOf({ rate }: RunAnalysis): RateRow["origin"] {
  if (rate.kind !== "estimated") return rate.kind;
  return rate.byHand ? "by hand" : "trace";
}

function ruleView({ rule }: StudyAnalysis): RuleView | null {
  if (rule === null) return null;
  const [lower, upper] = PAIR_WORDS[rule.rule.pair];
  return {
    sentence: `Every run is read to ${Math.round(rule.rule.conversionEnd * 100)} % conversion by a ${upper}, with a ${lower} to judge its bias.`,
    reason: rule.reason,
  };
}

const PAIR_WORDS = {
  "line-quadratic": ["straight line", "second-degree polynomial"],
  "quadratic-cubic": ["second-degree polynomial", "third-degree polynomial"],
  "cubic-quartic": ["third-degree polynomial", "fourth-degree polynomial"],
  "exponential-general": ["single exponential", "general-order integrated law"],
} as const;

/**
 * The run that the address names by its label; where it names none, the first standing one, else the first. Null
 * where there is no such run: another one in its place would be taken for it.
 */
export function selectRun(analysis: StudyAnalysis, label: string | undefined): RunAnalysis | null {
  if (label !== undefined) return analysis.runs.find((run) => run.label === label) ?? null;
  return analysis.runs.find((run) => run.state === "standing") ?? analysis.runs[0] ?? null;
}

export function runRateView(
  sheet: Sheet,
  analysis: StudyAnalysis,
  selected: RunAnalysis,
  stored: StoredTrace | null,
  sweep: readonly SlopeAtEnd[],
): RunRateView {
  const row = sheet.runs.find((run) => run.id === selected.runId);
  const scale = traceScale(sheet);
  const { rate } = selected;
  const at = analysis.runs.indexOf(selected);
  const estimate: InitialRate | null = rate.kind === "estimated" ? rate.initialRate : null;
  const shown = stored === null || row === undefined ? null : shownTrace(selected, row, scale, stored);
  const display = rateDisplay(sheet);
  return {
    runId: selected.runId,
    label: selected.label,
    recipe: recipeInWords(sheet, selected, row),
    byHand: row !== undefined && row.window !== null,
    setAside: row?.setAside?.reason ?? null,
    trace:
      shown === null || row === undefined || row.trace === null || estimate === null
        ? null
        : {
            sha256: row.trace.sha256,
            shown,
            scale,
            estimate,
            counts: traceCounts(row),
            options: rateOptions(sheet, { ...row, window: null }, analysis.rule?.rule ?? null),
          },
    entered:
      rate.kind === "entered"
        ? printUncertain(
            rate.molarPerSecond * display.factor,
            rate.standardError === null ? null : rate.standardError * display.factor,
          )
        : null,
    reason: rate.kind === "none" ? rate.reason : null,
    estimators: estimatorRows(scale, estimate),
    ...dependenceOf(scale, estimate, sweep),
    checks: analysis.checks.filter((check) => check.runId === selected.runId),
    previous: analysis.runs[at - 1]?.label ?? null,
    next: analysis.runs[at + 1]?.label ?? null,
    marks: row === undefined || stored === null ? null : marksOf(row, scale, stored),
    timeScale: { timeUnit: scale.timeUnit, secondsPerTime: scale.secondsPerTime },
  };
}

function recipeInWords(sheet: Sheet, { mark }: RunAnalysis, row: SheetRun | undefined): string {
  const amounts = lawSpecies(sheet).flatMap((species) => {
    const molar = row?.concentrations[species.id]?.molar;
    if (molar === undefined) return [];
    const display = concentrationDisplay(species.unit);
    return [`[${lawName(species)}] ${printNumber(molar * display.factor, 3)} ${display.unit}`];
  });
  return [mark.series === "base" ? (mark.repeat ? "Base recipe again" : "Base recipe") : "", ...amounts]
    .filter((part) => part !== "")
    .join(", ");
}

function estimatorRows(scale: TraceScale, estimate: InitialRate | null): readonly EstimatorRow[] {
  const { rateFactor } = scale;
  if (estimate === null || estimate.status !== "found" || rateFactor === null) return [];
  const row = (
    one: Pick<typeof estimate, "estimator" | "degree" | "window" | "slope" | "standardError">,
  ) => ({
    name: fitInWords(one).replace(", slope at mixing", ""),
    window: one.window.map((at) => Number((at / scale.secondsPerTime).toPrecision(3))).join(" to "),
    rate: printUncertain(one.slope * rateFactor, Math.abs(one.standardError * rateFactor)),
  });
  return [
    { ...row(estimate), reported: true },
    ...estimate.alternatives.map((one) => ({ ...row(one), reported: false })),
  ];
}

/** Standard error, as a part of the reported slope, up to which a window is drawn. */
const TELLING_PART = 0.25;

function dependenceOf(
  scale: TraceScale,
  estimate: InitialRate | null,
  sweep: readonly SlopeAtEnd[],
): Pick<RunRateView, "dependence" | "dependenceInWords"> {
  const { rateFactor } = scale;
  if (estimate === null || estimate.status !== "found" || rateFactor === null)
    return { dependence: null, dependenceInWords: null };
  // Windows too short to say anything would flatten the rest of the figure.
  const telling = sweep.filter((one) => one.standardError <= TELLING_PART * Math.abs(estimate.slope));
  const points = telling.map(({ end, slope, standardError }) => {
    const y = slope * rateFactor;
    const error = Math.abs(standardError * rateFactor);
    return { x: end / scale.secondsPerTime, y, low: y - error, high: y + error };
  });
  if (points.length < 2) return { dependence: null, dependenceInWords: null };
  const chosen = {
    x: estimate.window[1] / scale.secondsPerTime,
    y: estimate.slope * rateFactor,
  };
  return {
    dependence: {
      x: { quantity: "window end", unit: scale.timeUnit },
      y: { quantity: "initial rate", unit: scale.rateUnit },
      points,
      chosen,
    },
    dependenceInWords: spreadInWords(scale, points, chosen.x),
  };
}

/** Over windows from about half to twice the chosen length: what a person might have picked instead. */
function spreadInWords(
  scale: TraceScale,
  points: readonly { readonly x: number; readonly y: number; readonly low: number }[],
  chosen: number,
): string | null {
  const near = points.filter((point) => point.x >= chosen / 2 && point.x <= chosen * 2);
  const first = near[0];
  const last = near.at(-1);
  if (first === undefined || last === undefined || near.length < 2) return null;
  const rates = near.map((point) => point.y);
  const spread = Math.max(...rates) - Math.min(...rates);
  const print = (value: number) => inWords({ ...printUncertain(value, spread || null), uncertainty: null });
  const time = (value: number) => `${Number(value.toPrecision(2))} ${scale.timeUnit}`;
  return `Windows that end anywhere from ${time(first.x)} to ${time(last.x)} give rates from ${print(
    Math.min(...rates),
  )} to ${print(Math.max(...rates))}.`;
}
