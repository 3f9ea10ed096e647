import fc from "fast-check";
import { powerEquation } from "kinetics-core/rate-equation";
import { describe, expect, it } from "vitest";
import { courseBand } from "./course-band";
import type { FittedLaw } from "./fitted-law";
import { timeToConversion } from "./time-to-conversion";
import { unknownConcentration } from "./unknown-concentration";

const order = fc.double({ min: -0.5, max: 2.5, noNaN: true });
const amount = fc.double({ min: 1e-4, max: 2, noNaN: true });
const deviation = fc.double({ min: 0, max: 0.5, noNaN: true });

const anyLaw = fc
  .record({
    a: order,
    b: order,
    logRateConstant: fc.double({ min: -15, max: 15, noNaN: true }),
    deviations: fc.tuple(deviation, deviation, deviation),
    correlation: fc.double({ min: -0.5, max: 1, noNaN: true }),
    degreesOfFreedom: fc.constantFrom(null, 1, 4, 30),
    betweenRunStandardDeviation: fc.constantFrom(null, 0, 0.05),
  })
  .map(
    ({ a, b, deviations, correlation, ...rest }): FittedLaw => ({
      equation: powerEquation(["A", "B"]),
      parameters: [a, b],
      covariance: deviations.map((u, i) => deviations.map((w, j) => u * w * (i === j ? 1 : correlation))),
      studied: { A: [1e-3, 1], B: [1e-3, 1] },
      level: 0.95,
      ...rest,
    }),
  );

const anyMixture = fc.tuple(amount, amount, fc.constantFrom(-1, -2, 0, 1)).map(([A, B, number]) => ({
  concentrations: { A, B },
  stoichiometricNumbers: { A: -1, B: number },
}));

function numbersIn(value: unknown): readonly number[] {
  if (typeof value === "number") return [value];
  return typeof value === "object" && value !== null ? Object.values(value).flatMap(numbersIn) : [];
}

const finiteNumbers = (value: unknown) => numbersIn(value).every((number) => Number.isFinite(number));

describe("predictions of any power law", () => {
  it("hold no number that is not finite, and no concentration below zero, and never turn back", () => {
    fc.assert(
      fc.property(anyLaw, anyMixture, (law, mixture) => {
        const times = [0, 1e-3, 1, 30, 1e4, 1e8];
        const band = courseBand(law, mixture, times);
        expect(finiteNumbers(band)).toBe(true);
        if (band.status !== "predicted") return;
        let last = 0;
        for (const { extent, concentrations } of band.points) {
          expect(extent.value).toBeGreaterThanOrEqual(last);
          last = extent.value;
          const all = Object.values(concentrations).flatMap(numbersIn);
          expect(Math.min(...all)).toBeGreaterThanOrEqual(0);
          expect(extent.ofTheLaw === null).toBe(law.degreesOfFreedom === null);
        }
      }),
      { numRuns: 60 },
    );
  });

  it("times grow with conversion, and an interval contains its estimate", () => {
    fc.assert(
      fc.property(anyLaw, anyMixture, fc.double({ min: 0.01, max: 0.98, noNaN: true }), (law, mixture, x) => {
        const [sooner, later] = [timeToConversion(law, mixture, x), timeToConversion(law, mixture, x + 0.01)];
        expect(finiteNumbers([sooner, later])).toBe(true);
        if (sooner.status !== "predicted" || later.status !== "predicted") return;
        const [first, second] = [sooner.ofTheLaw.estimate, later.ofTheLaw.estimate];
        if (first !== null && second !== null) expect(second).toBeGreaterThan(first);
        const { interval, estimate } = sooner.ofTheLaw;
        if (interval !== null && estimate !== null) {
          expect(interval[0]).toBeLessThanOrEqual(estimate);
          expect(interval[1]).toBeGreaterThanOrEqual(estimate);
        }
      }),
      { numRuns: 100 },
    );
  });

  it("scale with the units of time and concentration exactly as k's unit says", () => {
    fc.assert(
      fc.property(
        anyLaw,
        anyMixture,
        fc.constantFrom(60, 3600),
        fc.constantFrom(1e-3, 1e3),
        (law, mixture, seconds, factor) => {
          // c in units of 1/factor, t in units of `seconds`: k becomes k·factor^(1 − n)·seconds.
          const [a = 0, b = 0] = law.parameters;
          const bare = { ...law, covariance: null };
          const rescaled = {
            ...bare,
            logRateConstant: law.logRateConstant + (1 - a - b) * Math.log(factor) + Math.log(seconds),
          };
          const concentrations = {
            A: mixture.concentrations.A * factor,
            B: mixture.concentrations.B * factor,
          };
          const one = timeToConversion(bare, mixture, 0.4, "A");
          const other = timeToConversion(rescaled, { ...mixture, concentrations }, 0.4, "A");
          expect(one.status).toBe(other.status);
          if (one.status !== "predicted" || other.status !== "predicted") return;
          expect(other.logTime.logarithm).toBeCloseTo(one.logTime.logarithm - Math.log(seconds), 7);
        },
      ),
      { numRuns: 100 },
    );
  });

  it("do not depend on the order of the species in the law", () => {
    fc.assert(
      fc.property(anyLaw, anyMixture, (law, mixture) => {
        const [a = 0, b = 0] = law.parameters;
        const turned = [0, 2, 1];
        const other: FittedLaw = {
          ...law,
          equation: powerEquation(["B", "A"]),
          parameters: [b, a],
          covariance: turned.map((i) => turned.map((j) => law.covariance?.[i]?.[j] ?? 0)),
        };
        const [one, two] = [timeToConversion(law, mixture, 0.3), timeToConversion(other, mixture, 0.3)];
        if (one.status !== "predicted" || two.status !== "predicted") {
          expect(two.status).toBe(one.status);
          return;
        }
        expect(two.logTime.logarithm).toBeCloseTo(one.logTime.logarithm, 9);
        expect(two.logTime.variance).toBeCloseTo(Number(one.logTime.variance), 8);
      }),
      { numRuns: 60 },
    );
  });

  it("an unknown read back from the rate at any concentration is that concentration", () => {
    fc.assert(
      fc.property(anyLaw, amount, amount, deviation, (law, A, B, relative) => {
        const [a = 0, b = 0] = law.parameters;
        fc.pre(Math.abs(a) > 1e-3);
        const rate = Math.exp(law.logRateConstant + a * Math.log(A) + b * Math.log(B));
        const found = unknownConcentration(law, {
          species: "A",
          concentrations: { B: { value: B, relative } },
          rate,
          relative,
        });
        expect(finiteNumbers(found)).toBe(true);
        if (found.status !== "found") throw new Error(found.message);
        expect(Number(found.concentration.estimate) / A).toBeCloseTo(1, 8);
        const { interval } = found.concentration;
        if (interval !== null)
          expect(interval[0] <= A * (1 + 1e-9) && A <= interval[1] * (1 + 1e-9)).toBe(true);
      }),
      { numRuns: 200 },
    );
  });
});
