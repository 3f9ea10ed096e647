import { parseNumber } from "./parse-number";

/**
 * A value with its standard uncertainty as written at the bench: "25.0 ± 0.1", "25,0 +- 0,1", "25.0(1)",
 * "17930 ± 0.4 %", "(2.86 ± 0.07) × 10⁻⁵". The number in brackets counts in units of the last digit (IUPAC).
 * Without an uncertainty the value is exact.
 */
export type TypedUncertain =
  | { readonly status: "uncertain"; readonly value: number; readonly standardUncertainty: number }
  | { readonly status: "empty" }
  | { readonly status: "not-readable"; readonly message: string };

const LONGEST = 80;
const PLUS_MINUS = /\s*(?:±|\+\s*\/\s*-|\+\s*\/\s*−|\+-|\+−)\s*/;

export function parseUncertain(typed: string): TypedUncertain {
  const text = typed.slice(0, LONGEST + 1).trim();
  if (text === "") return { status: "empty" };
  if (text.length > LONGEST) return unreadable(`${typed.slice(0, 20)}…`);
  const wrapped = /^\((.*?)\)(\s*[x×*·]\s*10.*|[eE].*)$/u.exec(text);
  if (wrapped && PLUS_MINUS.test(wrapped[1] ?? "")) return scaled(wrapped[1] ?? "", wrapped[2] ?? "", text);
  const parts = text.split(PLUS_MINUS);
  if (parts.length > 2) return unreadable(text);
  const [valueText = "", uncertaintyText] = parts;
  return uncertaintyText === undefined ? concise(text) : plusMinus(valueText, uncertaintyText, text);
}

function unreadable(text: string): TypedUncertain {
  return {
    status: "not-readable",
    message: `“${text}” is not read. Write a value with its standard uncertainty as 25.0 ± 0.1 or 25.0(1).`,
  };
}

function scaled(inner: string, power: string, text: string): TypedUncertain {
  const factor = parseNumber(`1${power}`);
  const mantissa = parseUncertain(inner);
  if (factor.status !== "number" || mantissa.status !== "uncertain") return unreadable(text);
  return checked(
    clean(mantissa.value * factor.value),
    clean(mantissa.standardUncertainty * factor.value),
    text,
  );
}

function plusMinus(valueText: string, uncertaintyText: string, text: string): TypedUncertain {
  const percent = /^(.*?)\s*%$/.exec(uncertaintyText);
  const value = parseNumber(valueText);
  const uncertainty = parseNumber(percent?.[1] ?? uncertaintyText);
  if (value.status !== "number" || uncertainty.status !== "number") return unreadable(text);
  return checked(
    value.value,
    percent ? clean((Math.abs(value.value) * uncertainty.value) / 100) : uncertainty.value,
    text,
  );
}

/** "25.0(1)", "2.86(7)e-5"; without brackets an exact value. */
function concise(text: string): TypedUncertain {
  const match = /^([^()]*?)\s*\((\d{1,4})\)(.*)$/.exec(text);
  const value = parseNumber(match ? `${match[1]}${match[3]}` : text);
  if (value.status !== "number") return unreadable(text);
  if (!match) return { status: "uncertain", value: value.value, standardUncertainty: 0 };
  return checked(value.value, clean(Number(match[2]) * 10 ** -value.decimals), text);
}

function checked(value: number, standardUncertainty: number, text: string): TypedUncertain {
  if (standardUncertainty < 0) {
    return { status: "not-readable", message: `In “${text}” the uncertainty is negative; it has no sign.` };
  }
  return { status: "uncertain", value, standardUncertainty };
}

/** Drops the last digits' noise of a decimal that went through binary arithmetic. */
function clean(value: number): number {
  return Number(value.toPrecision(12));
}
