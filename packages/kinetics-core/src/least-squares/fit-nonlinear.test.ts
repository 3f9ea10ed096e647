import { describe, expect, it } from "vitest";
import { fitNonlinear } from "./fit-nonlinear";
import type { NonlinearFit, NonlinearProblem, NonlinearSolution } from "./nonlinear-problem";

const TIME = Array.from({ length: 21 }, (_, i) => i / 10);

/** a·e^(−kt) + c against `signal`; `start` and answer as [a, k, c]. */
function decay(signal: readonly number[], bounds?: NonlinearProblem["bounds"]): NonlinearProblem {
  return {
    residuals: signal.length,
    parameters: 3,
    ...(bounds && { bounds }),
    evaluate([a = 0, k = 0, c = 0], residuals, jacobian) {
      signal.forEach((y, i) => {
        const t = TIME[i] ?? 0;
        const rest = Math.exp(-k * t);
        residuals[i] = a * rest + c - y;
        const row = [rest, -a * t * rest, 1];
        jacobian?.forEach((column, j) => {
          column[i] = row[j] ?? 0;
        });
      });
      return true;
    },
  };
}

const scattered = TIME.map((t, i) => 3 * Math.exp(-2 * t) + 0.5 + 0.02 * Math.sin(7 * i * i));

function solved(fit: NonlinearFit): NonlinearSolution {
  if (fit.status !== "converged") throw new Error(`${fit.status}: ${fit.message}`);
  return fit;
}

/** Every number that an answer carries. */
function numbersIn(value: unknown): number[] {
  if (typeof value === "number") return [value];
  if (value instanceof Float64Array) return Array.from(value);
  return typeof value === "object" && value !== null ? Object.values(value).flatMap(numbersIn) : [];
}

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
    const problem = decay(scattered);
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
    const plain = solved(fitNonlinear(decay(scattered), [1, 0.3, 0]));
    const scaled = solved(fitNonlinear(decay(scattered.map((y) => y * 2 ** 40)), [2 ** 40, 0.3, 0]));
    expect(scaled.parameters[1]).toBe(plain.parameters[1]);
    expect(scaled.evaluations).toBe(plain.evaluations);
  });

  it("takes as many points as parameters, and then gives no scatter", () => {
    const fit = solved(fitNonlinear(decay(scattered.slice(0, 3)), [1, 0.3, 0]));
    expect(fit.residualSquares).toBeLessThan(1e-28);
    expect(fit.degreesOfFreedom).toBe(0);
    expect(fit.residualStandardDeviation).toBeNull();
  });

  it.each([
    [-5, 30, 5],
    [1e6, 1e-6, -1e6],
    [3, 40, 0],
  ])("comes back from a start at (%d, %d, %d)", (...start) => {
    const fit = fitNonlinear(decay(scattered), start);
    expect(numbersIn(fit).every(Number.isFinite)).toBe(true);
    expect(solved(fit).parameters[1]).toBeCloseTo(2, 1);
  });
});

