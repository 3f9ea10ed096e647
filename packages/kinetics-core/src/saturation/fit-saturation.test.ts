import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { fitSaturation } from "./fit-saturation";
import type { SaturationFit, SaturationInput } from "./saturation";

function fitted(input: SaturationInput): SaturationFit {
  const fit = fitSaturation(input);
  if (fit.status !== "fitted") throw new Error(fit.message);
  return fit;
}

const curve = (limiting: number, half: number, concentrations: readonly number[]) =>
  concentrations.map((c) => (limiting * c) / (half + c));

/** Scatter of the size `part` of the greatest rate, the same at every call. */
const scattered = (rates: readonly number[], part: number) =>
  rates.map((rate, i) => rate + part * Math.max(...rates) * Math.sin(5 * i * i + 1));

const LEVELS = [0.1, 0.2, 0.4, 0.8, 1.6, 3.2, 6.4];
const codes = (fit: SaturationFit) => fit.flags.map((flag) => flag.code);

describe("a saturation curve", () => {
  it("of exact rates gives both numbers and no uncertainty", () => {
    const fit = fitted({ concentrations: LEVELS, rates: curve(5, 0.7, LEVELS) });
    expect(fit.limitingRate.estimate).toBeCloseTo(5, 11);
    expect(fit.halfSaturation.estimate).toBeCloseTo(0.7, 11);
    expect(fit.limitingRate).toMatchObject({ standardError: null, interval: null });
    expect(fit.covariance).toBeNull();
    expect(codes(fit)).toEqual(["no-scatter"]);
  });

  it("keeps the interval round the estimate, lopsided to the far side", () => {
    const { limitingRate, halfSaturation, initialSlope, flags } = fitted({
      concentrations: LEVELS,
      rates: scattered(curve(5, 2, LEVELS), 0.03),
    });
    for (const one of [limitingRate, halfSaturation]) {
      const [low, high] = one.interval ?? [Number.NaN, Number.NaN];
      const estimate = one.estimate ?? Number.NaN;
      expect(low).toBeLessThan(estimate);
      expect(high - estimate).toBeGreaterThan(estimate - low);
    }
    expect(initialSlope.estimate).toBeCloseTo(
      (limitingRate.estimate ?? 0) / (halfSaturation.estimate ?? 1),
      10,
    );
    expect(flags).toEqual([]);
  });

  it("does not care where a rate of 0 at concentration 0 stands", () => {
    const rates = scattered(curve(5, 2, LEVELS), 0.03);
    const fit = fitted({ concentrations: [0, ...LEVELS], rates: [0, ...rates] });
    expect(fit.limitingRate.estimate).toBeCloseTo(
      fitted({ concentrations: LEVELS, rates }).limitingRate.estimate ?? 0,
      9,
    );
  });

  it("gives the slope alone where nothing levels off", () => {
    const fit = fitted({ concentrations: LEVELS, rates: LEVELS.map((c, i) => 2 * c * (1 + 0.01 * i)) });
    expect(fit.limitingRate.estimate).toBeNull();
    expect(fit.halfSaturation.estimate).toBeNull();
    expect(fit.covariance).toBeNull();
    expect(fit.initialSlope.estimate).toBeCloseTo(2.1, 1);
    expect(fit.flags).toContainEqual(expect.objectContaining({ code: "no-curvature", severity: "blocks" }));
  });

  it("gives the limiting rate alone where every concentration saturates", () => {
    const fit = fitted({ concentrations: LEVELS, rates: [3.1, 2.9, 3, 3.05, 2.95, 3, 2.98] });
    expect(fit.limitingRate.estimate).toBeCloseTo(3, 1);
    expect(fit.halfSaturation.estimate).toBeNull();
    expect(fit.flags).toContainEqual(
      expect.objectContaining({ code: "saturated-throughout", severity: "blocks" }),
    );
  });

  it("has no upper end where the curve may as well be straight, and says beyond what it lies", () => {
    const low = [0.05, 0.1, 0.15, 0.2, 0.25];
    const fit = fitted({ concentrations: low, rates: scattered(curve(5, 1, low), 0.08) });
    expect(fit.limitingRate.estimate).not.toBeNull();
    expect(fit.limitingRate.interval).toBeNull();
    expect(codes(fit)).toEqual(
      expect.arrayContaining(["limiting-rate-open", "half-saturation-open", "below-half-saturation"]),
    );
    expect(fit.flags.find((flag) => flag.code === "limiting-rate-open")?.message).toMatch(/more than \d/);
  });

  it("of two points is exact", () => {
    const fit = fitted({ concentrations: [1, 3], rates: [2, 3] });
    expect(fit.limitingRate.estimate).toBeCloseTo(4, 10);
    expect(fit.halfSaturation.estimate).toBeCloseTo(1, 10);
    expect(fit).toMatchObject({ degreesOfFreedom: 0, residualStandardDeviation: null, covariance: null });
    expect(codes(fit)).toEqual(["no-degrees-of-freedom"]);
  });

  it("is contradicted by repeats that scatter less than they miss it", () => {
    const concentrations = LEVELS.flatMap((c) => [c, c]);
    const inhibited = concentrations.map((c, i) => c / (0.5 + c + c * c) + 0.002 * (i % 2));
    const fit = fitted({ concentrations, rates: inhibited });
    expect(fit.lackOfFit?.pValue).toBeLessThan(0.001);
    expect(codes(fit)).toContain("lack-of-fit");
  });

  it.each([
    [
      "one concentration",
      [1, 1, 1],
      [2, 2, 2],
      "too-few-points",
      "concentrations",
      /1 concentration above 0/,
    ],
    ["no concentration", [], [], "too-few-points", "concentrations", /no concentrations/],
    ["a rate too few", [1, 2, 3], [1, 2], "bad-input", "rates", /2 rates for 3/],
    [
      "a negative concentration",
      [1, -2, 3],
      [1, 2, 3],
      "bad-input",
      "concentrations",
      /Concentration 2 is -2/,
    ],
    ["a rate that is no number", [1, 2, 3], [1, Number.NaN, 3], "bad-input", "rates", /Rate 2 is NaN/],
    ["rates of zero", [1, 2, 3], [0, 0, 0], "bad-input", "rates", /Every rate is 0/],
  ] as const)("refuses %s", (_, concentrations, rates, status, place, message) => {
    expect(fitSaturation({ concentrations, rates })).toMatchObject({
      status,
      place,
      message: expect.stringMatching(message),
    });
  });
});

