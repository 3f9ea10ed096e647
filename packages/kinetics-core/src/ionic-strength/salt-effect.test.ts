import { estimateOf, noEstimate } from "kinetics-core/quantities";
import { describe, expect, it } from "vitest";
import { correctedForSalt, debyeHueckelA, ionicStrengthOf, type SaltEffectInput, saltEffect } from "./index";

const base: SaltEffectInput = {
  chargeProduct: -2,
  ionicStrength: { value: 0.04, standardUncertainty: 0 },
  temperatureKelvin: 298.15,
};

function known(input: SaltEffectInput) {
  const effect = saltEffect(input);
  if (effect.status !== "known") throw new Error(effect.message);
  return effect;
}

describe("the primary salt effect", () => {
  it("at 25 °C is 2·0.509·z_A z_B·√I/(1 + √I) in lg k, with the sign that brings k to I = 0", () => {
    const { change, flags } = known(base);
    expect(change / Math.LN10).toBeCloseTo((2 * 0.509 * 2 * 0.2) / 1.2, 12);
    expect(flags).toEqual([]);
    expect(known({ ...base, to: 0.04 }).change).toBeCloseTo(0, 15);
    expect(known({ ...base, form: "davies" }).change / Math.LN10).toBeCloseTo(
      2 * 0.509 * 2 * (0.2 / 1.2 - 0.012),
      12,
    );
    expect(known(base).changeByOtherForm).toBe(known({ ...base, form: "davies" }).change);
  });

  it("carries the uncertainty of the ionic strength, which stays finite at 0, and of A", () => {
    const exact = known(base);
    expect(exact.standardUncertainty / exact.change).toBeCloseTo(0.003, 12);
    const uncertain = known({ ...base, ionicStrength: { value: 0.04, standardUncertainty: 0.0004 } });
    // dg/dI = 1/(2√I (1 + √I)²).
    const slope = 1 / (2 * 0.2 * 1.2 ** 2);
    const fromStrength = 2 * Math.LN10 * 0.509 * 2 * slope * 0.0004;
    expect(uncertain.standardUncertainty).toBeCloseTo(Math.hypot(exact.standardUncertainty, fromStrength), 7);
    const none = known({ ...base, ionicStrength: { value: 0, standardUncertainty: 0.001 } });
    expect(none.change).toBeCloseTo(0, 15);
    expect(none.standardUncertainty).toBeGreaterThan(0.05);
    expect(none.standardUncertainty).toBeLessThan(0.1);
  });

  it("is none where a reactant is neutral, and no measurement above 0.1 mol/L", () => {
    const neutral = known({ ...base, chargeProduct: 0, ionicStrength: { value: 1, standardUncertainty: 0 } });
    expect(Math.abs(neutral.change)).toBe(0);
    expect(neutral.flags.map((flag) => flag.code)).toEqual(["no-primary-salt-effect"]);
    const strong = known({ ...base, ionicStrength: { value: 0.5, standardUncertainty: 0 } });
    expect(strong.flags[0]).toMatchObject({ code: "ionic-strength-beyond-law", severity: "blocks" });
    expect(known({ ...base, to: 0.2 }).flags).toHaveLength(1);
    expect(known({ ...base, ionicStrength: { value: 0.1, standardUncertainty: 0 } }).flags).toEqual([]);
  });

  it.each([
    ["temperature-outside-water", { temperatureKelvin: 260 }],
    ["temperature-outside-water", { temperatureKelvin: Number.NaN }],
    ["bad-ionic-strength", { ionicStrength: { value: -0.1, standardUncertainty: 0 } }],
    ["bad-ionic-strength", { to: Number.NaN }],
    ["bad-charges", { chargeProduct: Number.POSITIVE_INFINITY }],
  ])("refuses as %s with a way out", (status, change) => {
    const effect = saltEffect({ ...base, ...change });
    expect(effect.status).toBe(status);
    expect("message" in effect && effect.message).toMatch(/\.$/);
  });
});

describe("ln k brought to another ionic strength", () => {
  it("moves by the effect, and its interval widens with its standard error", () => {
    const before = estimateOf(-2, 0.05, 6);
    const input = { ...base, ionicStrength: { value: 0.04, standardUncertainty: 0.002 } };
    const { logRateConstant: after } = correctedForSalt(before, input);
    const { change, standardUncertainty } = known(input);
    expect(after.estimate).toBeCloseTo(-2 + change, 14);
    expect(after.standardError).toBeCloseTo(Math.hypot(0.05, standardUncertainty), 14);
    const width = (interval: readonly [number, number] | null) => (interval?.[1] ?? 0) - (interval?.[0] ?? 0);
    expect(width(after.interval) / width(before.interval)).toBeCloseTo((after.standardError ?? 0) / 0.05, 12);
  });

  it("there and back it is what it was", () => {
    const there = correctedForSalt(estimateOf(-2, null, null), { ...base, to: 0.01 }).logRateConstant;
    const back = correctedForSalt(there, {
      ...base,
      ionicStrength: { value: 0.01, standardUncertainty: 0 },
      to: 0.04,
    });
    expect(back.logRateConstant.estimate).toBeCloseTo(-2, 14);
    expect(back.logRateConstant.standardError).toBeNull();
  });

  it("has nothing to say without a k or a law", () => {
    expect(correctedForSalt(noEstimate(), base).logRateConstant.estimate).toBeNull();
    const cold = correctedForSalt(estimateOf(-2, 0.05, 6), { ...base, temperatureKelvin: 200 });
    expect(cold.logRateConstant).toMatchObject({ estimate: null, interval: null });
    expect(cold.effect.status).toBe("temperature-outside-water");
  });
});

describe("ionic strength and A", () => {
  it("½ Σ c z²: 0.1 mol/L of NaCl, CaCl₂ and MgSO₄", () => {
    expect(ionicStrengthOf([0.1, 0.1], [1, -1])).toBeCloseTo(0.1, 15);
    expect(ionicStrengthOf([0.1, 0.2], [2, -1])).toBeCloseTo(0.3, 15);
    expect(ionicStrengthOf([0.1, 0.1], [2, -2])).toBeCloseTo(0.4, 15);
  });

  it("A is 0.509 at 25 °C, grows with temperature, and is unknown outside water", () => {
    expect(debyeHueckelA(298.15)?.value).toBeCloseTo(0.509, 12);
    expect(debyeHueckelA(273.15)?.value).toBeLessThan(0.495);
    expect(debyeHueckelA(333.15)?.value).toBeGreaterThan(0.54);
    expect([debyeHueckelA(273), debyeHueckelA(374)]).toEqual([null, null]);
  });
});
