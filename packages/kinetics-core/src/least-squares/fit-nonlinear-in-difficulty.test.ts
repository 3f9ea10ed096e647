import { describe, expect, it } from "vitest";
import { fitNonlinear } from "./fit-nonlinear";
import type { NonlinearProblem } from "./nonlinear-problem";
import { decay, numbersIn, SCATTERED, solved } from "./simulated-decay";

describe("a nonlinear fit in difficulty", () => {
  it.each([
    [3, 400, 0],
    [0.001, 0.001, 100],
  ])("never calls a plateau an answer with an error: start at (%d, %d, %d)", (...start) => {
    const fit = fitNonlinear(decay(SCATTERED), start);
    expect(numbersIn(fit).every(Number.isFinite)).toBe(true);
    if (fit.status === "converged") {
      expect(fit.rank).toBe(2);
      expect(fit.unscaledCovariance).toBeNull();
    } else expect("message" in fit && fit.message).toMatch(/No step lowers the sum of squares/);
  });

  it("leaves a parameter that changes nothing where it is, and gives no covariance", () => {
    const idle: NonlinearProblem = {
      ...decay(SCATTERED),
      parameters: 4,
      evaluate(theta, residuals, jacobian) {
        jacobian?.[3]?.fill(0);
        return decay(SCATTERED).evaluate(theta, residuals, jacobian?.slice(0, 3) ?? null);
      },
    };
    const fit = solved(fitNonlinear(idle, [1, 0.3, 0, 7]));
    expect(fit.parameters[3]).toBe(7);
    expect(fit.parameters[1]).toBeCloseTo(
      solved(fitNonlinear(decay(SCATTERED), [1, 0.3, 0])).parameters[1] ?? 0,
      11,
    );
    expect(fit.rank).toBe(3);
    expect(fit.unscaledCovariance).toBeNull();
  });

  it("finds one of the answers where two parameters only count by their sum", () => {
    const double: NonlinearProblem = {
      ...decay(SCATTERED),
      parameters: 4,
      evaluate([a = 0, k = 0, c = 0, d = 0], residuals, jacobian) {
        jacobian?.[3]?.fill(1);
        return decay(SCATTERED).evaluate(
          Float64Array.of(a, k, c + d),
          residuals,
          jacobian?.slice(0, 3) ?? null,
        );
      },
    };
    const single = solved(fitNonlinear(decay(SCATTERED), [1, 0.3, 0]));
    const fit = solved(fitNonlinear(double, [1, 0.3, 0, 0.1]));
    expect(fit.rank).toBe(3);
    expect(fit.residualSquares).toBeCloseTo(single.residualSquares, 15);
    expect((fit.parameters[2] ?? 0) + (fit.parameters[3] ?? 0)).toBeCloseTo(single.parameters[2] ?? 0, 10);
  });

  it.each(["refuses", "answers NaN"])("steps back where the model %s", (manner) => {
    const walled: NonlinearProblem = {
      ...decay(SCATTERED),
      evaluate(theta, residuals, jacobian) {
        const inside = (theta[1] ?? 0) < 2.5;
        decay(SCATTERED).evaluate(theta, residuals, jacobian);
        if (!inside) residuals[4] = Number.NaN;
        return inside || manner !== "refuses";
      },
    };
    const fit = fitNonlinear(walled, [40, 0.01, -40]);
    expect(numbersIn(fit).every(Number.isFinite)).toBe(true);
    expect(solved(fit).parameters[1]).toBeCloseTo(2, 1);
  });

  it("says so where derivatives do not belong to the model", () => {
    const wrong: NonlinearProblem = {
      ...decay(SCATTERED),
      evaluate(theta, residuals, jacobian) {
        decay(SCATTERED).evaluate(theta, residuals, jacobian);
        for (const column of jacobian ?? [])
          column.forEach((value, i) => {
            column[i] = -value;
          });
        return true;
      },
    };
    expect(fitNonlinear(wrong, [1, 0.3, 0])).toMatchObject({
      status: "not-converged",
      message: expect.stringContaining("derivatives"),
    });
  });

  it("says so where no parameter changes anything", () => {
    const away: NonlinearProblem = {
      ...decay(SCATTERED),
      evaluate(_theta, residuals, jacobian) {
        residuals.set(SCATTERED);
        for (const column of jacobian ?? []) column.fill(0);
        return true;
      },
    };
    const fit = fitNonlinear(away, [1, 5, 0]);
    expect(fit).toMatchObject({
      status: "not-converged",
      rank: 0,
      message: expect.stringContaining("plateau"),
    });
  });

  it("is not confused by the noise of a model, such as an integrator's tolerance leaves", () => {
    const exact = solved(fitNonlinear(decay(SCATTERED), [1, 0.3, 0]));
    const error = (exact.residualStandardDeviation ?? 0) * Math.sqrt(exact.unscaledCovariance?.[1]?.[1] ?? 0);
    for (const size of [1e-9, 1e-7, 1e-5]) {
      const noisy: NonlinearProblem = {
        ...decay(SCATTERED),
        evaluate(theta, residuals, jacobian) {
          decay(SCATTERED).evaluate(theta, residuals, jacobian);
          const seed = 1e4 * ((theta[0] ?? 0) + 3 * (theta[1] ?? 0) + 7 * (theta[2] ?? 0));
          residuals.forEach((residual, i) => {
            residuals[i] = residual + size * Math.sin(1e8 * seed + 1e3 * i * i);
          });
          return true;
        },
      };
      const fit = solved(fitNonlinear(noisy, [1, 0.3, 0]));
      expect(Math.abs((fit.parameters[1] ?? 0) - (exact.parameters[1] ?? 0))).toBeLessThan(0.01 * error);
    }
  });

  it("stops when it is told to, and when its evaluations are used up", () => {
    expect(fitNonlinear(decay(SCATTERED), [1, 0.3, 0], { shouldStop: () => true }).status).toBe("stopped");
    const short = fitNonlinear(decay(SCATTERED), [1, 0.3, 0], { mostEvaluations: 3 });
    expect(short).toMatchObject({ status: "not-converged", evaluations: 3 });
  });

  it.each([
    ["too few points", decay([1, 2]), [1, 1, 1], "too-few-points", /2 points for 3 parameters/],
    ["a start of another length", decay(SCATTERED), [1, 1], "bad-start", /2 values.*3 parameters/],
    ["a start that is no number", decay(SCATTERED), [1, Number.NaN, 1], "bad-start", /parameter 1 is NaN/],
    [
      "a start out of bounds",
      decay(SCATTERED, [
        [0, 1],
        [0, 1],
        [0, 1],
      ]),
      [0, 2, 0],
      "bad-start",
      /between 0 and 1/,
    ],
    ["a start without a value", decay(SCATTERED), [1, -1e4, 0], "no-value-at-start", /-10000/],
  ] as const)("refuses %s", (_, problem, start, status, sentence) => {
    const fit = fitNonlinear(problem, start);
    expect(fit.status).toBe(status);
    expect("message" in fit && fit.message).toMatch(sentence);
  });
});
