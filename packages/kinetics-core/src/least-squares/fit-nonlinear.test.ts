import { describe, expect, it } from "vitest";
import { fitNonlinear } from "./fit-nonlinear";
import { decay, numbersIn, SCATTERED, solved, TIME } from "./simulated-decay";

describe("a nonlinear fit", () => {
  it("finds an exact curve and says that nothing is left", () => {
    const fit = solved(fitNonlinear(decay(TIME.map((t) => 3 * Math.exp(-2 * t) + 0.5)), [1, 0.3, 0]));
    [3, 2, 0.5].forEach((value, j) => {
      expect(fit.parameters[j]).toBeCloseTo(value, 12);
    });
    expect(fit.residualSquares).toBeLessThan(1e-28);
    expect(fit.rank).toBe(3);
  });

  it("ends where the residuals are orthogonal to every derivative", () => {
    const problem = decay(SCATTERED);
    const { parameters, residuals, unscaledCovariance } = solved(fitNonlinear(problem, [1, 0.3, 0]));
    const jacobian = [0, 1, 2].map(() => new Float64Array(TIME.length));
    problem.evaluate(parameters, new Float64Array(TIME.length), jacobian);
    for (const column of jacobian)
      expect(Math.abs(column.reduce((sum, value, i) => sum + value * (residuals[i] ?? 0), 0))).toBeLessThan(
        1e-14,
      );
    const gram = jacobian.map((a) =>
      jacobian.map((b) => a.reduce((sum, value, i) => sum + value * (b[i] ?? 0), 0)),
    );
    unscaledCovariance?.forEach((row, i) => {
      [0, 1, 2].forEach((j) => {
        const product = row.reduce((sum, value, k) => sum + value * (gram[k]?.[j] ?? 0), 0);
        expect(product).toBeCloseTo(i === j ? 1 : 0, 11);
      });
    });
  });

  it("is the same whatever the unit of the response", () => {
    const plain = solved(fitNonlinear(decay(SCATTERED), [1, 0.3, 0]));
    const scaled = solved(fitNonlinear(decay(SCATTERED.map((y) => y * 2 ** 40)), [2 ** 40, 0.3, 0]));
    expect(scaled.parameters[1]).toBe(plain.parameters[1]);
    expect(scaled.evaluations).toBe(plain.evaluations);
  });

  it("takes as many points as parameters, and then gives no scatter", () => {
    const fit = solved(fitNonlinear(decay(SCATTERED.slice(0, 3)), [1, 0.3, 0]));
    expect(fit.residualSquares).toBeLessThan(1e-28);
    expect(fit.degreesOfFreedom).toBe(0);
    expect(fit.residualStandardDeviation).toBeNull();
  });

  it.each([
    [-5, 30, 5],
    [1e6, 1e-6, -1e6],
    [3, 40, 0],
  ])("comes back from a start at (%d, %d, %d)", (...start) => {
    const fit = fitNonlinear(decay(SCATTERED), start);
    expect(numbersIn(fit).every(Number.isFinite)).toBe(true);
    expect(solved(fit).parameters[1]).toBeCloseTo(2, 1);
  });
});
