import { type Estimate, printNumber, printUncertain } from "kinetics-core/quantities";
import type { RateLawFit } from "kinetics-core/rate-law";
import type { MarkedRun, ResidualView } from "@/app/_figures/figure-view";
import type { LawView, PrintedNumber } from "@/app/_ui/law-view";
import type { Check, StudyAnalysis } from "@/app/_worksheet/analysis";
import { type DisplayScale, rateConstantDisplay, rateDisplay } from "@/app/_worksheet/display-units";
import { ASSUMED_ACTIVATION_ENERGY, activationEnergyOf } from "@/app/_worksheet/law-input";
import { presentRuns } from "@/app/_worksheet/present-runs";
import { printSimpleOrder } from "@/app/_worksheet/print-order";
import { type NamedOrder, standingConstant, standingOrders } from "@/app/_worksheet/standing-constant";
import { lawExpression, printEstimate } from "@/app/_worksheet/standing-law.view";
import { isMixed } from "@/db/sheet/mixed-run";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { type AddedVariableFigureView, addedVariableViews } from "./added-variable.view";
import { orderInWords } from "./order-words";
import { type VerdictView, verdictOf } from "./verdict.view";

/** Plain props of the Rate law station; made from the analysis alone, whoever reads it. */
export interface RateLawView {
  readonly verdict: VerdictView;
  readonly law: LawView | null;
  readonly orders: readonly OrderView[];
  readonly orderNote: string;
  readonly constants: readonly ConstantRow[];
  readonly budget: BudgetView | null;
  readonly figures: readonly AddedVariableFigureView[];
  readonly pairs: readonly PairRow[];
  /** What the runs cannot tell apart, in words. */
  readonly undetermined: readonly string[];
  readonly residuals: ResidualView | null;
  readonly residualNote: string;
  readonly influence: InfluenceView | null;
  readonly checks: readonly Check[];
}

export interface OrderView {
  readonly speciesId: string;
  readonly name: string;
  readonly text: string;
  readonly estimate: number | null;
  readonly interval: readonly [number, number] | null;
  readonly heldAt: number | null;
  /** "settled: 1", "consistent with 1", "held at 1". */
  readonly reading: string;
}

export interface ConstantRow {
  readonly name: string;
  readonly number: PrintedNumber;
  readonly unit: string;
  /** "11.5 to 12.1", asymmetric; null where none can be given. */
  readonly interval: string | null;
  readonly standing: boolean;
}

export interface BudgetView {
  readonly of: string;
  readonly unit: string;
  readonly rows: readonly { readonly source: string; readonly half: string; readonly share: string }[];
  readonly total: string;
  /** What a line rests on that the study does not say. */
  readonly note: string;
}

export interface PairRow {
  readonly runs: readonly [MarkedRun, MarkedRun];
  readonly species: string;
  readonly order: string;
}

export interface InfluenceView {
  readonly quantity: string;
  readonly unit: string;
  readonly rows: readonly { readonly run: MarkedRun; readonly value: string; readonly shift: string }[];
}

export function rateLawView(sheet: Sheet, analysis: StudyAnalysis): RateLawView {
  const { law } = analysis;
  const { fit } = law;
  const verdict = verdictOf(sheet, analysis);
  const checks = analysis.checks.filter((check) => check.station === "rate-law");
  if (fit === null)
    return {
      verdict,
      law: null,
      orders: [],
      orderNote: "",
      constants: [],
      budget: null,
      figures: [],
      pairs: [],
      undetermined: [],
      residuals: null,
      residualNote: "",
      influence: null,
      checks,
    };
  const orders = standingOrders(sheet, fit);
  return {
    verdict,
    law: law.status === "law" ? lawExpression(sheet, fit) : null,
    orders: orders.map((one) => orderView(fit, one)),
    orderNote: orderNote(fit),
    constants: law.status === "law" ? constantRows(sheet, fit, orders) : [],
    budget: law.status === "law" ? budgetView(sheet, fit) : null,
    figures: addedVariableViews(sheet, analysis, fit),
    pairs: pairRows(analysis, fit),
    undetermined: fit.undetermined.map((one) => one.message),
    residuals: residualView(analysis, fit),
    residualNote: residualNote(fit),
    influence: law.status === "law" ? influenceView(sheet, analysis, fit) : null,
    checks,
  };
}

function orderView(fit: RateLawFit, { speciesId, name, heldAt }: NamedOrder): OrderView {
  const estimate = fit.orders[name];
  return {
    speciesId,
    name,
    text: heldAt === null ? orderInWords(fit, name, 2) : `${printSimpleOrder(heldAt) ?? heldAt}`,
    estimate: estimate?.estimate ?? null,
    interval: heldAt === null ? (estimate?.interval ?? null) : null,
    heldAt,
    reading: readingInWords(fit, name, heldAt),
  };
}

