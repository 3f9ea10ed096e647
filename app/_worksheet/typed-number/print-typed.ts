import type { Uncertain } from "kinetics-core/quantities";

/**
 * The text of a box that a person edits: full precision, so that what is printed reads back as the same number.
 * Nothing is rounded to its uncertainty here; tables and sentences do that.
 */
export function typedNumber(value: number): string {
  const clean = Number(value.toPrecision(12));
  return (
    clean === 0 || (Math.abs(clean) >= 1e-4 && Math.abs(clean) < 1e7) ? String(clean) : shortExponent(clean)
  ).replace("-", "−");
}

function shortExponent(value: number): string {
  return value.toExponential().replace("e+", "e").replace("e-", "e−");
}

/** "25.0 ± 0.1": both to the decimals of the longer one; an exact value stands alone. */
export function typedUncertain({ value, standardUncertainty }: Uncertain): string {
  const valueText = typedNumber(value);
  if (standardUncertainty === 0) return valueText;
  const uncertaintyText = typedNumber(standardUncertainty);
  if (valueText.includes("e") || uncertaintyText.includes("e")) return `${valueText} ± ${uncertaintyText}`;
  const decimals = Math.max(decimalsOf(valueText), decimalsOf(uncertaintyText));
  return `${padded(valueText, decimals)} ± ${padded(uncertaintyText, decimals)}`;
}

function decimalsOf(text: string): number {
  return text.split(".")[1]?.length ?? 0;
}

function padded(text: string, decimals: number): string {
  const missing = decimals - decimalsOf(text);
  if (missing === 0) return text;
  return `${text.includes(".") ? text : `${text}.`}${"0".repeat(missing)}`;
}
