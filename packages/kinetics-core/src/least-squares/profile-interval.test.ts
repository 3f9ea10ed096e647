import { describe, expect, it } from "vitest";
import { fitLinear } from "./fit-linear";
import { fitNonlinear } from "./fit-nonlinear";
import type { NonlinearProblem, NonlinearSolution } from "./nonlinear-problem";
import { profileInterval } from "./profile-interval";

const X = [1, 2, 3, 4, 5, 6, 7, 8];
const Y = [2.3, 3.8, 6.4, 7.7, 10.2, 11.6, 14.3, 15.9];

const line: NonlinearProblem = {
  residuals: X.length,
  parameters: 2,
  evaluate([a = 0, b = 0], residuals, jacobian) {
    X.forEach((x, i) => {
      residuals[i] = a + b * x - (Y[i] ?? 0);
      const row = [1, x];
      jacobian?.forEach((column, j) => {
        column[i] = row[j] ?? 0;
      });
    });
    return true;
  },
};

/** The same line with its slope written as e^s. */
const exponentialSlope: NonlinearProblem = {
  ...line,
  evaluate([a = 0, s = 0], residuals, jacobian) {
    const [, bySlope] = jacobian ?? [];
    line.evaluate(Float64Array.of(a, Math.exp(s)), residuals, jacobian);
    bySlope?.forEach((value, i) => {
      bySlope[i] = value * Math.exp(s);
    });
    return true;
  },
};

function solved(problem: NonlinearProblem, start: readonly number[]): NonlinearSolution {
  const fit = fitNonlinear(problem, start);
  if (fit.status !== "converged") throw new Error(fit.message);
  return fit;
}

describe("a profile interval", () => {
  it("of a linear model is its symmetric t interval", () => {
    const linear = fitLinear([X.map(() => 1), X], Y);
    if (linear.status !== "fitted") throw new Error(linear.message);
    const fit = solved(line, [0, 1]);
    // t(0.975, 6).
    const t = 2.4469118511449692;
    [0, 1].forEach((parameter) => {
      const interval = profileInterval(line, fit, parameter)?.interval;
      const [value, error] = [
        linear.coefficients[parameter] ?? 0,
        linear.standardDeviations?.[parameter] ?? 0,
      ];
      expect(interval?.[0]).toBeCloseTo(value - t * error, 9);
      expect(interval?.[1]).toBeCloseTo(value + t * error, 9);
    });
  });

  it("does not depend on how a parameter is written", () => {
    const plain = profileInterval(line, solved(line, [0, 1]), 1, 0.9)?.interval;
    const logarithm = profileInterval(exponentialSlope, solved(exponentialSlope, [0, 0]), 1, 0.9)?.interval;
    expect(Math.exp(logarithm?.[0] ?? 0)).toBeCloseTo(plain?.[0] ?? Number.NaN, 9);
    expect(Math.exp(logarithm?.[1] ?? 0)).toBeCloseTo(plain?.[1] ?? Number.NaN, 9);
  });

  it("ends at a bound that comes before the limit", () => {
    const bounded = {
      ...line,
      bounds: [
        [-9, 9],
        [0, 1.97],
      ] as const,
    };
    const fit = solved(bounded, [0, 1]);
    expect(profileInterval(bounded, fit, 1)?.high).toEqual({ at: 1.97, kind: "bound" });
  });

  it("is open where a parameter can go on for ever", () => {
    // 1 − 1/(1 + p) rises to 1 and stays there: a p ten times as large is as good.
    const levelling: NonlinearProblem = {
      residuals: 3,
      parameters: 1,
      evaluate([p = 0], residuals, jacobian) {
        [0.8, 1.15, 0.9].forEach((y, i) => {
          residuals[i] = 1 - 1 / (1 + p) - y;
          if (jacobian?.[0]) jacobian[0][i] = 1 / (1 + p) ** 2;
        });
        return 1 + p > 0;
      },
    };
    const profile = profileInterval(levelling, solved(levelling, [1]), 0);
    expect(profile?.high).toEqual({ at: null, kind: "open" });
    expect(profile?.low.kind).toBe("crossed");
    expect(profile?.interval).toBeNull();
  });

  it("is not given without scatter, without freedom, or from a point that is not the least", () => {
    const exact: NonlinearProblem = { ...line, residuals: 2 };
    expect(profileInterval(exact, solved(exact, [0, 1]), 1)).toBeNull();
    const elsewhere = solved(
      {
        ...line,
        bounds: [
          [0, 9],
          [1.5, 1.5],
        ],
      },
      [0, 1.5],
    );
    expect(profileInterval(line, elsewhere, 1)).toBeNull();
    expect(profileInterval(line, { ...solved(line, [0, 1]), residualSquares: 99 }, 0)).toBeNull();
  });
});
