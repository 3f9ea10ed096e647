import type { NonlinearFit, NonlinearProblem, NonlinearSolution } from "./nonlinear-problem";

/** An exponential decay that tests fit from all sides. */

export const TIME = Array.from({ length: 21 }, (_, i) => i / 10);

/** a·e^(−kt) + c against `signal`; `start` and answer as [a, k, c]. */
export function decay(signal: readonly number[], bounds?: NonlinearProblem["bounds"]): NonlinearProblem {
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

export const SCATTERED = TIME.map((t, i) => 3 * Math.exp(-2 * t) + 0.5 + 0.02 * Math.sin(7 * i * i));

export function solved(fit: NonlinearFit): NonlinearSolution {
  if (fit.status !== "converged") throw new Error(`${fit.status}: ${fit.message}`);
  return fit;
}

/** Every number that an answer carries. */
export function numbersIn(value: unknown): number[] {
  if (typeof value === "number") return [value];
  if (value instanceof Float64Array) return Array.from(value);
  return typeof value === "object" && value !== null ? Object.values(value).flatMap(numbersIn) : [];
}
