import { describe, expect, it } from "vitest";
import { fitNonlinear } from "./fit-nonlinear";
import type { NonlinearProblem, NonlinearSolution } from "./nonlinear-problem";
import { secondOpinion } from "./second-opinion";

const TIME = Array.from({ length: 30 }, (_, i) => i / 10);
const SCATTERED = TIME.map((t, i) => 4e-5 * Math.exp(-300 * t * 0.01) + 1e-6 * Math.sin(5 * i * i));

/** a·e^(−kt) with a some 1e-5 and k some 3: sizes that a plain damping would not survive. */
function decay(signal: readonly number[], bounds?: NonlinearProblem["bounds"]): NonlinearProblem {
  return {
    residuals: signal.length,
    parameters: 2,
    ...(bounds && { bounds }),
    evaluate([a = 0, k = 0], residuals, jacobian) {
      signal.forEach((y, i) => {
        const t = TIME[i] ?? 0;
        const rest = Math.exp(-k * t);
        residuals[i] = a * rest - y;
        const row = [rest, -a * t * rest];
        jacobian?.forEach((column, j) => {
          column[i] = row[j] ?? 0;
        });
      });
      return k > -50;
    },
  };
}

function solved(problem: NonlinearProblem, start: readonly number[]): NonlinearSolution {
  const fit = fitNonlinear(problem, start);
  if (fit.status !== "converged") throw new Error(fit.message);
  return fit;
}

/** A solution that is none: the point with its sum of squares, as an optimiser that stopped early would give it. */
function impostor(problem: NonlinearProblem, at: readonly number[]): NonlinearSolution {
  const parameters = Float64Array.from(at);
  const residuals = new Float64Array(problem.residuals);
  problem.evaluate(parameters, residuals, null);
  const residualSquares = residuals.reduce((sum, r) => sum + r * r, 0);
  const residualStandardDeviation = Math.sqrt(residualSquares / (problem.residuals - 2));
  return { ...solved(problem, at), parameters, residuals, residualSquares, residualStandardDeviation };
}

describe("a second opinion", () => {
  it("agrees with a fit from its neighbourhood and from the fit's own start", () => {
    const problem = decay(SCATTERED);
    const fit = solved(problem, [1e-5, 1]);
    for (const options of [{}, { start: [1e-5, 1] }]) {
      const opinion = secondOpinion(problem, fit, options);
      expect(opinion).toMatchObject({
        status: "agrees",
        message: expect.stringMatching(/agree to \d+ digits/),
      });
      expect("digits" in opinion && opinion.digits).toBeGreaterThan(6);
    }
  });

  it("says so when it finds a smaller sum of squares", () => {
    const problem = decay(SCATTERED);
    const opinion = secondOpinion(problem, impostor(problem, [4e-5, 3.3]));
    expect(opinion).toMatchObject({
      status: "better",
      message: expect.stringContaining("smaller sum of squares"),
    });
    expect("parameters" in opinion && opinion.parameters[1]).toBeCloseTo(
      solved(problem, [1e-5, 1]).parameters[1] ?? 0,
      5,
    );
  });

  it("knows of bounds and of parameters that they fix", () => {
    for (const bounds of [
      [
        [0, 1],
        [0, 2.5],
      ],
      [
        [0, 1],
        [2.5, 2.5],
      ],
    ] as const) {
      const problem = decay(SCATTERED, bounds);
      const fit = solved(problem, [1e-5, 2.5]);
      const opinion = secondOpinion(problem, fit);
      expect(opinion.status).toBe("agrees");
      expect("parameters" in opinion && opinion.parameters[1]).toBe(2.5);
    }
  });

  it("works where the data are met exactly", () => {
    const problem = decay(TIME.map((t) => 3e-5 * Math.exp(-2 * t)));
    expect(secondOpinion(problem, solved(problem, [1e-5, 1])).status).toBe("agrees");
    const two: NonlinearProblem = { ...problem, residuals: 2 };
    expect(secondOpinion(two, solved(two, [1e-5, 1])).status).toBe("agrees");
  });

  it.each([
    ["a start without a value", { start: [1e-5, -90] }, /no finite value/],
    ["a start of another length", { start: [1] }, /1 values.*2 parameters/],
    ["a stop", { shouldStop: () => true }, /stopped/],
    ["a start too far away", { start: [1e-5, 4000] }, /second optimiser/],
  ])("does not arrive after %s", (_, options, sentence) => {
    const problem = decay(SCATTERED);
    const opinion = secondOpinion(problem, solved(problem, [1e-5, 1]), options);
    expect(opinion).toMatchObject({ status: "not-arrived", message: expect.stringMatching(sentence) });
  });
});