function readingInWords(fit: RateLawFit, name: string, heldAt: number | null): string {
  if (heldAt !== null) return "held by hand";
  const simple = fit.simpleOrders.orders[name];
  const printed = simple === undefined ? "" : (printSimpleOrder(simple) ?? String(simple));
  switch (fit.simpleOrders.reading[name]) {
    case "is":
      return `settled: ${printed}`;
    case "consistent":
      return `consistent with ${printed}`;
    case "nearest":
      return `nearest simple order ${printed}`;
    default:
      return "undetermined";
  }
}

function orderNote(fit: RateLawFit): string {
  const readings = Object.values(fit.simpleOrders.reading);
  if (readings.includes("consistent") || readings.includes("nearest"))
    return "An order is settled when its interval covers one simple order, excludes every other and is at most ±0.25 wide. Until then the law carries the free order.";
  return "An interval that covers one simple order, excludes every other and is at most ±0.25 wide settles that order.";
}

function constantRows(sheet: Sheet, fit: RateLawFit, orders: readonly NamedOrder[]): readonly ConstantRow[] {
  const standing = standingConstant(sheet, fit).kind;
  const rows: ConstantRow[] = [];
  const simple = orders.map((one) => one.heldAt ?? fit.simpleOrders.orders[one.name] ?? null);
  const overall = simple.reduce<number | null>(
    (sum, order) => (sum === null || order === null ? null : sum + order),
    0,
  );
  if (overall !== null) {
    const estimate = orders.every((one) => one.heldAt !== null)
      ? fit.rateConstant
      : fit.simpleOrders.rateConstant;
    rows.push(
      constantRow(
        "*k*, simple orders",
        estimate,
        rateConstantDisplay(sheet, overall),
        standing === "rate-constant",
      ),
    );
  }
  if (orders.some((one) => one.heldAt === null)) {
    const free = orders.reduce((sum, one) => sum + (fit.orders[one.name]?.estimate ?? 0), 0);
    rows.push(constantRow("*k*, free orders", fit.rateConstant, rateConstantDisplay(sheet, free), false));
  }
  rows.push(
    constantRow("rate at the centre", fit.centre.rate, rateDisplay(sheet), standing === "rate-at-centre"),
  );
  return rows;
}

function constantRow(
  name: string,
  estimate: Estimate,
  display: DisplayScale,
  standing: boolean,
): ConstantRow {
  const number = printEstimate(estimate, display, 2);
  return {
    name,
    number: isLopsided(estimate) ? { ...number, uncertainty: null } : number,
    unit: display.unit,
    interval: intervalText(estimate, display),
    standing,
  };
}

/** Upper arm over lower arm beyond which half the width beside the value would name ends that the interval has not. */
const LOPSIDED = 1.5;

function isLopsided({ estimate, interval }: Estimate): boolean {
  if (estimate === null || interval === null) return false;
  return interval[1] - estimate > LOPSIDED * (estimate - interval[0]);
}

function intervalText({ estimate, interval }: Estimate, display: DisplayScale): string | null {
  if (estimate === null || interval === null) return null;
  const half = ((interval[1] - interval[0]) / 2) * display.factor;
  const { power } = printUncertain(estimate * display.factor, half);
  const ends = interval.map((end) => printUncertain(end * display.factor, half, { power }).value);
  return power === 0 ? ends.join(" to ") : `(${ends.join(" to ")}) × 10^${power}`;
}

