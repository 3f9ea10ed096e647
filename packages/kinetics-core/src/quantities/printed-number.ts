/**
 * Numbers as they are printed: the uncertainty is rounded first and the value follows to the same place
 * (GUM, JCGM 100:2008, 7.2.6). Typography: true minus U+2212, thousands grouped by U+202F from five digits on.
 */

const MINUS = "\u2212";
const GROUP = "\u202f";

export interface PrintedUncertain {
  /** Value divided by 10^power. */
  readonly value: string;
  /** Uncertainty divided by 10^power, to the same place; null where there is none. */
  readonly uncertainty: string | null;
  readonly power: number;
}

export interface PrintOptions {
  /** Digits of the uncertainty: 2 (tables), or 1 (sentences; two where one digit would be a 1). Default 2. */
  readonly digits?: 1 | 2;
  /** Power of ten taken out; "auto" takes one out below 0.01 and from 100 000. Default "auto". */
  readonly power?: number | "auto";
}

/**
 * Value led by its uncertainty. Without an uncertainty (null or 0) nothing says how many digits count: at most four
 * significant digits are printed and trailing zeros dropped. Throws RangeError on a value that is not finite.
 */
export function printUncertain(
  value: number,
  uncertainty: number | null,
  options: PrintOptions = {},
): PrintedUncertain {
  assertFinite(value);
  const { digits = 2, power: wanted = "auto" } = options;
  if (uncertainty === null || uncertainty === 0) {
    const power = wanted === "auto" ? powerFor(value) : wanted;
    const scaled = scale(value, power);
    return {
      value: dress(withoutTrailingZeros(atPlace(scaled, placeOf(scaled, 4)))),
      uncertainty: null,
      power,
    };
  }
  assertFinite(uncertainty);
  if (uncertainty < 0) throw new RangeError(`an uncertainty is not negative, got ${uncertainty}`);
  const power = wanted === "auto" ? powerFor(Math.max(Math.abs(value), uncertainty)) : wanted;
  const scaled = scale(uncertainty, power);
  const place = placeOfUncertainty(scaled, digits);
  return {
    value: dress(atPlace(scale(value, power), place)),
    uncertainty: dress(atPlace(scaled, place)),
    power,
  };
}

/** A number alone, to so many significant digits, trailing zeros kept: "0.0120", "17\u202f900", "2.86 × 10⁻⁵". */
export function printNumber(value: number, significantDigits: number): string {
  assertFinite(value);
  const power = powerFor(Number(value.toPrecision(significantDigits)));
  const scaled = scale(value, power);
  const mantissa = dress(atPlace(scaled, placeOf(scaled, significantDigits)));
  return power === 0 ? mantissa : `${mantissa} × 10${superscript(power)}`;
}

/** Whole number in superscript digits: −5 gives "⁻⁵". */
export function superscript(exponent: number): string {
  const digits = "⁰¹²³⁴⁵⁶⁷⁸⁹";
  return [...String(exponent)].map((sign) => (sign === "-" ? "⁻" : digits.charAt(Number(sign)))).join("");
}

function powerFor(value: number): number {
  if (value === 0) return 0;
  const exponent = exponentOf(value);
  return exponent >= -2 && exponent <= 4 ? 0 : exponent;
}

/** Decimal exponent, from the printed form since log10 errs next to powers of ten. */
function exponentOf(value: number): number {
  return Number(value.toExponential().split("e")[1]);
}

/** Decimal place (…, 1 tens, 0 units, −1 tenths) of the last of so many significant digits after rounding. */
function placeOf(value: number, significantDigits: number): number {
  if (value === 0) return 1 - significantDigits;
  return Number(value.toExponential(significantDigits - 1).split("e")[1]) - significantDigits + 1;
}

function placeOfUncertainty(uncertainty: number, digits: 1 | 2): number {
  const leadsWithOne = [0, 1].some((decimals) => uncertainty.toExponential(decimals).startsWith("1"));
  return placeOf(uncertainty, digits === 1 && !leadsWithOne ? 1 : 2);
}

/** Through the decimal form, so that 1.1e-5 divided by 10^-5 is 1.1 and not its neighbour. */
function scale(value: number, power: number): number {
  if (power === 0) return value;
  const [mantissa, exponent] = value.toExponential().split("e");
  return Number(`${mantissa}e${Number(exponent) - power}`);
}

function atPlace(value: number, place: number): string {
  if (place <= 0) return value.toFixed(Math.min(-place, 100));
  const unit = 10 ** place;
  return (Math.round(value / unit) * unit).toFixed(0);
}

function withoutTrailingZeros(text: string): string {
  return text.includes(".") ? text.replace(/\.?0+$/, "") : text;
}

function dress(text: string): string {
  const negative = text.startsWith("-") && /[1-9]/.test(text);
  const [whole = "", fraction] = text.replace("-", "").split(".");
  const grouped = whole.length >= 5 ? whole.replace(/\B(?=(\d{3})+$)/g, GROUP) : whole;
  return `${negative ? MINUS : ""}${grouped}${fraction === undefined ? "" : `.${fraction}`}`;
}

function assertFinite(value: number): void {
  if (!Number.isFinite(value)) throw new RangeError(`only finite numbers are printed, got ${value}`);
}
