import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { fitNonlinear } from "./fit-nonlinear";
import type { NonlinearProblem } from "./nonlinear-problem";
import { profileInterval } from "./profile-interval";
import { secondOpinion } from "./second-opinion";
import { numbersIn, solved } from "./simulated-decay";
import { standardErrorsOf } from "./solution-uncertainty";

interface Point {
  readonly x: number;
  readonly y: number;
}

/** y = a·e^(−kx) + c. */
function decay(points: readonly Point[]): NonlinearProblem {
  return {
    residuals: points.length,
    parameters: 3,
    evaluate([a = 0, k = 0, c = 0], residuals, jacobian) {
      points.forEach(({ x, y }, i) => {
        const rest = Math.exp(-k * x);
        residuals[i] = a * rest + c - y;
        const row = [rest, -a * x * rest, 1];
        jacobian?.forEach((column, j) => {
          column[i] = row[j] ?? 0;
        });
      });
      return true;
    },
  };
}

const fittedTo = (problem: NonlinearProblem, start: readonly number[]) =>
  solved(fitNonlinear(problem, start));

const between = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const power = between(-9, 9).map((exponent) => 10 ** exponent);

const trace = fc
  .record({ k: between(0.5, 3), errors: fc.array(between(-0.02, 0.02), { minLength: 15, maxLength: 15 }) })
  .map(({ k, errors }) =>
    errors.map((error, i) => ({
      x: i / 5,
      y: Math.exp(-k * (i / 5)) + 0.3 + error + 0.005 * Math.sin(7 * i * i),
    })),
  );

describe("any nonlinear fit", () => {
  it("scales with the units of its data, standard errors included", () => {
    fc.assert(
      fc.property(trace, power, power, (points, byX, byY) => {
        const plain = fittedTo(decay(points), [0.7, 1, 0]);
        const scaled = fittedTo(decay(points.map(({ x, y }) => ({ x: x * byX, y: y * byY }))), [
          0.7 * byY,
          1 / byX,
          0,
        ]);
        const [errors, scaledErrors] = [standardErrorsOf(plain), standardErrorsOf(scaled)];
        [byY, 1 / byX, byY].forEach((factor, j) => {
          expect((scaled.parameters[j] ?? 0) / factor).toBeCloseTo(plain.parameters[j] ?? Number.NaN, 9);
          expect((scaledErrors?.[j] ?? 0) / factor).toBeCloseTo(errors?.[j] ?? Number.NaN, 9);
        });
      }),
      { numRuns: 100, seed: 11 },
    );
  });

  it("is the same for points in another order", () => {
    const order = fc.shuffledSubarray(
      Array.from({ length: 15 }, (_, i) => i),
      { minLength: 15 },
    );
    fc.assert(
      fc.property(trace, order, (points, places) => {
        const plain = fittedTo(decay(points), [0.7, 1, 0]);
        const shuffled = fittedTo(decay(places.flatMap((place) => points[place] ?? [])), [0.7, 1, 0]);
        plain.parameters.forEach((value, j) => {
          expect(shuffled.parameters[j]).toBeCloseTo(value, 10);
        });
      }),
      { numRuns: 100, seed: 12 },
    );
  });

  it("never gives a number that is none, wherever it starts and whatever the points", () => {
    const anywhere = fc.array(fc.record({ x: between(-50, 50), y: between(-1e9, 1e9) }), {
      minLength: 1,
      maxLength: 8,
    });
    fc.assert(
      fc.property(
        anywhere,
        fc.tuple(between(-1e6, 1e6), between(-20, 20), between(-1e6, 1e6)),
        (points, start) => {
          const problem = decay(points);
          const fit = fitNonlinear(problem, start, { mostEvaluations: 300 });
          expect(numbersIn(fit).every(Number.isFinite)).toBe(true);
          if (fit.status !== "converged") return;
          expect(numbersIn(profileInterval(problem, fit, 1)).every(Number.isFinite)).toBe(true);
          expect(numbersIn(secondOpinion(problem, fit)).every(Number.isFinite)).toBe(true);
        },
      ),
      { numRuns: 40, seed: 13 },
    );
  });

  it("within bounds never leaves them and never does better than without", () => {
    fc.assert(
      fc.property(trace, between(0.1, 4), between(0.1, 4), (points, one, other) => {
        const [low, high] = [Math.min(one, other), Math.max(one, other)];
        const problem = decay(points);
        const asked: number[] = [];
        const bounded: NonlinearProblem = {
          ...problem,
          bounds: [
            [0, 2],
            [low, high],
            [0, 1],
          ],
          evaluate(theta, residuals, jacobian) {
            asked.push(theta[1] ?? Number.NaN);
            return problem.evaluate(theta, residuals, jacobian);
          },
        };
        const fit = fittedTo(bounded, [1, low, 0.5]);
        expect(asked.every((k) => k >= low && k <= high)).toBe(true);
        const best = fittedTo(problem, [0.7, 1, 0]).residualSquares;
        expect(fit.residualSquares).toBeGreaterThanOrEqual(best * (1 - 1e-12));
        if (!fit.held.some(Boolean)) expect(fit.residualSquares).toBeCloseTo(best, 12);
      }),
      { numRuns: 100, seed: 14 },
    );
  });
});
