import {
  fitNonlinear,
  type NonlinearProblem,
  type NonlinearSolution,
  profileInterval,
  standardErrorsOf,
} from "kinetics-core/least-squares";
import { fitSaturation, type SaturationFit } from "kinetics-core/saturation";
import { describe, expect, it } from "vitest";
import fixture from "./saturation.fixture.json";

interface RateSet {
  readonly id: string;
  readonly data: readonly (readonly number[])[];
  readonly computed: readonly Computed[];
  readonly published?: {
    readonly estimates: readonly number[];
    readonly standardErrors: readonly number[];
    readonly profile95: readonly (readonly number[])[] | null;
    readonly residualStandardDeviation: number | null;
  };
  readonly fTest?: { readonly F: number };
}

interface Computed {
  readonly estimates: readonly number[];
  readonly standardErrors: readonly number[];
  readonly residualStandardDeviation: number;
  readonly degreesOfFreedom: number;
  readonly residualSquares: number;
  readonly correlation: readonly (readonly number[])[];
  readonly profile95: readonly (readonly number[])[] | null;
  readonly lackOfFit: { readonly fStatistic: number; readonly pValue: number } | null;
}

const sets: readonly RateSet[] = fixture.sets;

function setOf(id: string): RateSet {
  const set = sets.find((one) => one.id === id);
  if (!set) throw new Error(`no set ${id} in the fixture`);
  return set;
}

const columnOf = ({ data }: RateSet, j: number) => data.map((row) => row[j] ?? Number.NaN);

function saturationOf(set: RateSet): SaturationFit {
  const fit = fitSaturation({ concentrations: columnOf(set, 0), rates: columnOf(set, 1) });
  if (fit.status !== "fitted") throw new Error(fit.message);
  return fit;
}

/** Digits in which two numbers agree. */
function digits(found: number | null | undefined, printed: number | null | undefined): number {
  return -Math.log10(Math.abs(Number(found) / Number(printed) - 1) || 1e-16);
}

describe("saturation curves", () => {
  it.each(["puromycin-treated", "puromycin-untreated", "inra-vmkm"])("%s as computed elsewhere", (id) => {
    const set = setOf(id);
    const [computed] = set.computed;
    const fit = saturationOf(set);
    [fit.limitingRate, fit.halfSaturation].forEach((found, j) => {
      expect(digits(found.estimate, computed?.estimates[j])).toBeGreaterThan(6);
      expect(digits(found.standardError, computed?.standardErrors[j])).toBeGreaterThan(6);
      [0, 1].forEach((end) => {
        expect(digits(found.interval?.[end], computed?.profile95?.[j]?.[end])).toBeGreaterThan(6);
      });
    });
    expect(fit.degreesOfFreedom).toBe(computed?.degreesOfFreedom);
    expect(digits(fit.residualStandardDeviation, computed?.residualStandardDeviation)).toBeGreaterThan(6);
    expect(fit.correlation).toBeCloseTo(computed?.correlation[0]?.[1] ?? Number.NaN, 4);
    if (computed?.lackOfFit) {
      expect(fit.lackOfFit?.fStatistic).toBeCloseTo(computed.lackOfFit.fStatistic, 3);
      expect(fit.lackOfFit?.pValue).toBeCloseTo(computed.lackOfFit.pValue, 3);
    }
  });

  it("Puromycin, treated, as published", () => {
    const set = setOf("puromycin-treated");
    const fit = saturationOf(set);
    [fit.limitingRate, fit.halfSaturation].forEach((found, j) => {
      expect(digits(found.estimate, set.published?.estimates[j])).toBeGreaterThan(6);
      // Printed with four digits.
      expect(digits(found.standardError, set.published?.standardErrors?.[j])).toBeGreaterThan(4);
    });
    expect(fit.residualStandardDeviation).toBeCloseTo(
      set.published?.residualStandardDeviation ?? Number.NaN,
      2,
    );
    [0, 1].forEach((end) => {
      expect(digits(fit.limitingRate.interval?.[end], set.published?.profile95?.[0]?.[end])).toBeGreaterThan(
        5,
      );
      // The published limits of K were interpolated between few points of its profile: 4 digits, as computed elsewhere too.
      const printed = set.published?.profile95?.[1]?.[end];
      expect(digits(fit.halfSaturation.interval?.[end], printed)).toBeGreaterThan(3.9);
      expect(digits(set.computed[0]?.profile95?.[1]?.[end], printed)).toBeLessThan(5);
    });
  });
});

