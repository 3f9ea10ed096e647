import { studentTFactor } from "kinetics-core/distributions";
import { type Flag, numberInWords, percent } from "kinetics-core/quantities";
import {
  AUTOCORRELATION_WEAKENS,
  CONFLICT_BLOCKS,
  CONFLICT_WEAKENS,
  DEAD_PART_WEAKENS,
  EFFECTIVE_POINTS_WEAKEN,
  LACK_OF_FIT_LEVEL,
  ORDER_HALF_WIDTH_BLOCKS,
  ORDER_HALF_WIDTH_WEAKENS,
  SPARE_POINTS,
} from "./constants";
import type { EndSignal } from "./end-signal";
import type { IntegratedLawFit } from "./integrated-law";
import type { OrderCheck } from "./order-check";

export interface FlagContext {
  readonly report: Omit<IntegratedLawFit, "flags">;
  /** Null where the order is free. */
  readonly heldOrder: number | null;
  /** Null where the request names none. */
  readonly endSignal: EndSignal | null;
  /** Readings before mixing. */
  readonly before: number;
  readonly timeZero: number;
  /** Of the first reading, since mixing. */
  readonly firstTime: number;
  readonly duration: number;
  readonly parameters: number;
  /** Whether ln κ, and the order where it is free, stopped at a bound. */
  readonly held: readonly boolean[];
  /** The end rests on one or two readings. */
  readonly cornered: boolean;
  /** Since the first reading. */
  readonly exhaustion: number | null;
  readonly orderCheck: OrderCheck | null;
  readonly level: number;
}

/** What a reader should beware of in the fit of one integrated law. */
export function integratedLawFlags(context: FlagContext): Flag[] {
  return [
    ...endFlags(context),
    ...orderFlags(context),
    ...fitFlags(context),
    ...pointFlags(context),
    ...courseFlags(context),
  ];
}

function endFlags({ endSignal, report, heldOrder }: FlagContext): Flag[] {
  const flags: Flag[] = [];
  if (endSignal === null || endSignal.kind === "free") {
    flags.push({
      code: "end-signal-free",
      severity: "weakens",
      message:
        "The end signal is left to the fit, which tells an order poorly; state a blank, an end reading or the product's " +
        "signal with its standard uncertainty.",
    });
  } else if (endSignal.kind === "zero") {
    flags.push({
      code: "end-signal-zero",
      severity: "note",
      message:
        "The end signal is taken as exactly 0: nothing but the followed species shows; state a blank or an end reading " +
        "where that is not certain.",
    });
  }
  const z = report.endConflict;
  if (z !== null && Math.abs(z) >= CONFLICT_WEAKENS) {
    const blocks = Math.abs(z) >= CONFLICT_BLOCKS;
    flags.push({
      code: "end-conflict",
      severity: blocks ? "blocks" : "weakens",
      message:
        `The stated end signal and the one that the readings show ${heldOrder === null ? "" : `at order ${numberInWords(heldOrder)} `}` +
        `differ by ${Math.abs(z).toFixed(1)} standard uncertainties${blocks ? ", so that no order should be claimed" : ""}; ` +
        "see whether a product shows, or measure the end.",
    });
  }
  return flags;
}

function orderFlags({ report, heldOrder, orderCheck, level, held, cornered }: FlagContext): Flag[] {
  if (held.includes(true) || cornered) return [];
  const flags: Flag[] = [];
  const error = orderCheck?.standardError ?? null;
  if (orderCheck === null || error === null) {
    flags.push({
      code: "order-not-shown",
      severity: heldOrder === null ? "blocks" : "weakens",
      message:
        heldOrder === null
          ? "The readings do not determine an order; add readings, follow the run further or state the end signal."
          : `Order ${numberInWords(heldOrder)} is taken as given: these readings cannot test it; add readings, or state the end signal.`,
    });
  } else {
    const halfWidth = error * studentTFactor(level, orderCheck.degreesOfFreedom);
    if (halfWidth > ORDER_HALF_WIDTH_WEAKENS) flags.push(wideOrder(halfWidth, heldOrder, report.conversion));
  }
  if (heldOrder !== null && orderCheck !== null && orderCheck.pValue < 1 - level) {
    flags.push({
      code: "order-disagrees",
      severity: "weakens",
      message:
        `The readings ask for an order ${orderCheck.shift > 0 ? "above" : "below"} ${numberInWords(heldOrder)}: about ` +
        `${numberInWords(heldOrder + orderCheck.shift)}; fit the order free, or check the end signal.`,
    });
  }
  return flags;
}

function wideOrder(halfWidth: number, heldOrder: number | null, conversion: number | null): Flag {
  return {
    code: "order-not-shown",
    severity: heldOrder === null && halfWidth > ORDER_HALF_WIDTH_BLOCKS ? "blocks" : "weakens",
    message: `This trace tells its order to ± ${halfWidth < 100 ? halfWidth.toPrecision(2) : "more than 100"} only${
      conversion === null ? "" : ` at ${percent(clippedPart(conversion))} conversion`
    }; follow the run further, with less noise, or state the end signal.`,
  };
}