describe("bounds of a nonlinear fit", () => {
  it("hold a parameter that the data would push out, and fit the others for it", () => {
    const bounded = solved(
      fitNonlinear(
        decay(scattered, [
          [-9, 9],
          [0, 1.5],
          [-9, 9],
        ]),
        [1, 0.3, 0],
      ),
    );
    const fixed = solved(
      fitNonlinear(
        decay(scattered, [
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
        decay(scattered, [
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
    const free = solved(fitNonlinear(decay(scattered), [1, 0.3, 0]));
    const bounded = solved(
      fitNonlinear(
        decay(scattered, [
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
    const problem = decay(scattered, [
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

describe("a nonlinear fit in difficulty", () => {
  it.each([
    [3, 400, 0],
    [0.001, 0.001, 100],
  ])("never calls a plateau an answer with an error: start at (%d, %d, %d)", (...start) => {
    const fit = fitNonlinear(decay(scattered), start);
    expect(numbersIn(fit).every(Number.isFinite)).toBe(true);
    if (fit.status === "converged") {
      expect(fit.rank).toBe(2);
      expect(fit.unscaledCovariance).toBeNull();
    } else expect("message" in fit && fit.message).toMatch(/No step lowers the sum of squares/);
  });

  it("leaves a parameter that changes nothing where it is, and gives no covariance", () => {
    const idle: NonlinearProblem = {
      ...decay(scattered),
      parameters: 4,
      evaluate(theta, residuals, jacobian) {
        jacobian?.[3]?.fill(0);
        return decay(scattered).evaluate(theta, residuals, jacobian?.slice(0, 3) ?? null);
      },
    };
    const fit = solved(fitNonlinear(idle, [1, 0.3, 0, 7]));
    expect(fit.parameters[3]).toBe(7);
    expect(fit.parameters[1]).toBeCloseTo(
      solved(fitNonlinear(decay(scattered), [1, 0.3, 0])).parameters[1] ?? 0,
      11,
    );
    expect(fit.rank).toBe(3);
    expect(fit.unscaledCovariance).toBeNull();
  });

  it("finds one of the answers where two parameters only count by their sum", () => {
    const double: NonlinearProblem = {
      ...decay(scattered),
      parameters: 4,
      evaluate([a = 0, k = 0, c = 0, d = 0], residuals, jacobian) {
        jacobian?.[3]?.fill(1);
        return decay(scattered).evaluate(
          Float64Array.of(a, k, c + d),
          residuals,
          jacobian?.slice(0, 3) ?? null,
        );
      },
    };
    const single = solved(fitNonlinear(decay(scattered), [1, 0.3, 0]));
    const fit = solved(fitNonlinear(double, [1, 0.3, 0, 0.1]));
    expect(fit.rank).toBe(3);
    expect(fit.residualSquares).toBeCloseTo(single.residualSquares, 15);
    expect((fit.parameters[2] ?? 0) + (fit.parameters[3] ?? 0)).toBeCloseTo(single.parameters[2] ?? 0, 10);
  });

  it.each(["refuses", "answers NaN"])("steps back where the model %s", (manner) => {
    const walled: NonlinearProblem = {
      ...decay(scattered),
      evaluate(theta, residuals, jacobian) {
        const inside = (theta[1] ?? 0) < 2.5;
        decay(scattered).evaluate(theta, residuals, jacobian);
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
      ...decay(scattered),
      evaluate(theta, residuals, jacobian) {
        decay(scattered).evaluate(theta, residuals, jacobian);
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
      ...decay(scattered),
      evaluate(_theta, residuals, jacobian) {
        residuals.set(scattered);
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
    const exact = solved(fitNonlinear(decay(scattered), [1, 0.3, 0]));
    const error = (exact.residualStandardDeviation ?? 0) * Math.sqrt(exact.unscaledCovariance?.[1]?.[1] ?? 0);
    for (const size of [1e-9, 1e-7, 1e-5]) {
      const noisy: NonlinearProblem = {
        ...decay(scattered),
        evaluate(theta, residuals, jacobian) {
          decay(scattered).evaluate(theta, residuals, jacobian);
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
    expect(fitNonlinear(decay(scattered), [1, 0.3, 0], { shouldStop: () => true }).status).toBe("stopped");
    const short = fitNonlinear(decay(scattered), [1, 0.3, 0], { mostEvaluations: 3 });
    expect(short).toMatchObject({ status: "not-converged", evaluations: 3 });
  });

  it.each([
    ["too few points", decay([1, 2]), [1, 1, 1], "too-few-points", /2 points for 3 parameters/],
    ["a start of another length", decay(scattered), [1, 1], "bad-start", /2 values.*3 parameters/],
    ["a start that is no number", decay(scattered), [1, Number.NaN, 1], "bad-start", /parameter 1 is NaN/],
    [
      "a start out of bounds",
      decay(scattered, [
        [0, 1],
        [0, 1],
        [0, 1],
      ]),
      [0, 2, 0],
      "bad-start",
      /between 0 and 1/,
    ],
    ["a start without a value", decay(scattered), [1, -1e4, 0], "no-value-at-start", /-10000/],
  ] as const)("refuses %s", (_, problem, start, status, sentence) => {
    const fit = fitNonlinear(problem, start);
    expect(fit.status).toBe(status);
    expect("message" in fit && fit.message).toMatch(sentence);
  });
});
