import { GAS_CONSTANT } from "kinetics-core/quantities";
import {
  fitTemperature,
  gibbsEnergyOfActivationAt,
  movedLogRateConstant,
  rateConstantAt,
  type TemperatureFit,
  type TemperatureInput,
} from "kinetics-core/temperature";
import { describe, expect, it } from "vitest";
import fixture from "./temperature.fixture.json";

/**
 * Published tables of rate constants against temperature: our figures agree with least squares in 50-digit arithmetic,
 * and with what the source prints to its last digit. What a source prints by other arithmetic,
 * or wrongly, is listed with both figures and the reason.
 */
type Table = (typeof fixture.tables)[number];

function tableOf(id: string): Table {
  const table = fixture.tables.find((one) => one.id === id);
  if (table === undefined) throw new Error(`no table ${id} in the fixture`);
  return table;
}

function fitOf(id: string, changes: Partial<TemperatureInput> = {}): TemperatureFit {
  const table = tableOf(id);
  const points = table.kelvin.map((temperatureKelvin, j) => ({
    temperatureKelvin,
    rateConstant: table.k[j] ?? Number.NaN,
  }));
  const fit = fitTemperature({ points, ...changes });
  if (fit.status !== "fitted") throw new Error(`${id}: ${fit.message}`);
  return fit;
}

function expectWithin(found: number | null, expected: number, relative: number) {
  expect(Math.abs(Number(found) / expected - 1)).toBeLessThan(relative);
}

/** The same when both are printed to so many significant digits. */
function expectDigits(found: number | null | undefined, expected: number, digits: number) {
  expect(Number(found).toPrecision(digits)).toBe(expected.toPrecision(digits));
}

const NAMES = [
  "activationEnergy",
  "logPreExponential",
  "enthalpyOfActivation",
  "entropyOfActivation",
] as const;

describe.each(fixture.tables.flatMap(({ id, computed }) => (computed === null ? [] : [{ id, computed }])))(
  "$id",
  ({ id, computed }) => {
    const fit = fitOf(id);

    it("gives the least-squares parameters to ten digits", () => {
      for (const name of NAMES) expectWithin(fit[name].estimate, computed[name], 1e-10);
      expectWithin(fit.preExponential.estimate, computed.preExponential, 1e-10);
      expectWithin(gibbsEnergyOfActivationAt(fit, 298.15).estimate, computed.gibbsEnergyAt298K15, 1e-10);
    });

    it("gives their standard errors to nine digits, or none where two points determine the line", () => {
      const { standardErrors, residualStandardDeviation } = computed;
      for (const name of NAMES) {
        if (standardErrors === null) expect(fit[name].standardError).toBeNull();
        else expectWithin(fit[name].standardError, standardErrors[name], 1e-9);
      }
      if (residualStandardDeviation === null)
        expect(fit.flags.map((flag) => flag.code)).toContain("too-few-temperatures");
      else expectWithin(fit.arrhenius.residualStandardDeviation, residualStandardDeviation, 1e-9);
    });
  },
);

