import { autocatalyticCourse } from "./autocatalytic-course";
import { consecutiveCourse } from "./consecutive-course";
import { type CourseLaw, type CourseParameter, numberParameter, rateParameter } from "./course-law";
import { type CoursePoint, coursePoint } from "./course-point";
import { orderCourse } from "./order-course";
import { reversibleCourse } from "./reversible-course";
import { unequalSecondOrderCourse } from "./unequal-second-order-course";

/** Orders that a search may reach. Beyond, a course cannot be told from a corner or from a line. */
export const ORDER_BOUNDS = [-2, 5] as const;

/** dc/dt = −κ·cⁿ with n held. θ: [ln κ]. */
export function heldOrderLaw(order: number): CourseLaw {
  const law = (parameter: CourseParameter): CourseLaw => ({
    name: "held-order",
    parameters: [parameter],
    species: 1,
    evaluate: progressAndNumber(orderCourse, order),
  });
  const rate = rateParameter("rate");
  if (order >= 1) return law(rate);
  const [least] = rate.bounds;
  const latest = -Math.log(1 - order) - BEHIND_LAST_READING;
  return {
    ...law(rate),
    endOfCourse: ([logRate = Number.NaN]) => exhaustedAt(logRate, order),
    withinCourse: law({ ...rate, bounds: [least, latest] }),
  };
}

/** dc/dt = −κ·cⁿ. θ: [ln κ, n]. */
export function freeOrderLaw(): CourseLaw {
  return {
    name: "free-order",
    parameters: [rateParameter("rate"), numberParameter("order", ORDER_BOUNDS, [0, 0.5, 1, 1.5, 2, 3])],
    species: 1,
    endOfCourse: ([logRate = Number.NaN, order = Number.NaN]) => exhaustedAt(logRate, order),
    evaluate: progressAndNumber(orderCourse),
  };
}

/** At the end itself the course has lost its derivatives; this much of ln κ before it has them. */
const BEHIND_LAST_READING = 1e-9;

/** 1 = (1 − n)κt. */
function exhaustedAt(logRate: number, order: number): number {
  return order < 1 ? Math.exp(-logRate) / (1 - order) : Number.POSITIVE_INFINITY;
}

/** A + B → products, followed by A or by what it forms. θ: [ln(k·a₀), b₀/a₀ − 1]. */
export function unequalSecondOrderLaw(): CourseLaw {
  return {
    name: "unequal-second-order",
    parameters: [
      rateParameter("rate"),
      numberParameter("excess", [-0.999, 1000], [-0.7, -0.3, 0, 0.5, 1, 3, 10]),
    ],
    species: 1,
    evaluate: progressAndNumber(unequalSecondOrderCourse),
  };
}

/** A + B → products with the starting amounts known. θ: [ln(k·a₀)]. */
export function knownExcessLaw(excess: number): CourseLaw {
  return {
    name: "known-excess",
    parameters: [rateParameter("rate")],
    species: 1,
    evaluate: progressAndNumber(unequalSecondOrderCourse, excess),
  };
}

/** A + P → 2 P. θ: [ln(k·a₀), p₀/a₀]. */
export function autocatalyticLaw(): CourseLaw {
  return {
    name: "autocatalytic",
    parameters: [
      rateParameter("rate"),
      numberParameter("seed", [1e-12, 1000], [1e-6, 1e-4, 1e-2, 0.1, 0.5, 2]),
    ],
    species: 1,
    evaluate: progressAndNumber(autocatalyticCourse),
  };
}

/** A ⇌ P. θ: [ln k₁, ln k₋₁]. Both are determined only where the signal without any A is known. */
export function reversibleLaw(): CourseLaw {
  return {
    name: "reversible",
    parameters: [rateParameter("forward"), rateParameter("back")],
    species: 1,
    evaluate: twoSteps((x, y, [point]) => {
      if (point) reversibleCourse(x, y, point);
    }),
  };
}

/** A → I → P, where A and I both show. θ: [ln k₁, ln k₂]; parts: A, then I. */
export function consecutiveLaw(): CourseLaw {
  return {
    name: "consecutive",
    parameters: [rateParameter("first"), rateParameter("second")],
    species: 2,
    evaluate: twoSteps((x, y, [reactant, intermediate]) => {
      if (reactant) orderCourse(x, 1, reactant);
      if (reactant) reactant.bySecond = 0;
      if (intermediate) consecutiveCourse(x, y, intermediate);
    }),
  };
}

/** A course by its progress κt and a number, which is either held or the second of θ. */
function progressAndNumber(
  course: (progress: number, second: number, into: CoursePoint) => void,
  held?: number,
): CourseLaw["evaluate"] {
  const point = coursePoint();
  return (time, theta, [part], derivatives) => {
    const rate = Math.exp(theta[0] ?? Number.NaN);
    const second = held ?? theta[1] ?? Number.NaN;
    const [byRate, bySecond] = [derivatives[0]?.[0], derivatives[1]?.[0]];
    if (!part || !byRate) throw new RangeError("A course of one species has one part and its derivatives");
    for (let i = 0; i < time.length; i++) {
      const progress = rate * (time[i] ?? Number.NaN);
      course(progress, second, point);
      if (!Number.isFinite(point.part + point.byProgress + point.bySecond)) return false;
      part[i] = point.part;
      byRate[i] = progress * point.byProgress;
      if (bySecond) bySecond[i] = point.bySecond;
    }
    return true;
  };
}

/** Courses of one or two species by two progresses, k₁t and k₂t. */
function twoSteps(
  course: (x: number, y: number, into: readonly CoursePoint[]) => void,
): CourseLaw["evaluate"] {
  const points = [coursePoint(), coursePoint()];
  return (time, theta, parts, derivatives) => {
    const [first, second] = [Math.exp(theta[0] ?? Number.NaN), Math.exp(theta[1] ?? Number.NaN)];
    for (let i = 0; i < time.length; i++) {
      const [x, y] = [first * (time[i] ?? Number.NaN), second * (time[i] ?? Number.NaN)];
      course(x, y, points);
      for (let s = 0; s < parts.length; s++) {
        const [point, part, byFirst, bySecond] = [
          points[s],
          parts[s],
          derivatives[0]?.[s],
          derivatives[1]?.[s],
        ];
        if (!point || !part || !byFirst || !bySecond) throw new RangeError("Two rates have two derivatives");
        if (!Number.isFinite(point.part + point.byProgress + point.bySecond)) return false;
        part[i] = point.part;
        byFirst[i] = x * point.byProgress;
        bySecond[i] = y * point.bySecond;
      }
    }
    return true;
  };
}