/** Contributions to u², as half-widths of the interval; in quadrature they make the interval's own. */
function budgetView(sheet: Sheet, fit: RateLawFit): BudgetView | null {
  const constant = standingConstant(sheet, fit);
  const { estimate, interval } = constant.estimate;
  const total = constant.budget.reduce((sum, one) => sum + one.relative ** 2, 0);
  if (estimate === null || interval === null || total === 0) return null;
  const display =
    constant.kind === "rate-constant"
      ? rateConstantDisplay(sheet, constant.overallOrder)
      : rateDisplay(sheet);
  const half = ((interval[1] - interval[0]) / 2) * display.factor;
  const print = (value: number) => printUncertain(value, half, { digits: 2, power: 0 }).value;
  return {
    of: constant.kind === "rate-constant" ? "*k*" : "the rate at the centre",
    unit: display.unit,
    rows: constant.budget
      .filter((one) => one.relative > 0)
      .sort((a, b) => b.relative - a.relative)
      .map((one) => ({
        source: one.source,
        half: print(half * Math.sqrt(one.relative ** 2 / total)),
        share: ((100 * one.relative ** 2) / total).toFixed(0),
      })),
    total: print(half),
    note: [
      ...(constant.budget.some((one) => one.source === TEMPERATURE_LINE && one.relative > 0)
        ? [
            sheet.conditions.activationEnergy === null
              ? `Temperature counts at ${ASSUMED_ACTIVATION_ENERGY / 1000} kJ mol^-1, assumed until the set-up names the activation energy.`
              : `Temperature counts at the activation energy of the set-up, ${Number((activationEnergyOf(sheet) / 1000).toPrecision(4))} kJ mol^-1.`,
          ]
        : []),
      ...(presentRuns(sheet).some(isMixed) ? [] : [STOCKS_NOT_COUNTED]),
    ].join(" "),
  };
}

/** As the library names the line. */
const TEMPERATURE_LINE = "Temperature";

/** Concentrations typed run by run: what is wrong with a stock is wrong with all of them, and moves k unseen. */
const STOCKS_NOT_COUNTED =
  "An error that the runs share through a stock is not on the sheet and not counted here.";

function pairRows(analysis: StudyAnalysis, fit: RateLawFit): readonly PairRow[] {
  return fit.pairs.flatMap((pair) => {
    const [first, second] = pair.runs.map((label) => markedRun(analysis, label));
    if (first === undefined || second === undefined || pair.order.estimate === null) return [];
    const printed = printUncertain(pair.order.estimate, pair.order.standardError, { digits: 2, power: 0 });
    return [
      {
        runs: [first, second] as const,
        species: pair.species,
        order: printed.uncertainty === null ? printed.value : `${printed.value} ± ${printed.uncertainty}`,
      },
    ];
  });
}

function markedRun(analysis: StudyAnalysis, label: string): MarkedRun {
  const run = analysis.runs.find((one) => one.label === label);
  return {
    label,
    mark: run?.mark ?? { series: "base", level: 0, levels: 1, repeat: false },
    setAside: run?.state === "set-aside",
  };
}

function residualView(analysis: StudyAnalysis, fit: RateLawFit): ResidualView | null {
  if (fit.residuals.length === 0) return null;
  return {
    y: { quantity: "residual of the rate", unit: "%" },
    points: fit.residuals.map((one) => ({
      ...markedRun(analysis, one.label),
      residual: Math.expm1(one.residual) * 100,
    })),
  };
}

/** Relative; less is the rounding of the arithmetic and no scatter of runs. */
const LEAST_SCATTER = 1e-9;

function residualNote(fit: RateLawFit): string {
  const { scatter } = fit.simpleOrders;
  const about = "Each run's departure from the law with free orders.";
  return scatter === null
    ? about
    : `${about} About the law with simple orders the runs ${scatter < LEAST_SCATTER ? "do not scatter" : `scatter by ${printNumber(scatter * 100, 2)} %`}.`;
}

/** "+0.4 %"; a shift that rounds to nothing has no sign. */
function signedPercent(percent: number): string {
  const size = Math.abs(percent).toFixed(1);
  const sign = Number(size) === 0 ? "" : percent < 0 ? "\u2212" : "+";
  return `${sign}${size} %`;
}

function influenceView(sheet: Sheet, analysis: StudyAnalysis, fit: RateLawFit): InfluenceView | null {
  const constant = standingConstant(sheet, fit);
  if (constant.kind !== "rate-constant" || constant.estimate.estimate === null) return null;
  const display = rateConstantDisplay(sheet, constant.overallOrder);
  const whole = constant.estimate.estimate;
  const half =
    constant.estimate.interval === null
      ? null
      : ((constant.estimate.interval[1] - constant.estimate.interval[0]) / 2) * display.factor;
  const { power } = printUncertain(whole * display.factor, half);
  const rows = fit.leaveOneOut.flatMap(({ label, rateConstant }) => {
    if (rateConstant === null) return [];
    const shift = (rateConstant / whole - 1) * 100;
    return [
      {
        run: markedRun(analysis, label),
        value: printUncertain(rateConstant * display.factor, half, { power }).value,
        shift: signedPercent(shift),
        size: Math.abs(shift),
      },
    ];
  });
  return {
    quantity: power === 0 ? "*k*" : `*k* / 10^${power}`,
    unit: display.unit,
    rows: rows.sort((a, b) => b.size - a.size).map(({ run, value, shift }) => ({ run, value, shift })),
  };
}