function fitFlags({ report, held, heldOrder, cornered }: FlagContext): Flag[] {
  const flags: Flag[] = [];
  const { lackOfFit } = report;
  if (lackOfFit !== null && lackOfFit.pValue < LACK_OF_FIT_LEVEL) {
    flags.push({
      code: "lack-of-fit",
      severity: "weakens",
      message:
        `The residuals hold a pattern (F = ${numberInWords(lackOfFit.ratio)}, p ${lackOfFit.pValue < 0.001 ? "< 0.001" : `= ${lackOfFit.pValue.toFixed(3)}`}) ` +
        `that ${heldOrder === null ? "no single order describes" : "this order does not describe"}; look for a second phase, a burst, a lag or a drift.`,
    });
  }
  if (cornered) {
    flags.push({
      code: "end-by-few-readings",
      severity: "blocks",
      message:
        "The course found ends just before the last reading or two and follows their noise, so neither order nor end is " +
        "determined; state the end signal, hold the order, or follow the run for longer.",
    });
  }
  if (held[0]) {
    flags.push({
      code: "rate-at-bound",
      severity: "blocks",
      message:
        "No rate constant describes this signal: it does not approach its end, or has reached it before the second " +
        "reading; check the end signal and the window.",
    });
  }
  if (held[1]) {
    flags.push({
      code: "order-at-bound",
      severity: "blocks",
      message:
        "The order ran to a bound of the search (−2 or 5), so none is determined; hold the order, state the end signal or " +
        "follow the run further.",
    });
  }
  return flags;
}

function pointFlags({ report, parameters, before, timeZero, endSignal }: FlagContext): Flag[] {
  const flags: Flag[] = [];
  if (before > 0) {
    flags.push({
      code: "before-mixing",
      severity: "note",
      message: `${before === 1 ? "1 reading" : `${before} readings`} before mixing, at time ${numberInWords(timeZero)}, ${before === 1 ? "is" : "are"} not used.`,
    });
  }
  // An end with an uncertainty of its own is an unknown and an observation.
  const isObserved = endSignal?.kind === "known" && endSignal.standardUncertainty > 0;
  const needed = parameters + SPARE_POINTS - (isObserved ? 1 : 0);
  if (report.points < needed) {
    flags.push({
      code: "few-points",
      severity: "blocks",
      message:
        `${report.points} readings leave ${report.degreesOfFreedom > 0 ? "hardly anything" : "nothing"} to judge a fit of this kind by; ` +
        `take at least ${needed}.`,
    });
  } else if (report.effectivePoints < EFFECTIVE_POINTS_WEAKEN) {
    flags.push({
      code: "few-effective-points",
      severity: "weakens",
      message:
        `The trace holds ${numberInWords(Number(report.effectivePoints.toFixed(1)))} independent readings, fewer than ${EFFECTIVE_POINTS_WEAKEN}; ` +
        "take more, or follow the run for longer.",
    });
  }
  if (report.autocorrelation > AUTOCORRELATION_WEAKENS) {
    flags.push({
      code: "autocorrelated",
      severity: "weakens",
      message:
        `Neighbouring residuals correlate by ${report.autocorrelation.toFixed(2)}, so they tell little more than each other; ` +
        "look for drift, smoothing in the instrument, or a course that this law does not follow.",
    });
  }
  return flags;
}

function courseFlags({
  report,
  exhaustion,
  duration,
  firstTime,
  timeZero,
  held,
  cornered,
}: FlagContext): Flag[] {
  const flags: Flag[] = [];
  if (exhaustion !== null && exhaustion < duration && !cornered) {
    flags.push({
      code: "exhausted",
      severity: "note",
      message:
        `By this law all was used up at time ${numberInWords(timeZero + firstTime + exhaustion)}; later readings show the ` +
        "end signal only.",
    });
  }
  if (report.initialSignal.estimate === null) {
    if (firstTime > 0 && !held.includes(true) && !cornered) {
      flags.push({
        code: "no-initial-signal",
        severity: "weakens",
        message:
          `The readings, which begin ${numberInWords(firstTime)} after mixing, do not determine the signal and the half-life ` +
          "from mixing on.",
      });
    }
    return flags;
  }
  const first = report.curve.signal[0] ?? Number.NaN;
  const last = report.curve.signal.at(-1) ?? Number.NaN;
  const missed = Math.abs((report.initialSignal.estimate - first) / (report.initialSignal.estimate - last));
  if (missed > DEAD_PART_WEAKENS) {
    flags.push({
      code: "dead-time",
      severity: "weakens",
      message:
        `${percent(clippedPart(missed))} of the whole change came before the first reading, so the initial signal and the half-life ` +
        "are extrapolations; start to read earlier.",
    });
  }
  return flags;
}

function clippedPart(part: number): number {
  return Math.min(Math.max(part, 0), 1);
}
