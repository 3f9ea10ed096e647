import { describe, expect, it } from "vitest";
import { Course } from "./course";
import type { CourseLaw } from "./course-law";
import { DENSE_COEFFICIENTS } from "./dormand-prince";
import { powerCourse } from "./power-course";

const species = [{ name: "A", stoichiometricNumber: -1 }];

/** ξ at each τ of a course A → from c₀ = 1, and how many pieces it took. */
function follow(law: CourseLaw, start: number, taus: readonly number[], tolerance = 1e-8) {
  law.begin(Float64Array.of(start), []);
  const task = { system: law, least: -Number.MAX_VALUE, most: start, span: start };
  const course = new Course(task);
  const end = taus[taus.length - 1] ?? 0;
  if (!course.begin(task, end, tolerance, 0)) throw new Error("no rate at the start");
  const extents: number[] = [];
  let pieces = 0;
  let piece = course.next();
  for (const tau of taus) {
    while (piece === "piece" && tau > course.until) {
      piece = course.next();
      pieces++;
    }
    if (piece === "failed") throw new Error("failed");
    const v = piece === "rest" ? 0 : (tau - course.from) / course.length - 0.5;
    let extent = 0;
    for (let m = DENSE_COEFFICIENTS - 1; m >= 0; m--) extent = extent * v + (course.coefficients[m] ?? 0);
    extents.push(extent);
  }
  return { extents, pieces };
}

const taus = Array.from({ length: 60 }, (_, i) => 0.05 * (i + 1));

describe("the course of a run", () => {
  it.each([0, 0.2, 0.5, 0.9, 1, 1.5, 2, 3])(
    "follows order %d in one reactant to its closed form, over exhaustion too",
    (order) => {
      const { extents } = follow(powerCourse(species, { A: order }), 1, taus);
      extents.forEach((extent, i) => {
        const tau = taus[i] ?? 0;
        const left = order === 1 ? Math.exp(-tau) : Math.max(0, 1 - (1 - order) * tau) ** (1 / (1 - order));
        expect(extent).toBeCloseTo(1 - left, 6);
      });
    },
  );

  it.each([0, 0.5, 1])("never leaves less than nothing at order %d", (order) => {
    const { extents } = follow(powerCourse(species, { A: order }), 1, taus, 1e-4);
    for (const extent of extents) {
      expect(extent).toBeLessThanOrEqual(1 + 1e-4);
      expect(extent).toBeGreaterThanOrEqual(0);
    }
  });

  it("rests after a negative order has run away at the end", () => {
    // d c/dτ = −1/c: c = √(1 − 2τ), with infinite slope at τ = ½.
    const { extents } = follow(powerCourse(species, { A: -1 }), 1, taus, 1e-6);
    expect(extents[5]).toBeCloseTo(1 - Math.sqrt(1 - 0.6), 4);
    expect(extents[59]).toBeCloseTo(1, 3);
  });

  it("ends after few steps where the rate constant is too large by a million", () => {
    const { extents, pieces } = follow(powerCourse(species, { A: 1 }), 1, [1e6], 1e-6);
    expect(extents[0]).toBeCloseTo(1, 5);
    expect(pieces).toBeLessThan(60);
  });

  it("does not start without its reactant", () => {
    const { extents, pieces } = follow(powerCourse(species, { A: 0 }), 0, [1]);
    expect(extents).toEqual([0]);
    expect(pieces).toBe(0);
  });

  it("takes about a dozen steps to 80 % conversion", () => {
    const { pieces } = follow(powerCourse(species, { A: 1 }), 1, [0.5, 1.6], 1e-6);
    expect(pieces).toBeLessThan(14);
  });
});