describe("any saturation data", () => {
  const point = fc.tuple(
    fc.double({ min: 0.01, max: 100, noNaN: true }),
    fc.double({ min: -1, max: 10, noNaN: true }),
  );
  const wild = fc.array(point, { minLength: 2, maxLength: 12 });
  const tame = fc
    .tuple(
      fc.double({ min: 0.3, max: 3, noNaN: true }),
      fc.array(fc.double({ min: -0.03, max: 0.03, noNaN: true }), { minLength: 7, maxLength: 7 }),
    )
    .map(([half, errors]) => ({
      concentrations: LEVELS,
      rates: curve(1, half, LEVELS).map((rate, i) => rate + (errors[i] ?? 0) + 0.01 * Math.sin(5 * i * i)),
    }));

  it("end in numbers, nulls and sentences, never in NaN", () => {
    fc.assert(
      fc.property(wild, (points) => {
        const answer = fitSaturation({
          concentrations: points.map(([c]) => c),
          rates: points.map(([, v]) => v),
        });
        expect(JSON.parse(JSON.stringify(answer))).toEqual(answer);
      }),
      { numRuns: 100, seed: 1 },
    );
  });

  it("scale with their units", () => {
    fc.assert(
      fc.property(
        tame,
        fc.double({ min: 1e-6, max: 1e6, noNaN: true }),
        fc.double({ min: 1e-6, max: 1e6, noNaN: true }),
        (input, byC, byV) => {
          const [plain, scaled] = [
            fitted(input),
            fitted({
              concentrations: input.concentrations.map((c) => c * byC),
              rates: input.rates.map((v) => v * byV),
            }),
          ];
          expect((scaled.limitingRate.estimate ?? 0) / byV).toBeCloseTo(
            plain.limitingRate.estimate ?? Number.NaN,
            8,
          );
          expect((scaled.halfSaturation.estimate ?? 0) / byC).toBeCloseTo(
            plain.halfSaturation.estimate ?? Number.NaN,
            8,
          );
          expect((scaled.halfSaturation.interval?.[1] ?? 0) / byC).toBeCloseTo(
            plain.halfSaturation.interval?.[1] ?? 0,
            6,
          );
        },
      ),
      { numRuns: 40, seed: 2 },
    );
  });

  it("are the same in another order", () => {
    fc.assert(
      fc.property(tame, fc.shuffledSubarray([0, 1, 2, 3, 4, 5, 6], { minLength: 7 }), (input, order) => {
        const [plain, shuffled] = [
          fitted(input),
          fitted({
            concentrations: order.map((i) => input.concentrations[i] ?? 0),
            rates: order.map((i) => input.rates[i] ?? 0),
          }),
        ];
        expect(shuffled.limitingRate.estimate).toBeCloseTo(plain.limitingRate.estimate ?? Number.NaN, 9);
        expect(shuffled.halfSaturation.interval?.[0]).toBeCloseTo(plain.halfSaturation.interval?.[0] ?? 0, 6);
      }),
      { numRuns: 40, seed: 3 },
    );
  });
});
