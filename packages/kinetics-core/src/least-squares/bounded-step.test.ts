import { describe, expect, it } from "vitest";
import { fitNonlinear } from "./fit-nonlinear";
import type { NonlinearProblem } from "./nonlinear-problem";
import { decay, SCATTERED, solved, TIME } from "./simulated-decay";

describe("bounds of a nonlinear fit", () => {
  it("hold a parameter that the data would push out, and fit the others for it", () => {
    const bounded = solved(
      fitNonlinear(
        decay(SCATTERED, [
          [-9, 9],
          [0, 1.5],
          [-9, 9],
        ]),
        [1, 0.3, 0],
      ),
    );
    const fixed = solved(
      fitNonlinear(
        decay(SCATTERED, [
          [-9, 9],
          [1.5, 1.5],
          [-9, 9],
        ]),
        [1, 1.5, 0],
      ),
    );
    expect(bounded.held).toEqual([false, true, false]);
    expect(bounded.parameters[1]).toBe(1.5);
    [0, 2].forEach((j) => {
      expect(bounded.parameters[j]).toBeCloseTo(fixed.parameters[j] ?? Number.NaN, 11);
    });
  });

  it("are reached exactly by a step that is as long as the way to them, whatever its rounding", () => {
    // A path β beside one of first order that the rates, which bend the other way, would have below zero.
    const levels = [0.005, 0.0025, 0.025];
    const rates = [4.756e-6, 2.5e-6, 2.6e-5].map(Math.log);
    const problem: NonlinearProblem = {
      residuals: 3,
      parameters: 1,
      bounds: [[0, 2000]],
      evaluate([beta = 0], residuals, jacobian) {
        const logs = levels.map((a) => Math.log(a + beta));
        const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / 3;
        const slopes = levels.map((a) => 1 / (a + beta));
        levels.forEach((_, j) => {
          residuals[j] = (logs[j] ?? 0) - mean(logs) - ((rates[j] ?? 0) - mean(rates));
          if (jacobian?.[0]) jacobian[0][j] = (slopes[j] ?? 0) - mean(slopes);
        });
        return true;
      },
    };
    for (let i = 1; i <= 50; i++) {
      const fit = solved(fitNonlinear(problem, [1e-3 / i]));
      expect(fit.parameters[0]).toBe(0);
      expect(fit.held).toEqual([true]);
    }
  });

  it("count a parameter that they fix as known", () => {
    const fit = solved(
      fitNonlinear(
        decay(SCATTERED, [
          [-9, 9],
          [1.5, 1.5],
          [-9, 9],
        ]),
        [1, 1.5, 0],
      ),
    );
    expect(fit.degreesOfFreedom).toBe(TIME.length - 2);
    expect(fit.rank).toBe(2);
    expect(fit.unscaledCovariance?.[1]).toEqual([0, 0, 0]);
    expect(fit.unscaledCovariance?.[0]?.[0]).toBeGreaterThan(0);
  });

  it("do nothing where the answer lies inside, and let go of a start that lies on them", () => {
    const free = solved(fitNonlinear(decay(SCATTERED), [1, 0.3, 0]));
    const bounded = solved(
      fitNonlinear(
        decay(SCATTERED, [
          [0, 4],
          [0, 3],
          [0, 1],
        ]),
        [0, 0, 1],
      ),
    );
    free.parameters.forEach((value, j) => {
      expect(bounded.parameters[j]).toBeCloseTo(value, 11);
    });
    expect(bounded.held).toEqual([false, false, false]);
  });

  it("can hold several at once, each where moving inwards only raises the sum of squares", () => {
    const problem = decay(SCATTERED, [
      [0, 1.5],
      [0, 1],
      [0.8, 2],
    ]);
    const fit = solved(fitNonlinear(problem, [1, 0.5, 1]));
    expect(fit.held).toEqual([true, true, true]);
    [-1e-4, -1e-4, 1e-4].forEach((step, j) => {
      const theta = Float64Array.from(fit.parameters);
      theta[j] = (theta[j] ?? 0) + step;
      const residuals = new Float64Array(TIME.length);
      problem.evaluate(theta, residuals, null);
      expect(residuals.reduce((sum, r) => sum + r * r, 0)).toBeGreaterThan(fit.residualSquares);
    });
  });
});
