import { fSurvival } from "kinetics-core/distributions";
import type { Trace } from "kinetics-core/initial-rate";
import { type Estimate, type Flag, inARow, numberInWords } from "kinetics-core/quantities";
import { CONFLICT_BLOCKS, LACK_OF_FIT_LEVEL, ORDER_HALF_WIDTH_WEAKENS } from "./constants";
import { heldOrderLaw } from "./course-laws";
import type { EndSignal } from "./end-signal";
import { type CourseFit, courseJacobian, effectiveDeviation, fitCourse } from "./fit-course";
import { fitWithWorking } from "./fit-integrated-law";
import type { IntegratedLawFit, IntegratedLawResult } from "./integrated-law";
import { linearInformation } from "./linear-information";
import type { ScaledReadings } from "./scaled-reading";
import { searchCourse } from "./search-course";

export interface OrderOfTraceInput extends Trace {
  /** Free where absent; an end that is known with its uncertainty decides more than anything else. */
  readonly endSignal?: EndSignal;
  /** Orders to decide among; default 0, 1 and 2. */
  readonly candidates?: readonly number[];
  readonly timeZero?: number;
  readonly level?: number;
}

/** How a trace reads one order. */
export interface OrderCandidate {
  readonly order: number;
  /** Rise of the sum of squares over that of the free order, in effective variances; about t² of the order. */
  readonly excess: number;
  /** Of that rise by F(1, degrees of freedom). */
  readonly pValue: number;
  readonly excluded: boolean;
}

/**
 * - `is`: one candidate alone is not excluded, and the order is known to a quarter or better.
 * - `consistent`: with the candidates that are not excluded, no single one shown.
 * - `none`: every candidate is excluded, or no single order follows the trace, or the end signal is in conflict.
 */
export type OrderReading = "is" | "consistent" | "none";

export type OrderOfTrace =
  | {
      readonly status: "read";
      readonly reading: OrderReading;
      /** The order that is shown; null unless `reading` is "is". */
      readonly order: number | null;
      /** The candidate that fits best, whatever the reading. */
      readonly nearest: number;
      readonly candidates: readonly OrderCandidate[];
      /** The order as a free parameter, always beside. */
      readonly freeOrder: Estimate;
      readonly freeFit: IntegratedLawFit;
      /** One sentence for the page. */
      readonly reason: string;
      readonly flags: readonly Flag[];
    }
  | Exclude<IntegratedLawResult, { status: "fitted" }>;

/**
 * The order of one trace among simple ones, with the end signal as one more observation and correlated noise counted:
 * candidates are compared by their least sum of squares on the same rows, over the effective variance σ²(1 + ρ)/(1 − ρ)
 * of the free order, and never by how straight a transformed axis looks.
 */
export function orderOfTrace(input: OrderOfTraceInput): OrderOfTrace {
  const { candidates: orders = [0, 1, 2], level = 0.95 } = input;
  if (orders.length === 0) throw new RangeError("At least one candidate order is needed");
  const free = fitWithWorking({ ...input, order: "free" });
  if (free.status !== "fitted") return free;
  const { report, fit, scaled } = free;
  const held = orders.flatMap((order) => {
    const course = heldCourse(order, fit, scaled);
    return course === null ? [] : [{ order, ...course }];
  });
  const candidates = candidatesOf(held, fit, level);
  const nearest = nearestOf(held, fit);
  if (nearest === null) {
    return {
      status: "not-converged",
      message: `None of the orders ${inARow(orders.map(numberInWords))} could be fitted to this trace; check its time and signal columns.`,
    };
  }
  const verdict = verdictOf(report, candidates);
  return {
    status: "read",
    ...verdict,
    nearest,
    candidates,
    freeOrder: report.order,
    freeFit: report,
    flags: report.flags,
  };
}

interface HeldCourse {
  readonly residualSquares: number;
  /** Parameters that the readings determine: a straight line has two, whatever end its law might have. */
  readonly determined: number;
}