describe("what the sources print", () => {
  it("agrees to their last digit where they use all points", () => {
    expectDigits(fitOf("os-n2o5-2pt").activationEnergy.estimate, 1.1e5, 2);
    expectDigits(fitOf("os-sucrose").activationEnergy.estimate, 108e3, 3);
    expectDigits(rateConstantAt(fitOf("os-sucrose"), 320).rateConstant.estimate, 3.2e-10, 2);
    const acetaldehyde = fitOf("atkins-ch3cho");
    expectDigits(acetaldehyde.activationEnergy.estimate, 188e3, 3);
    expectDigits(acetaldehyde.arrhenius.coefficients[1], -22650, 4);
    expectDigits(acetaldehyde.logPreExponential.estimate, 27.7, 3);
    expectDigits(acetaldehyde.preExponential.estimate, 1.1e12, 2);
  });

  it("dithionate: three of the four printed weightings, parameters and standard errors", () => {
    const table = tableOf("lente-dithionate");
    // Uncertainties as the source's equations imply them: those of k, of k/T and of T·ln(k/T) alike.
    const weighted = (uncertainty: (k: number, t: number) => number) =>
      fitOf(table.id, {
        weighting: "stated",
        points: table.kelvin.map((temperatureKelvin, j) => {
          const rateConstant = table.k[j] ?? Number.NaN;
          const rateConstantUncertainty = uncertainty(rateConstant, temperatureKelvin);
          return { temperatureKelvin, rateConstant, rateConstantUncertainty };
        }),
      });
    const printed = (fit: TemperatureFit) => [
      Number(fit.enthalpyOfActivation.estimate).toPrecision(5),
      Number(fit.enthalpyOfActivation.standardError).toPrecision(2),
      Number(fit.entropyOfActivation.estimate).toFixed(2),
      Number(fit.entropyOfActivation.standardError).toFixed(2),
    ];
    expect(printed(fitOf(table.id))).toEqual(["1.2027e+5", "1.5e+2", "11.33", "0.45"]);
    // 1/k² weights of k are equal weights of ln k; the source prints 0.16 and 0.46 from its nonlinear fit.
    expect(printed(weighted((k) => 0.01 * k)).slice(0, 1)).toEqual(["1.2027e+5"]);
    expect(printed(weighted((k, t) => (300 * k) / t))).toEqual(["1.2025e+5", "1.6e+2", "11.29", "0.46"]);
    // Equal weights of k itself. Not met: the source prints 0.41 for the error of ΔH‡, SciPy's nonlinear fit and we 0.39.
    const unweighted = weighted(() => 1e-7);
    expectDigits(unweighted.enthalpyOfActivation.estimate, 118.8e3, 4);
    expectDigits(unweighted.enthalpyOfActivation.standardError, 390, 2);
    expectDigits(unweighted.entropyOfActivation.estimate, 7.2, 2);
    expectDigits(unweighted.entropyOfActivation.standardError, 1.1, 2);
  });

  it("dithionate: the temperatures as printed, to 0.1 K, shift the enthalpy as computed", () => {
    const table = tableOf("lente-dithionate");
    const fit = fitOf(table.id, {
      points: table.kelvin.map((t, j) => ({
        temperatureKelvin: Math.round(10 * t + 1e-6) / 10,
        rateConstant: table.k[j] ?? Number.NaN,
      })),
    });
    const expected = table.computedAtRoundedTemperatures;
    expectDigits(fit.enthalpyOfActivation.estimate, Number(expected?.enthalpyOfActivation), 10);
    expectDigits(fit.entropyOfActivation.estimate, Number(expected?.entropyOfActivation), 10);
  });

  it("crystal violet: k per minute, so ΔS‡ needs the unit and then lies between the two printed values", () => {
    const fit = fitOf("cv-ea", {
      unit: { overallOrder: 1, concentrationUnit: "mol/L", timeUnit: "min" },
    });
    const { dH_kJ, dS_J, dG_kJ, Ea_kJ } = tableOf("cv-ea").published;
    const enthalpy = Number(fit.enthalpyOfActivation.estimate) / 1e3;
    expect(enthalpy).toBeGreaterThan(Number(dH_kJ?.[0]));
    expect(enthalpy).toBeLessThan(Number(dH_kJ?.[1]));
    const entropy = Number(fit.entropyOfActivation.estimate);
    expect(entropy).toBeGreaterThan(Number(dS_J?.[0]));
    expect(entropy).toBeLessThan(Number(dS_J?.[1]));
    // Each printed ΔG‡ combines that temperature's own pair, ours the line's: within 0.1 kJ/mol.
    for (const [i, kelvin] of [294.15, 279.15].entries())
      expect(Number(gibbsEnergyOfActivationAt(fit, kelvin).estimate) / 1e3).toBeCloseTo(
        Number(dG_kJ?.[i]),
        1,
      );
    // Not met to its last digit: the source prints 60.57; its own two points give 60.64, both 60.6.
    expectDigits(fit.activationEnergy.estimate, Number(Ea_kJ) * 1e3, 3);
  });
});

