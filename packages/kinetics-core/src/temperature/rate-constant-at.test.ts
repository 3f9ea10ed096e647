import { GAS_CONSTANT } from "kinetics-core/quantities";
import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { fitTemperature } from "./fit-temperature";
import { movedLogRateConstant } from "./moved-rate-constant";
import { gibbsEnergyOfActivationAt, rateConstantAt, rateConstantBand } from "./rate-constant-at";
import type { TemperatureFit } from "./temperature";

const truth = (t: number) => Math.exp(18 - 45e3 / (GAS_CONSTANT * t));

function study(scatters: readonly number[], seed: number, states = false): TemperatureFit {
  const draws = randomDraws(seed);
  const points = scatters.map((scatter, j) => {
    const temperatureKelvin = 288 + 10 * j;
    const rateConstant = truth(temperatureKelvin) * Math.exp(scatter * draws.normal());
    const stated = states ? { rateConstantUncertainty: rateConstant * (j % 2 === 0 ? 0.01 : 0.08) } : {};
    return { temperatureKelvin, rateConstant, ...stated };
  });
  const fit = fitTemperature({ points });
  if (fit.status !== "fitted") throw new Error(fit.message);
  return fit;
}

const even = [0.03, 0.03, 0.03, 0.03, 0.03];

describe("k at a temperature", () => {
  it("is the line's, and best known at the centre", () => {
    const fit = study(even, 4);
    const at = rateConstantAt(fit, 1 / fit.arrhenius.centre);
    expect(at.logRateConstant.estimate).toBeCloseTo(fit.arrhenius.coefficients[0], 12);
    const widths = rateConstantBand(fit, 8).map((one) => Number(one.logRateConstant.standardError));
    expect(Math.min(...widths)).toBeGreaterThanOrEqual(Number(at.logRateConstant.standardError));
  });

  it("is Arrhenius's k whether reached by E_a and A or by the line", () => {
    const fit = study(even, 4);
    const byParameters =
      Number(fit.logPreExponential.estimate) - Number(fit.activationEnergy.estimate) / (GAS_CONSTANT * 310);
    expect(rateConstantAt(fit, 310).logRateConstant.estimate).toBeCloseTo(byParameters, 10);
    const covariance = fit.covariance.arrhenius;
    const slope = -1 / (GAS_CONSTANT * 310);
    const variance =
      Number(covariance?.[1][1]) +
      2 * slope * Number(covariance?.[0][1]) +
      slope ** 2 * Number(covariance?.[0][0]);
    expect(rateConstantAt(fit, 310).logRateConstant.standardError).toBeCloseTo(Math.sqrt(variance), 10);
  });

  it("outside the studied range carries a flag that says how far", () => {
    const fit = study(even, 4);
    expect(rateConstantAt(fit, 300).flags).toEqual([]);
    expect(rateConstantAt(fit, 340).flags[0]?.message).toMatch(/12\.0 K above/);
    expect(rateConstantBand(fit, 4, 10).map((one) => one.flags.length)).toEqual([1, 0, 0, 0, 1]);
  });

  it("has no interval from two temperatures", () => {
    const at = rateConstantAt(study([0.03, 0.03], 4), 293);
    expect(at.rateConstant.estimate).not.toBeNull();
    expect(at.rateConstant.interval).toBeNull();
    expect(at.newDetermination.estimate).toBeNull();
  });

  it("throws on a temperature that is none", () => {
    expect(() => rateConstantAt(study(even, 4), -1)).toThrow(RangeError);
  });

  it("gives the Gibbs energy that its parts give, with their covariance", () => {
    const fit = study(even, 4);
    const found = gibbsEnergyOfActivationAt(fit, 298.15);
    const byParts =
      Number(fit.enthalpyOfActivation.estimate) - 298.15 * Number(fit.entropyOfActivation.estimate);
    expect(found.estimate).toBeCloseTo(byParts, 6);
    expect(Number(found.standardError)).toBeLessThan(0.1 * Number(fit.enthalpyOfActivation.standardError));
  });
});

describe("coverage of 95 % intervals, fixed seeds", () => {
  const replicates = 400;
  const cells = [
    { name: "even scatter, nothing stated", scatters: even, states: false },
    { name: "stated 1 and 8 %, scattering by 5 %", scatters: even.map(() => 0.05), states: true },
    { name: "stated 1 and 8 %, as stated", scatters: [0.01, 0.08, 0.01, 0.08, 0.01], states: true },
    { name: "three temperatures", scatters: even.slice(0, 3), states: false },
  ];
  it.each(cells)("$name: k at 340 K, E_a, and a new determination at 300 K", ({ scatters, states }) => {
    const hits = [0, 0, 0];
    for (let seed = 0; seed < replicates; seed++) {
      const fit = study(scatters, 1000 + seed, states);
      const own = scatters.reduce((sum, scatter) => sum + scatter, 0) / scatters.length;
      const again = truth(300) * Math.exp(own * randomDraws(9000 + seed).normal());
      const results = [
        [rateConstantAt(fit, 340).rateConstant.interval, truth(340)],
        [fit.activationEnergy.interval, 45e3],
        [rateConstantAt(fit, 300).newDetermination.interval, again],
      ] as const;
      results.forEach(([interval, value], i) => {
        if (interval !== null && interval[0] <= value && value <= interval[1]) hits[i] = (hits[i] ?? 0) + 1;
      });
    }
    // 0.5 % point of a binomial with 92.5 %: 370 − 2.58 · 5.3.
    for (const count of hits) expect(count).toBeGreaterThanOrEqual(356);
  });
});

describe("ln k moved with a known activation energy", () => {
  it("changes by 6.8 % per kelvin at 25 °C and 50 kJ/mol", () => {
    const from = { logRateConstant: { value: 0, standardUncertainty: 0.02 }, temperatureKelvin: 298.15 };
    const moved = movedLogRateConstant(from, { value: 50e3, standardUncertainty: 5e3 }, 299.15);
    expect(moved.estimate).toBeCloseTo(0.0674, 4);
    expect(moved.standardError).toBeCloseTo(Math.hypot(0.02, 0.00674), 5);
  });
});
