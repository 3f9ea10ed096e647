import { printUncertain } from "kinetics-core/quantities";

/** A value with its standard uncertainty for a sentence: "17 930 ± 110", "(2.86 ± 0.07) × 10^-5". */
export function uncertainText(value: number, standardUncertainty: number | null): string {
  const printed = printUncertain(value, standardUncertainty);
  const pair = printed.uncertainty === null ? printed.value : `${printed.value} ± ${printed.uncertainty}`;
  if (printed.power === 0) return pair;
  return `${printed.uncertainty === null ? pair : `(${pair})`} × 10^${printed.power}`;
}
