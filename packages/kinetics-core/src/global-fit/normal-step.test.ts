import { describe, expect, it } from "vitest";
import { NormalStep } from "./normal-step";
import { undeterminedCombinations } from "./undetermined";

const none = new Uint8Array(3);

describe("a step from the normal equations", () => {
  const gram = Float64Array.of(4e6, 1e3, 2, 1e3, 5, 0.01, 2, 0.01, 3);

  it("solves them whatever the size of the parameters", () => {
    const truth = [1e-3, 2, -1];
    const gradient = Float64Array.from([0, 1, 2], (i) =>
      truth.reduce((sum, value, j) => sum + (gram[3 * i + j] ?? 0) * value, 0),
    );
    const step = new Float64Array(3);
    new NormalStep(3).solve(gram, gradient, 0, none, step);
    step.forEach((value, i) => {
      expect(value / (truth[i] ?? 1)).toBeCloseTo(1, 10);
    });
  });

  it("leaves a held parameter and one that nothing determines where they are", () => {
    const step = new Float64Array(3);
    const solver = new NormalStep(3);
    solver.solve(gram, Float64Array.of(1, 1, 1), 0, Uint8Array.of(0, 1, 0), step);
    expect(step[1]).toBe(0);
    // The third column is the sum of the others.
    const same = Float64Array.of(2, 1, 3, 1, 2, 3, 3, 3, 6);
    solver.solve(same, Float64Array.of(1, 1, 2), 0, none, step);
    expect(step[2]).toBe(0);
    expect(Array.from(solver.idle)).toEqual([0, 0, 1]);
    expect(undeterminedCombinations(same, ["ln k", "A", "B"])[0]?.combination).toEqual({
      "ln k": expect.closeTo(-1, 9),
      A: expect.closeTo(-1, 9),
      B: 1,
    });
  });

  it("shortens with damping", () => {
    const solver = new NormalStep(3);
    const free = new Float64Array(3);
    const damped = new Float64Array(3);
    solver.solve(gram, Float64Array.of(1, 1, 1), 0, none, free);
    solver.solve(gram, Float64Array.of(1, 1, 1), 10, none, damped);
    expect(Math.hypot(...damped)).toBeLessThan(0.2 * Math.hypot(...free));
  });
});