/** The same rows and the same weight of the end for every order, so that sums of squares compare. */
function heldCourse(order: number, { condition }: CourseFit, { trace }: ScaledReadings): HeldCourse | null {
  const law = heldOrderLaw(order);
  // A free end must not follow the noise of the last reading here either.
  const free = condition.kind === "free" ? fitCourse(law, trace, condition) : null;
  const found =
    free === null ? searchCourse(law, trace, condition) : free.status === "fitted" ? free.found : null;
  if (found === null || found.status !== "found") return null;
  const { basis } = linearInformation(courseJacobian(found, condition));
  return { residualSquares: found.residualSquares, determined: basis.length };
}

function candidatesOf(
  held: readonly (HeldCourse & { readonly order: number })[],
  fit: CourseFit,
  level: number,
): OrderCandidate[] {
  const { found, noise } = fit;
  const least = Math.min(...held.map(({ residualSquares }) => residualSquares));
  // A free order that follows a corner of noise, or ran to a bound, is no measure of the others.
  const settled = !fit.cornered && !fit.stopped.includes(true);
  const base = settled ? Math.min(found.residualSquares, least) : least;
  const variance = effectiveDeviation(noise) ** 2;
  return held.map(({ order, residualSquares }) => {
    const rise = residualSquares - base;
    // Without a degree of freedom nothing judges a difference, and sums of squares only rank.
    if (noise.degreesOfFreedom === 0) return { order, excess: rise, pValue: 1, excluded: false };
    const pValue = fSurvival(rise / variance, 1, noise.degreesOfFreedom);
    return { order, excess: rise / variance, pValue, excluded: pValue < 1 - level };
  });
}

/** Least sum of squares, with the two units of variance that a determined parameter takes up by chance (Akaike). */
function nearestOf(
  held: readonly (HeldCourse & { readonly order: number })[],
  { noise }: CourseFit,
): number | null {
  const price = noise.degreesOfFreedom === 0 ? 0 : 2 * effectiveDeviation(noise) ** 2;
  const scores = held.map(({ residualSquares, determined }) => residualSquares + price * determined);
  return held[scores.indexOf(Math.min(...scores))]?.order ?? null;
}

function verdictOf(
  report: IntegratedLawFit,
  candidates: readonly OrderCandidate[],
): { readonly reading: OrderReading; readonly order: number | null; readonly reason: string } {
  const { lackOfFit, endConflict } = report;
  const open = candidates.filter(({ excluded }) => !excluded).map(({ order }) => order);
  const none = (reason: string) => ({ reading: "none", order: null, reason }) as const;
  if (endConflict !== null && Math.abs(endConflict) >= CONFLICT_BLOCKS)
    return none("The stated end signal contradicts the readings, so that no order should be claimed.");
  if (lackOfFit !== null && lackOfFit.pValue < LACK_OF_FIT_LEVEL)
    return none("No single order follows this trace: its residuals hold a pattern.");
  if (open.length === 0)
    return none(
      `Orders ${inARow(candidates.map(({ order }) => numberInWords(order)))} are all excluded; ${freeOrderInWords(report.order.estimate)}.`,
    );
  const consistent = (reason: string) => ({ reading: "consistent", order: null, reason }) as const;
  const names = inARow(open.map(numberInWords));
  const [only] = open;
  if (open.length > 1 || only === undefined)
    return consistent(
      `Orders ${names} are all consistent with this trace; follow it further or state the end signal.`,
    );
  const { interval } = report.order;
  const halfWidth = interval === null ? Number.POSITIVE_INFINITY : (interval[1] - interval[0]) / 2;
  if (!(halfWidth <= ORDER_HALF_WIDTH_WEAKENS))
    return consistent(
      `The trace is consistent with order ${names}, yet tells its order too poorly to show it.`,
    );
  return {
    reading: "is",
    order: only,
    reason: `Order ${names} is shown: the other candidates are excluded.`,
  };
}

function freeOrderInWords(order: number | null): string {
  return order === null
    ? "as a free parameter the order is not determined"
    : `the free order is ${numberInWords(order)}`;
}
