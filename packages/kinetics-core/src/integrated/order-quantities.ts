import { decayRatio, decayRatioSlope } from "kinetics-core/smooth-ratios";
import { coursePoint } from "./course-point";
import { orderCourse } from "./order-course";
import type { Quantity } from "./quantity";

/** A fitted course of one order, and the way back from its scales. */
export interface OrderCourseState {
  /** ln κ on the clock of the fit. */
  readonly logRate: number;
  readonly order: number;
  /** Signed distance from the end at the first reading, in ranges. */
  readonly scale: number;
  readonly end: number;
  readonly duration: number;
  readonly range: number;
  readonly firstTime: number;
  readonly firstSignal: number;
}

/**
 * ln k of −dy/dt = k·yⁿ: with A the distance at the first reading, κ = k·A^(n−1)·duration, so that
 *   ln k = ln κ − ln duration + (1 − n)·ln A.
 */
export function logRateConstantOf(state: OrderCourseState): Quantity {
  const { logRate, order, scale, duration, range } = state;
  const logDistance = Math.log(Math.abs(scale)) + Math.log(range);
  return {
    value: logRate - Math.log(duration) + (1 - order) * logDistance,
    gradient: { theta: [1, -logDistance], scales: [(1 - order) / scale], end: 0 },
  };
}

export function endSignalOf({ end, range, firstSignal }: OrderCourseState): Quantity {
  return { value: firstSignal + range * end, gradient: { theta: [], scales: [], end: range } };
}

/**
 * The signal at mixing, by running the course backwards from the first reading: c(−x), x = κ·t₁. Null where the law
 * has no such past: above first order an unbounded distance lies at x = 1/(n − 1).
 */
export function initialSignalOf(state: OrderCourseState): Quantity | null {
  const start = startOf(state);
  if (start === null) return null;
  const { scale, end, range, firstSignal } = state;
  return {
    value: firstSignal + range * (end + scale * start.part),
    gradient: {
      theta: [range * scale * start.byLogRate, range * scale * start.byOrder],
      scales: [range * start.part],
      end: range,
    },
  };
}

/**
 * ln t½ counted from mixing: t½ = x½/κ₀ with κ₀ = κ·c₀^(n−1) the fractional rate at mixing and
 *   x½ = (2^(n−1) − 1)/(n − 1) = ln 2·E((n − 1)·ln 2),   E(y) = (e^y − 1)/y,
 * which is ln 2 at n = 1 and passes through it smoothly.
 */
export function logHalfLifeOf(state: OrderCourseState): Quantity | null {
  const start = startOf(state);
  if (start === null) return null;
  const { logRate, order, duration } = state;
  const power = (order - 1) * Math.LN2;
  const ratio = decayRatio(-power);
  const logStart = Math.log(start.part);
  return {
    value: Math.log(Math.LN2) + Math.log(ratio) + Math.log(duration) - logRate - (order - 1) * logStart,
    gradient: {
      theta: [
        -1 - ((order - 1) * start.byLogRate) / start.part,
        (-Math.LN2 * decayRatioSlope(-power)) / ratio - logStart - ((order - 1) * start.byOrder) / start.part,
      ],
      scales: [],
      end: 0,
    },
  };
}

/** Distance from the end at mixing over that at the first reading. */
function startOf(state: OrderCourseState): {
  readonly part: number;
  readonly byLogRate: number;
  readonly byOrder: number;
} | null {
  const before = -Math.exp(state.logRate) * (state.firstTime / state.duration);
  const point = coursePoint();
  orderCourse(before, state.order, point);
  if (!(point.part > 0) || !Number.isFinite(point.part)) return null;
  return { part: point.part, byLogRate: before * point.byProgress, byOrder: point.bySecond };
}

/** The time, since the first reading, at which all is used up; null at and above first order. */
export function exhaustionOf({ logRate, order, duration }: OrderCourseState): number | null {
  return order < 1 ? duration / ((1 - order) * Math.exp(logRate)) : null;
}
