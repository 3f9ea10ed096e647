import { createRequire } from "node:module";
import { describe, expect, it } from "vitest";
import { type CourseSystem, DENSE_COEFFICIENTS, DormandPrinceStep } from "./dormand-prince";

/** Hairer's extrapolation solver. Its types are sources that a stricter compiler refuses, so what is used stands here. */
const { Solver }: { Solver: new (dimension: number) => OdexSolver } = createRequire(import.meta.url)("odex");

interface OdexSolver {
  absoluteTolerance: number;
  relativeTolerance: number;
  solve(
    derivative: (x: number, y: number[]) => number[],
    from: number,
    start: number[],
    to: number,
  ): { readonly y: readonly number[] };
}

/** A decays by first order in component 0, ∫ A dτ beside it. */
const decay: CourseSystem = {
  dimension: 2,
  coupled: 1,
  evaluate(y, derivative) {
    derivative[0] = 1 - (y[0] ?? 0);
    derivative[1] = 1 - (y[0] ?? 0);
    return true;
  },
};

function densely(coefficients: Float64Array, component: number, v: number): number {
  let value = 0;
  for (let m = DENSE_COEFFICIENTS - 1; m >= 0; m--)
    value = value * v + (coefficients[component * DENSE_COEFFICIENTS + m] ?? 0);
  return value;
}

describe("a Dormand-Prince step", () => {
  it("is of order five: halving it divides its error by 2⁶", () => {
    const errorOf = (h: number) => {
      const step = new DormandPrinceStep(2);
      step.begin(decay);
      step.attempt(decay, h);
      return Math.abs((step.next[0] ?? 0) + Math.expm1(-h));
    };
    expect(errorOf(0.4) / errorOf(0.2)).toBeGreaterThan(56);
    expect(errorOf(0.4) / errorOf(0.2)).toBeLessThan(72);
  });

  it("gives a quadrature the same value as a component that is integrated", () => {
    const step = new DormandPrinceStep(2);
    step.begin(decay);
    step.attempt(decay, 0.3);
    expect(step.next[1]).toBe(step.next[0]);
  });

  it("has a dense output of order four within the step", () => {
    const worst = (h: number) => {
      const step = new DormandPrinceStep(2);
      const coefficients = new Float64Array(2 * DENSE_COEFFICIENTS);
      step.begin(decay);
      step.attempt(decay, h);
      step.dense(h, coefficients);
      const at = [0, 0.1, 0.3, 0.5, 0.7, 0.9, 1];
      return Math.max(...at.map((u) => Math.abs(densely(coefficients, 0, u - 0.5) + Math.expm1(-u * h))));
    };
    expect(worst(0.4)).toBeLessThan(1e-5);
    expect(worst(0.4) / worst(0.2)).toBeGreaterThan(24);
  });

  it("agrees with an extrapolation solver along an autocatalytic course", () => {
    const system: CourseSystem = {
      dimension: 1,
      coupled: 1,
      evaluate(y, derivative) {
        const x = y[0] ?? 0;
        derivative[0] = (1 - x) ** 1.5 * (0.01 + x) ** 0.8;
        return true;
      },
    };
    const step = new DormandPrinceStep(1);
    step.begin(system);
    for (let i = 0; i < 400; i++) {
      step.attempt(system, 0.01);
      step.accept();
    }
    const solver = new Solver(1);
    solver.absoluteTolerance = 1e-12;
    solver.relativeTolerance = 1e-12;
    expect(step.y[0]).toBeCloseTo(
      solver.solve((_, [x = 0]) => [(1 - x) ** 1.5 * (0.01 + x) ** 0.8], 0, [0], 4).y[0] ?? 0,
      10,
    );
  });
});