describe("printed figures that the printed data do not give", () => {
  it("hydrogen iodide: 180 kJ/mol is two points with 1/T cut to three figures; all points give 185.3", () => {
    const { kelvin, k } = tableOf("os-hi-a");
    const cut = (t = Number.NaN) => Number((1 / t).toPrecision(3));
    const rise = Math.log((k[4] ?? 0) / (k[0] ?? 0)) / (cut(kelvin[4]) - cut(kelvin[0]));
    expectDigits(rise, -2.2e4, 2);
    expectDigits(2.2e4 * GAS_CONSTANT, 1.8e5, 2);
    expectDigits(fitOf("os-hi-a").activationEnergy.estimate, 185.3e3, 4);
  });

  it("sucrose: A is printed as 2.0 × 10⁸, which an E_a within 1 kJ/mol of the unrounded one gives", () => {
    const fit = fitOf("os-sucrose");
    expectDigits(fit.preExponential.estimate, 1.4e8, 2);
    const shift = Math.log(2.0e8 / Number(fit.preExponential.estimate)) * GAS_CONSTANT * 305;
    expect(Math.abs(shift)).toBeLessThan(1000);
  });

  it("cyclobutane: A from one k and an E_a of three figures; printed 3.9 × 10¹⁵, computed 3.8 × 10¹⁵", () => {
    const [k = Number.NaN] = tableOf("os-c4h8-A").k;
    const from = { logRateConstant: { value: Math.log(k), standardUncertainty: 0 }, temperatureKelvin: 598 };
    // E_a is given to 1 kJ/mol: rectangular, half-width 0.5 kJ/mol.
    const activationEnergy = { value: 261e3, standardUncertainty: 500 / Math.sqrt(3) };
    const logA = movedLogRateConstant(from, activationEnergy, Number.POSITIVE_INFINITY);
    expectDigits(Math.exp(Number(logA.estimate)), 3.8e15, 2);
    expect(Math.abs(Math.log(3.9e15) - Number(logA.estimate))).toBeLessThan(Number(logA.standardError));
    // In closed form: 6.1e-8·exp(261e3/(598 R)) by NumPy.
    expectDigits(Math.exp(Number(logA.estimate)), 3.827777131554e15, 10);
  });

  it("dinitrogen pentoxide: 102.27 kJ/mol is read off a plot by hand; A and k(T) are off by powers of ten", () => {
    const fit = fitOf("ncert-n2o5");
    const { Ea_kJ, A, k_30C, k_50C } = tableOf("ncert-n2o5").published;
    expectDigits(fit.activationEnergy.estimate, 100.6e3, 4);
    // The hand plot is within its error.
    expect(Math.abs(Number(Ea_kJ) * 1e3 - Number(fit.activationEnergy.estimate))).toBeLessThan(
      Number(fit.activationEnergy.standardError),
    );
    expectDigits(fit.preExponential.estimate, 1.4e13, 2);
    expectDigits(rateConstantAt(fit, 303).rateConstant.estimate, 6.4e-5, 2);
    expectDigits(rateConstantAt(fit, 323).rateConstant.estimate, 7.6e-4, 2);
    // The printed ln k row is off by powers of ten: the predicted k exceed what the data give by 800 and more.
    expect(Number(k_30C) / Number(rateConstantAt(fit, 303).rateConstant.estimate)).toBeGreaterThan(790);
    expect(Number(k_50C) / Number(rateConstantAt(fit, 323).rateConstant.estimate)).toBeGreaterThan(790);
    expect(Number(A)).toBeLessThan(1e-6 * Number(fit.preExponential.estimate));
  });
});
