import type { DebyeHueckelConstants } from "./debye-hueckel";

/**
 * How lg γ depends on ionic strength. `limiting`: √I, to about 1 mmol/L. `extended`: √I/(1 + B a √I) with the ion's own
 * size a (Kielland, J. Am. Chem. Soc. 59 (1937) 1675). `common`: √I/(1 + √I), one size for all ions (Güntelberg, about
 * 3 Å), to 0.1 mol/L. `davies`: √I/(1 + √I) − 0.3 I (Davies, Ion Association, 1962; 0.2 in his paper of 1938), at most to
 * 0.5 mol/L.
 */
export type ActivityForm =
  | { readonly kind: "limiting" }
  | { readonly kind: "extended"; readonly ionSizeAngstrom: number }
  | { readonly kind: "common" }
  | { readonly kind: "davies" };

const DAVIES_COEFFICIENT = 0.3;

/** g(I) of −lg γ = A z² g(I). `ionicStrength` ≥ 0 in the unit of the constants. */
export function activityFunction(ionicStrength: number, form: ActivityForm, perAngstrom: number): number {
  const root = Math.sqrt(ionicStrength);
  switch (form.kind) {
    case "limiting":
      return root;
    case "extended":
      return root / (1 + perAngstrom * form.ionSizeAngstrom * root);
    case "common":
      return root / (1 + root);
    case "davies":
      return root / (1 + root) - DAVIES_COEFFICIENT * ionicStrength;
  }
}

/** γ of one ion; 1 for a neutral species. */
export function activityCoefficient(
  charge: number,
  ionicStrength: number,
  form: ActivityForm,
  constants: DebyeHueckelConstants,
): number {
  return 10 ** (-constants.A * charge ** 2 * activityFunction(ionicStrength, form, constants.perAngstrom));
}