/** Σ over rows of a model with its gradient, as a problem. */
function problemOf(
  set: RateSet,
  response: number,
  parameters: number,
  model: (theta: Float64Array, row: readonly number[]) => readonly [number, readonly number[]],
): NonlinearProblem {
  return {
    residuals: set.data.length,
    parameters,
    evaluate(theta, residuals, jacobian) {
      set.data.forEach((row, i) => {
        const [value, gradient] = model(theta, row);
        residuals[i] = value - (row[response] ?? Number.NaN);
        jacobian?.forEach((column, j) => {
          column[i] = gradient[j] ?? Number.NaN;
        });
      });
      return true;
    },
  };
}

function expectComputed(
  problem: NonlinearProblem,
  start: readonly number[],
  computed: RateSet["computed"][number] | undefined,
): NonlinearSolution {
  const fit = fitNonlinear(problem, start);
  if (fit.status !== "converged") throw new Error(fit.message);
  const errors = standardErrorsOf(fit);
  computed?.estimates.forEach((estimate, j) => {
    expect(digits(fit.parameters[j], estimate)).toBeGreaterThan(6);
    expect(digits(errors?.[j], computed.standardErrors[j])).toBeGreaterThan(6);
    const printed = computed.profile95?.[j];
    const interval = printed && profileInterval(problem, fit, j)?.interval;
    printed?.forEach((limit, end) => {
      expect(digits(interval?.[end], limit)).toBeGreaterThan(5);
    });
  });
  expect(digits(fit.residualSquares, computed?.residualSquares)).toBeGreaterThan(6);
  return fit;
}

describe("rates fitted jointly and by other laws", () => {
  const joint = setOf("puromycin-joint");

  it("Puromycin, one half-saturation for both series and one each", () => {
    const common = problemOf(joint, 1, 3, ([v = 0, dv = 0, k = 0], [s = 0, , treated = 0]) => {
      const limiting = v + dv * treated;
      const saturation = s / (k + s);
      return [limiting * saturation, [saturation, treated * saturation, (-limiting * saturation) / (k + s)]];
    });
    const separate = problemOf(joint, 1, 4, ([v = 0, dv = 0, k = 0, dk = 0], [s = 0, , treated = 0]) => {
      const limiting = v + dv * treated;
      const half = k + dk * treated;
      const saturation = s / (half + s);
      const byHalf = (-limiting * saturation) / (half + s);
      return [limiting * saturation, [saturation, treated * saturation, byHalf, treated * byHalf]];
    });
    const few = expectComputed(common, [150, 50, 0.05], joint.computed[0]);
    const many = expectComputed(separate, [150, 50, 0.05, 0.01], joint.computed[1]);
    const f = (few.residualSquares - many.residualSquares) / (many.residualSquares / many.degreesOfFreedom);
    expect(f).toBeCloseTo(joint.fTest?.F ?? Number.NaN, 4);
  });

  it("Isomerisation of pentane: parameters that hang together", () => {
    const set = setOf("isom-carr");
    const problem = problemOf(set, 3, 4, ([t1 = 0, t2 = 0, t3 = 0, t4 = 0], [h = 0, n = 0, i = 0]) => {
      const drive = n - i / 1.632;
      const below = 1 + t2 * h + t3 * n + t4 * i;
      const value = (t1 * t3 * drive) / below;
      const share = -value / below;
      return [value, [(t3 * drive) / below, h * share, (t1 * drive) / below + n * share, i * share]];
    });
    const fit = expectComputed(problem, [30, 0.1, 0.05, 0.1], set.computed[0]);
    // As printed, three digits or four.
    set.published?.estimates.forEach((estimate, j) => {
      expect(digits(fit.parameters[j], estimate)).toBeGreaterThan(2.8);
    });
  });

  it("Oxygen demand: a first-order approach whose interval is wide to one side", () => {
    const set = setOf("bod-marske");
    const problem = problemOf(set, 1, 2, ([a = 0, k = 0], [t = 0]) => {
      const rest = Math.exp(-k * t);
      return [a * (1 - rest), [1 - rest, a * t * rest]];
    });
    const fit = expectComputed(problem, [10, 0.3], set.computed[0]);
    expect(fit.parameters[0]).toBeCloseTo(set.published?.estimates[0] ?? Number.NaN, 4);
    expect(fit.parameters[1]).toBeCloseTo(set.published?.estimates[1] ?? Number.NaN, 4);
  });
});
