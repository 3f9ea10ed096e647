/**
 * Numbers as people write them: decimal point or comma, a true minus, groups of three set apart by spaces, powers
 * as 1.2e-3 or 1.2 × 10⁻³. One comma alone is a decimal mark, never a thousands separator.
 */
export type TypedNumber =
  | {
      readonly status: "number";
      readonly value: number /** Digits after the decimal mark, after the power. */;
      readonly decimals: number;
    }
  | { readonly status: "empty" }
  | { readonly status: "not-a-number"; readonly message: string };

const LONGEST = 60;

export function parseNumber(typed: string): TypedNumber {
  const text = typed.slice(0, LONGEST + 1).trim();
  if (text === "") return { status: "empty" };
  if (text.length > LONGEST) return notANumber(`${typed.slice(0, 20)}…`);
  const plain = plainMarks(text);
  const power = /^(.*?)\s*(?:[eE]|(?:[x×*·]\s*10\s*\^?\s*))([+-]?\d{1,3})$/.exec(plain);
  const mantissa = (power?.[1] ?? plain).trim();
  const exponent = power?.[2] === undefined ? 0 : Number(power[2]);
  const digits = decimalText(mantissa);
  if (digits === null) return notANumber(text);
  const value = Number(`${digits}e${exponent}`);
  if (!Number.isFinite(value))
    return { status: "not-a-number", message: `${text} is beyond what can be held.` };
  const fraction = digits.split(".")[1]?.length ?? 0;
  return { status: "number", value, decimals: fraction - exponent };
}

function notANumber(text: string): TypedNumber {
  return { status: "not-a-number", message: `“${text}” is not a number. Write it as 12.5 or 12,5.` };
}

const SUPERSCRIPTS = "⁰¹²³⁴⁵⁶⁷⁸⁹";

function plainMarks(text: string): string {
  return text
    .replace(/[−–]/g, "-")
    .replace(/⁻/g, "-")
    .replace(/⁺/g, "+")
    .replace(/[⁰¹²³⁴⁵⁶⁷⁸⁹]/g, (digit) => String(SUPERSCRIPTS.indexOf(digit)));
}

/** "1 234,5" to "1234.5"; null for what is no decimal number. */
function decimalText(text: string): string | null {
  const ungrouped = /^[+-]?\d{1,3}(?:[\u0020\u00A0\u2009\u202F'’]\d{3})+(?:[.,]\d*)?$/u.test(text)
    ? text.replace(/[\u0020\u00A0\u2009\u202F'’]/gu, "")
    : text;
  const both = /^([+-]?\d{1,3})(([.,])\d{3}(?:\3\d{3})*)([.,])(\d+)$/.exec(ungrouped);
  if (both && both[3] !== both[4]) {
    return `${both[1]}${(both[2] ?? "").replace(/[.,]/g, "")}.${both[5]}`;
  }
  const single = ungrouped.replace(",", ".");
  return /^[+-]?(?:\d+\.?\d*|\.\d+)$/.test(single) ? single.replace(/^\+/, "") : null;
}
