/** Plain props of the law's typeset parts: rounding and units are done, components only draw. */

/** One factor of "rate = k [A]¹[B]¹": the exponent as printed, with a true minus, "½" or "0.97". */
export interface LawFactorView {
  readonly symbol: string;
  readonly exponent: string;
}

/** A printed quantity: "11.8" ± "0.3" × 10^power unit. Unit as plain text, "L mol^-1 s^-1". */
export interface QuantityView {
  readonly value: string;
  readonly uncertainty: string | null;
  /** Power of ten outside the brackets; 0 prints none. */
  readonly power: number;
  readonly unit: string;
}

/** What the highlighter marks: k, or with free orders the rate at the centre of the design. */
export interface ConstantView {
  readonly kind: "rate-constant" | "rate-at-centre";
  readonly quantity: QuantityView;
  /** With `rate-at-centre`: where that is, one "[A] = 50.0 µmol L⁻¹" per species, units as plain text. */
  readonly at: readonly { readonly symbol: string; readonly value: string; readonly unit: string }[];
}
