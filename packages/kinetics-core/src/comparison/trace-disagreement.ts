import { type Estimate, type Flag, printUncertain } from "kinetics-core/quantities";
import { DISAGREEMENT_FACTOR } from "./constants";

/**
 * The law from rates stands; the fit of the traces stands beside it. Both come from the same readings, so their
 * difference is less uncertain than either, and where it exceeds twice the greater standard uncertainty of the two one
 * of them is wrong: the window of the rates, or the law that the traces were fitted with.
 */
export function traceDisagreement(
  fromRates: Readonly<Record<string, Estimate>>,
  fromTraces: Readonly<Record<string, Estimate>>,
): readonly Flag[] {
  return Object.entries(fromRates).flatMap(([name, rates]): readonly Flag[] => {
    const traces = fromTraces[name];
    const a = known(rates);
    const b = traces === undefined ? null : known(traces);
    if (a === null || b === null) return [];
    const greater = Math.max(a.error, b.error);
    if (Math.abs(a.value - b.value) <= DISAGREEMENT_FACTOR * greater) return [];
    return [
      {
        code: "trace-fit-disagrees",
        severity: "weakens",
        message: `From rates ${name} is ${inWords(a)}, from whole traces ${inWords(b)}: they differ by ${(Math.abs(a.value - b.value) / greater).toFixed(1)} standard uncertainties. The law may change as the reaction proceeds; look at the residuals of the traces, or fit a law with a reverse reaction or an inhibiting product.`,
      },
    ];
  });
}

interface Known {
  readonly value: number;
  readonly error: number;
}

function known({ estimate, standardError }: Estimate): Known | null {
  return estimate === null || standardError === null || !(standardError > 0)
    ? null
    : { value: estimate, error: standardError };
}

function inWords({ value, error }: Known): string {
  const printed = printUncertain(value, error, { power: 0 });
  return printed.uncertainty === null ? printed.value : `${printed.value} ± ${printed.uncertainty}`;
}
