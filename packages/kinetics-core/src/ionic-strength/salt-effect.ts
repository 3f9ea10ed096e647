import type { Estimate, Flag, Uncertain } from "kinetics-core/quantities";
import { numberInWords } from "kinetics-core/quantities";
import { activityFunction } from "./activity-coefficient";
import { debyeHueckelA } from "./debye-hueckel";

/**
 * Primary kinetic electrolyte effect (Brønsted and Bjerrum): two ions of charges z_A and z_B that meet in the
 * rate-determining step react faster or slower by
 *
 *   lg k = lg k₀ + 2 A z_A z_B g(I),   g(I) = √I/(1 + √I), with Davies' − 0.3 I where asked for.
 *
 * It speaks of the activity coefficients of reactants and transition state alone. Where z_A z_B = 0 there is none, yet a
 * buffer's pH still moves with ionic strength, and above 0.1 mol/L ions have effects of their own kind.
 */
export type SaltEffectForm = "common" | "davies";

/** Up to here the law holds for ions in general (mol/L). */
export const LARGEST_IONIC_STRENGTH = 0.1;

export interface SaltEffectInput {
  /** z_A·z_B of the ions that meet. */
  readonly chargeProduct: number;
  /** mol/L. */
  readonly ionicStrength: Uncertain;
  /** To which k is brought, mol/L; default 0. */
  readonly to?: number;
  readonly temperatureKelvin: number;
  /** Default "common". */
  readonly form?: SaltEffectForm;
}

export type SaltEffect =
  | {
      readonly status: "known";
      /** ln k at `to` less ln k at `ionicStrength`. */
      readonly change: number;
      /** From A and from the ionic strength; the law's own error is not in it. */
      readonly standardUncertainty: number;
      /** The same change by the other form: what the choice of form is worth. */
      readonly changeByOtherForm: number;
      readonly flags: readonly Flag[];
    }
  | {
      readonly status: "temperature-outside-water" | "bad-ionic-strength" | "bad-charges";
      readonly message: string;
    };

export function saltEffect(input: SaltEffectInput): SaltEffect {
  const { chargeProduct, ionicStrength, to = 0, temperatureKelvin, form = "common" } = input;
  const { value: strength, standardUncertainty } = ionicStrength;
  const isStrength = (number: number) => Number.isFinite(number) && number >= 0;
  if (!isStrength(strength) || !isStrength(standardUncertainty) || !isStrength(to))
    return {
      status: "bad-ionic-strength",
      message: "An ionic strength and its uncertainty are numbers from 0 up, in mol/L. Correct them.",
    };
  if (!Number.isFinite(chargeProduct))
    return {
      status: "bad-charges",
      message: "The product of the charges is no number. Give the charge numbers of the two ions that react.",
    };
  const constant = debyeHueckelA(temperatureKelvin);
  if (constant === null)
    return {
      status: "temperature-outside-water",
      message: "The law is known here for water between 0 and 100 °C. Give a temperature in that range.",
    };

  const perFunction = 2 * Math.LN10 * constant.value * chargeProduct;
  const other = form === "common" ? "davies" : "common";
  const change = perFunction * difference(strength, to, form);
  const fromA = change * (constant.standardUncertainty / constant.value);
  // Half the change over one standard deviation to either side: the slope of √I itself has no bound at 0.
  const fromStrength =
    (perFunction *
      difference(Math.max(0, strength - standardUncertainty), strength + standardUncertainty, form)) /
    2;
  return {
    status: "known",
    change,
    standardUncertainty: Math.hypot(fromA, fromStrength),
    changeByOtherForm: perFunction * difference(strength, to, other),
    flags: flagsOf(chargeProduct, Math.max(strength, to)),
  };
}

/**
 * ln k brought to another ionic strength with its uncertainty: the standard errors add in squares, and the interval widens
 * as they do. Without a standard error the corrected ln k has none either.
 */
export function correctedForSalt(
  logRateConstant: Estimate,
  input: SaltEffectInput,
): { readonly logRateConstant: Estimate; readonly effect: SaltEffect } {
  const effect = saltEffect(input);
  const { estimate, standardError, interval, level } = logRateConstant;
  if (effect.status !== "known" || estimate === null)
    return { logRateConstant: { estimate: null, standardError: null, interval: null, level }, effect };
  const moved = estimate + effect.change;
  if (standardError === null)
    return { logRateConstant: { estimate: moved, standardError: null, interval: null, level }, effect };
  const error = Math.hypot(standardError, effect.standardUncertainty);
  const wider = standardError > 0 ? error / standardError : null;
  return {
    logRateConstant: {
      estimate: moved,
      standardError: error,
      interval:
        interval === null || wider === null
          ? null
          : [moved + wider * (interval[0] - estimate), moved + wider * (interval[1] - estimate)],
      level,
    },
    effect,
  };
}

/** g(to) − g(from). */
function difference(from: number, to: number, form: SaltEffectForm): number {
  const value = (strength: number) => activityFunction(strength, { kind: form }, 0);
  return value(to) - value(from);
}

function flagsOf(chargeProduct: number, strength: number): readonly Flag[] {
  if (chargeProduct === 0)
    return [
      {
        code: "no-primary-salt-effect",
        severity: "note",
        message:
          "One of the reactants carries no charge, so k has no primary salt effect. The pH of a buffer still moves with ionic strength.",
      },
    ];
  if (strength <= LARGEST_IONIC_STRENGTH) return [];
  return [
    {
      code: "ionic-strength-beyond-law",
      severity: "blocks",
      message: `At ${numberInWords(strength)} mol/L ions act each in its own way, and the correction is no longer a measurement. Stay at or below ${LARGEST_IONIC_STRENGTH} mol/L, or hold the ionic strength with an inert salt and report k for it.`,
    },
  ];
}
