import fc from "fast-check";
import { expect, it } from "vitest";
import {
  clusterRobust,
  marginalSquares,
  pooledInference,
  type RunInformation,
  randomRateInference,
} from "./index";

/** Readings have three digits: what is smaller is 0. */
const part = fc.integer({ min: -1000, max: 1000 }).map((whole) => whole / 1000);

/** A run of 3 parameters from random derivatives and residuals of any size, some of them empty. */
const run = fc
  .record({
    size: fc.double({ min: -8, max: 8, noNaN: true }),
    derivatives: fc.array(fc.tuple(...[0, 1, 2].map(() => part)), {
      minLength: 4,
      maxLength: 8,
    }),
    residuals: fc.array(part, { minLength: 8, maxLength: 8 }),
    autocorrelation: fc.double({ min: 0, max: 0.97, noNaN: true }),
    blind: fc.boolean(),
  })
  .map(({ size, derivatives, residuals, autocorrelation, blind }): Omit<RunInformation, "label"> => {
    const scale = 10 ** size;
    const rows = derivatives.map((row) => row.map((value, k) => (blind && k === 0 ? 0 : value * scale)));
    const noise = residuals.slice(0, rows.length).map((value) => 0.1 * value * scale);
    const sum = (f: (row: readonly number[], i: number) => number) =>
      rows.reduce((total, row, i) => total + f(row, i), 0);
    return {
      gram: Float64Array.from({ length: 9 }, (_, place) =>
        sum((row) => (row[Math.floor(place / 3)] ?? 0) * (row[place % 3] ?? 0)),
      ),
      gradient: Float64Array.from({ length: 3 }, (_, k) => sum((row, i) => (row[k] ?? 0) * (noise[i] ?? 0))),
      residualSquares: noise.reduce((total, value) => total + value ** 2, 0),
      points: rows.length,
      degreesOfFreedom: rows.length,
      autocorrelation,
    };
  });

const study = fc
  .array(run, { minLength: 1, maxLength: 7 })
  .map((runs) => runs.map((one, j): RunInformation => ({ label: `R${j + 1}`, ...one })));
const priors = [{ parameter: 2, deviation: 0.01, standardUncertainty: 0.02 }];
const options = { undetermined: 2 };

function everyNumberIsFinite(value: unknown): boolean {
  if (typeof value === "number") return Number.isFinite(value);
  if (ArrayBuffer.isView(value)) return everyNumberIsFinite(Array.from(value as Float64Array));
  if (value !== null && typeof value === "object") return Object.values(value).every(everyNumberIsFinite);
  return true;
}

it("lets no NaN out, whatever the runs", () => {
  fc.assert(
    fc.property(study, (runs) => {
      const inference = randomRateInference(runs, priors, options);
      expect(everyNumberIsFinite(inference)).toBe(true);
      expect(everyNumberIsFinite(pooledInference(runs, priors))).toBe(true);
      if (inference.status !== "determined") return;
      expect(everyNumberIsFinite(clusterRobust(runs, priors, inference, []))).toBe(true);
      expect(everyNumberIsFinite(marginalSquares(runs, priors, inference))).toBe(true);
      expect(inference.betweenRunVariance).toBeGreaterThanOrEqual(0);
    }),
    { numRuns: 300, seed: 1 },
  );
});

it("does not depend on the order of the runs", () => {
  fc.assert(
    fc.property(study, (runs) => {
      const one = randomRateInference(runs, priors, options);
      const other = randomRateInference([...runs].reverse(), priors, options);
      expect(other.status).toBe(one.status);
      if (one.status !== "determined" || other.status !== "determined") return;
      expect(Math.abs(other.restrictedDeviance - one.restrictedDeviance)).toBeLessThan(
        1e-6 * (1 + Math.abs(one.restrictedDeviance)),
      );
      one.step.forEach((value, i) => {
        const error = Math.sqrt(one.covariance[i]?.[i] ?? 0);
        expect(Math.abs((other.step[i] ?? Number.NaN) - value)).toBeLessThan(1e-4 * error);
      });
      expect([...other.runs].reverse().map((run) => run.label)).toEqual(one.runs.map((run) => run.label));
    }),
    { numRuns: 200, seed: 2 },
  );
});

it("does not depend on the unit of the signal", () => {
  fc.assert(
    fc.property(study, fc.integer({ min: -6, max: 6 }), (runs, power) => {
      // A power of two scales without rounding, so that even ill-conditioned studies must agree.
      const factor = 4 ** power;
      const scaled = runs.map((one) => ({
        ...one,
        gram: one.gram.map((value) => value * factor),
        gradient: one.gradient.map((value) => value * factor),
        residualSquares: one.residualSquares * factor,
      }));
      const plain = randomRateInference(runs, priors, options);
      const other = randomRateInference(scaled, priors, options);
      expect(other.status).toBe(plain.status);
      if (plain.status !== "determined" || other.status !== "determined") return;
      expect(other.betweenRunVariance).toBe(plain.betweenRunVariance);
      expect(Array.from(other.step)).toEqual(Array.from(plain.step));
      expect(other.covariance).toEqual(plain.covariance);
    }),
    { numRuns: 200, seed: 3 },
  );
});
