import {
  fitLinear,
  fitNonlinear,
  type NonlinearProblem,
  powersOf,
  secondOpinion,
} from "kinetics-core/least-squares";
import { describe, expect, it } from "vitest";
import fixture from "./nist-strd.fixture.json";
import { STRD_MODELS, type StrdModel } from "./nist-strd-models";

type StrdSet = (typeof fixture.sets)[number];
const nonlinear = fixture.sets.filter((set) => set.kind === "nonlinear");

function modelOf({ name }: StrdSet): StrdModel {
  const model = STRD_MODELS[name];
  if (!model) throw new Error(`no model for ${name}`);
  return model;
}

function problemOf(set: StrdSet): NonlinearProblem {
  const model = modelOf(set);
  const by = new Float64Array(set.certified.length);
  const response = set.data.map(([y = 0]) => (set.transform === "log(y)" ? Math.log(y) : y));
  return {
    residuals: set.data.length,
    parameters: set.certified.length,
    evaluate(theta, residuals, jacobian) {
      set.data.forEach(([, x = 0, z = 0], i) => {
        residuals[i] = model(theta, x, z, by) - (response[i] ?? 0);
        jacobian?.forEach((column, j) => {
          column[i] = by[j] ?? 0;
        });
      });
      return true;
    },
  };
}

/** Digits in which two lists agree, by the worst of their elements. */
function digits(found: readonly number[], certified: readonly (number | undefined)[]): number {
  const worst = certified.map((value = Number.NaN, j) =>
    Math.min(15, -Math.log10(Math.abs(((found[j] ?? Number.NaN) - value) / value) || 1e-15)),
  );
  return Math.min(...worst);
}

/** What is asked of every set and start; the certified figures have 11 digits themselves. */
const LEAST_DIGITS = 10;
/** MGH17 from its first start takes longest, 271; Bennett5 took 1024 before long descents were bent. */
const MOST_EVALUATIONS = 300;
/** Linear sets are certified to 15. */
const LEAST_LINEAR_DIGITS = 13;

describe("certified nonlinear sets (NIST StRD)", () => {
  it("are there all: 23 sets with two starts each", () => {
    expect(nonlinear.flatMap((set) => set.starts ?? [])).toHaveLength(46);
  });

  it.each(nonlinear)("$name: the model has the derivatives that it says", (set) => {
    const model = modelOf(set);
    const [by, other] = [new Float64Array(set.certified.length), new Float64Array(set.certified.length)];
    for (const [, x = 0, z = 0] of [set.data[0], set.data[set.data.length >> 1], set.data.at(-1)].map(
      (row) => row ?? [],
    )) {
      model(set.certified, x, z, by);
      set.certified.forEach((value, j) => {
        const step = 1e-5 * Math.abs(value);
        const at = (shift: number) =>
          model(
            set.certified.map((b, i) => (i === j ? b + shift : b)),
            x,
            z,
            other,
          );
        const difference = (8 * (at(step) - at(-step)) - (at(2 * step) - at(-2 * step))) / (12 * step);
        const rounding = (1e-13 * Math.abs(at(0))) / step;
        expect(Math.abs((by[j] ?? Number.NaN) - difference)).toBeLessThan(
          1e-8 * Math.abs(difference) + rounding,
        );
      });
    }
  });

  const starts = nonlinear.flatMap((set) =>
    (set.starts ?? []).map((start, k) => ({ set, start, name: set.name, k: k + 1 })),
  );
  it.each(starts)("$name from start $k", ({ set, start }) => {
    const fit = fitNonlinear(problemOf(set), start);
    if (fit.status !== "converged") throw new Error(fit.message);
    const scatter = fit.residualStandardDeviation ?? Number.NaN;
    const deviations =
      fit.unscaledCovariance?.map((row, j) => scatter * Math.sqrt(row[j] ?? Number.NaN)) ?? [];
    expect(fit.degreesOfFreedom).toBe(set.degreesOfFreedom);
    expect(fit.evaluations).toBeLessThan(MOST_EVALUATIONS);
    expect(digits([scatter], [set.residualDeviation])).toBeGreaterThan(LEAST_DIGITS);
    expect(digits(Array.from(fit.parameters), set.certified)).toBeGreaterThan(LEAST_DIGITS);
    expect(digits(deviations, set.certifiedDeviations)).toBeGreaterThan(LEAST_DIGITS);
  });
});

describe("a second optimiser on the certified nonlinear sets", () => {
  it("agrees with every fit that it arrives at, and never finds a better one", () => {
    const opinions = nonlinear.flatMap((set) =>
      (set.starts ?? []).map((start) => {
        const fit = fitNonlinear(problemOf(set), start);
        if (fit.status !== "converged") throw new Error(fit.message);
        return { name: set.name, opinion: secondOpinion(problemOf(set), fit) };
      }),
    );
    for (const { opinion } of opinions) {
      expect(opinion.status).not.toBe("better");
      if (opinion.status === "agrees") expect(opinion.digits).toBeGreaterThan(6);
    }
    // One standard error away, the exponent of Nelson and the cubics of Thurber are out of its reach.
    const missing = opinions
      .filter(({ opinion }) => opinion.status === "not-arrived")
      .map(({ name }) => name);
    expect(missing.filter((name) => name !== "Nelson" && name !== "Thurber")).toEqual([]);
    expect(missing.length).toBeLessThanOrEqual(4);
  });
});

function designOf({ name, data, certified }: StrdSet) {
  const column = (j: number) => data.map((row) => row[j] ?? Number.NaN);
  const ones = data.map(() => 1);
  if (name.startsWith("NoInt")) return [column(1)];
  if (name === "Longley") return [ones, ...[1, 2, 3, 4, 5, 6].map(column)];
  return powersOf(column(1), certified.length - 1);
}

describe("certified linear sets (NIST StRD)", () => {
  const linear = fixture.sets.filter((set) => set.kind === "linear");
  it.each(linear)("$name", (set) => {
    const fit = fitLinear(
      designOf(set),
      set.data.map(([y = 0]) => y),
    );
    if (fit.status !== "fitted") throw new Error(fit.message);
    expect(fit.degreesOfFreedom).toBe(set.degreesOfFreedom);
    expect(digits(Array.from(fit.coefficients), set.certified)).toBeGreaterThan(LEAST_LINEAR_DIGITS);
    for (const [found, certified] of [
      [fit.standardDeviations ?? [], set.certifiedDeviations],
      [[fit.residualStandardDeviation ?? Number.NaN], [set.residualDeviation]],
      [[fit.rSquared ?? Number.NaN], [set.rSquared]],
    ] as const) {
      if (certified.every((value) => value === 0)) expect(Math.max(...found)).toBeLessThan(1e-15);
      else expect(digits(found, certified)).toBeGreaterThan(LEAST_LINEAR_DIGITS);
    }
  });

  it("loses digits of Filip only where the powers themselves were rounded", () => {
    const set = linear.find(({ name }) => name === "Filip");
    if (!set) throw new Error("no set Filip in the fixture");
    const rounded = set.certified.map((_, k) => set.data.map(([, x = 0]) => x ** k));
    const fit = fitLinear(
      rounded,
      set.data.map(([y = 0]) => y),
    );
    if (fit.status !== "fitted") throw new Error(fit.message);
    expect(digits(Array.from(fit.coefficients), set.certified)).toBeGreaterThan(7);
    expect(digits(fit.standardDeviations ?? [], set.certifiedDeviations)).toBeGreaterThan(7);
  });
});
