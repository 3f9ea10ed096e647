import { GAS_CONSTANT } from "kinetics-core/quantities";
import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { fitTemperature } from "./fit-temperature";

const REFERENCE = 308;

/** k with E_a = 60 kJ/mol + slope·(T − T₀), from d ln k/dT = E_a/(R T²). */
function rateConstant(t: number, slope: number): number {
  const straight = ((60e3 - slope * REFERENCE) / GAS_CONSTANT) * (1 / REFERENCE - 1 / t);
  return Math.exp(straight + (slope / GAS_CONSTANT) * Math.log(t / REFERENCE));
}

function curvatureOf(kelvins: readonly number[], slope: number, scatter: number, seed: number) {
  const draws = randomDraws(seed);
  const points = kelvins.map((temperatureKelvin) => ({
    temperatureKelvin,
    rateConstant: rateConstant(temperatureKelvin, slope) * Math.exp(scatter * draws.normal()),
  }));
  const fit = fitTemperature({ points });
  if (fit.status !== "fitted") throw new Error(fit.message);
  return fit;
}

const SEVEN = [278, 288, 298, 308, 318, 328, 338];

describe("curvature of an Arrhenius plot", () => {
  it("is found exactly without scatter, in both forms", () => {
    const { curvature } = curvatureOf(SEVEN, -250, 0, 1);
    expect(curvature?.activationEnergySlope.estimate).toBeCloseTo(-250, 6);
    expect(curvature?.heatCapacityOfActivation.estimate).toBeCloseTo(-250 - GAS_CONSTANT, 6);
  });

  it("is neither shown nor tested where the points lie on the line to rounding", () => {
    const fit = curvatureOf(SEVEN, 0, 0, 1);
    expect(fit.curvature).toMatchObject({ fStatistic: 0, pValue: 1 });
  });

  it("needs five temperatures", () => {
    expect(curvatureOf(SEVEN.slice(0, 4), -250, 0.01, 1).curvature).toBeNull();
    expect(curvatureOf(SEVEN.slice(0, 5), -250, 0.01, 1).curvature).not.toBeNull();
  });

  it("is flagged when it is large", () => {
    const { flags } = curvatureOf(SEVEN, -600, 0.01, 3);
    expect(flags).toContainEqual(expect.objectContaining({ code: "curvature-shown", severity: "weakens" }));
  });

  it("is claimed for straight plots in one of twenty, its interval covers in nineteen", () => {
    const replicates = 600;
    let claimed = 0;
    let covered = 0;
    for (let seed = 0; seed < replicates; seed++) {
      const { curvature } = curvatureOf(SEVEN, -100, 0.03, seed);
      const [low = 0, high = 0] = curvature?.activationEnergySlope.interval ?? [];
      if (low <= -100 && -100 <= high) covered++;
      if ((curvatureOf(SEVEN, 0, 0.03, seed).curvature?.pValue ?? 1) < 0.05) claimed++;
    }
    // Central 99.8 % of a binomial with 600 trials at 5 %: 30 ± 3.1 · 5.3.
    expect(claimed).toBeGreaterThan(13);
    expect(claimed).toBeLessThan(47);
    expect(replicates - covered).toBeGreaterThan(13);
    expect(replicates - covered).toBeLessThan(47);
  });
});
