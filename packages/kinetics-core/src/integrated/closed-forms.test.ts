import { describe, expect, it } from "vitest";
import { autocatalyticCourse } from "./autocatalytic-course";
import fixture from "./closed-forms.fixture.json";
import { consecutiveCourse } from "./consecutive-course";
import { coursePoint } from "./course-point";
import { orderCourse } from "./order-course";
import { reversibleCourse } from "./reversible-course";
import { unequalSecondOrderCourse } from "./unequal-second-order-course";

const CLOSED_FORMS = [
  ["order", orderCourse, fixture.order],
  ["unequal-second-order", unequalSecondOrderCourse, fixture["unequal-second-order"]],
  ["reversible", reversibleCourse, fixture.reversible],
  ["consecutive", consecutiveCourse, fixture.consecutive],
  ["autocatalytic", autocatalyticCourse, fixture.autocatalytic],
] as const;

/** Relative to the value, but for numbers so small that they are nothing beside a whole of 1. */
function distance(found: number, expected: number): number {
  return Math.abs(found - expected) / Math.max(Math.abs(expected), 1e-3);
}

describe.each(CLOSED_FORMS)("the closed form %s", (_, course, rows) => {
  it("has the values and derivatives of 120-digit arithmetic", () => {
    const point = coursePoint();
    for (const [x = 0, second = 0, part = 0, byProgress = 0, bySecond = 0] of rows) {
      course(x, second, point);
      const place = `at ${x}, ${second}`;
      expect(distance(point.part, part), `part ${place}`).toBeLessThan(2e-14);
      expect(distance(point.byProgress, byProgress), `by progress ${place}`).toBeLessThan(1e-13);
      expect(distance(point.bySecond, bySecond), `by second ${place}`).toBeLessThan(4e-13);
    }
  });
});

describe("a near-singular case", () => {
  const point = coursePoint();
  const at = (course: (typeof CLOSED_FORMS)[number][1], x: number, second: number) => {
    course(x, second, point);
    return { ...point };
  };

  it.each([
    ["n → 1", orderCourse, 1],
    ["a₀ → b₀", unequalSecondOrderCourse, 0],
    ["k₁ → k₂", consecutiveCourse, 2.5],
  ] as const)("has no jump: %s", (_, course, singular) => {
    const middle = at(course, 2.5, singular);
    for (const step of [1e-2, 1e-4, 1e-6, 1e-8, 1e-10, 1e-12, 1e-14]) {
      const above = at(course, 2.5, singular + step);
      const below = at(course, 2.5, singular - step);
      // The slope explains the difference across the point to second order, and rounding the rest.
      expect(Math.abs(above.part - below.part - 2 * step * middle.bySecond)).toBeLessThan(step ** 3 + 1e-15);
      expect(Math.abs(above.bySecond - middle.bySecond)).toBeLessThan(2 * step + 1e-14);
      expect(Math.abs(below.bySecond - middle.bySecond)).toBeLessThan(2 * step + 1e-14);
      expect(Math.abs(above.byProgress - below.byProgress)).toBeLessThan(2 * step + 1e-14);
    }
  });

  it("of an order below one stops at exhaustion and stays there", () => {
    for (const order of [-1, 0, 0.5, 0.9]) {
      const end = 1 / (1 - order);
      expect(at(orderCourse, end * (1 + 1e-12), order)).toEqual({ part: 0, byProgress: 0, bySecond: 0 });
      expect(at(orderCourse, end * (1 - 1e-9), order).part).toBeLessThan(1e-4);
    }
  });

  it("of extreme arguments stays a number", () => {
    for (const [, course] of CLOSED_FORMS) {
      for (const x of [0, 1e-300, 1e-9, 1, 1e4, 1e9]) {
        for (const second of [0, 1e-300, 1e-12, 0.5, 1, 1 + 1e-15, 7, 1e3, 1e9]) {
          const { part, byProgress, bySecond } = at(course, x, second);
          expect(part).toBeGreaterThanOrEqual(0);
          expect(part).toBeLessThanOrEqual(1 + 2 * Number.EPSILON);
          expect(Number.isFinite(byProgress), `by progress at ${x}, ${second}`).toBe(true);
          expect(Number.isFinite(bySecond), `by second at ${x}, ${second}`).toBe(true);
        }
      }
    }
  });
});
