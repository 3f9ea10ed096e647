import type { SetUpForm } from "./set-up-form.schema";

/**
 * The rate of reaction as an equation, v = (1/ν_i) d[i]/dt (IUPAC, constant volume), once per species that has a
 * symbol, and at the end for the signal: v = (1/(ν_f·b)) dS/dt with b the signal of 1 mol L⁻¹ of the followed species.
 */
export interface RateTerm {
  readonly sign: "" | "−";
  /** Size of ν as text, "2"; "" for 1. */
  readonly divisor: string;
  readonly change: { readonly kind: "species"; readonly symbol: string } | SignalChange;
}

export interface SignalChange {
  readonly kind: "signal";
  /** Prose: what stands under the fraction bar beside ν, "*ε* *l*", and what changes, "*A*". */
  readonly factor: string;
  readonly quantity: string;
}

export interface RateDefinition {
  readonly terms: readonly RateTerm[];
  /** Sentences that explain it, prose. */
  readonly words: string;
}

export function rateDefinition(form: Pick<SetUpForm, "species" | "signal">): RateDefinition {
  const changing = form.species.filter((row) => row.stoichiometricNumber !== 0);
  const named = changing.filter((row) => row.symbol.trim() !== "");
  const terms = named.map(
    (row): RateTerm => ({
      ...sized(row.stoichiometricNumber),
      change: { kind: "species", symbol: row.symbol.trim() },
    }),
  );
  const followed = changing.find((row) => row.followed);
  const signal = followed && form.signal.kind === "calibrated" ? signalChange(form.signal.quantity) : null;
  if (followed && signal) terms.push({ ...sized(followed.stoichiometricNumber), change: signal });
  const sentences = [
    "Each change of concentration is divided by its signed stoichiometric number, so one rate serves every species.",
  ];
  for (const row of named) {
    const size = Math.abs(row.stoichiometricNumber);
    if (size !== 1) {
      const how = row.stoichiometricNumber < 0 ? "disappears" : "appears";
      sentences.push(
        `${row.name.trim() || row.symbol.trim()} ${how} at ${size === 2 ? "twice" : `${printed(size)} times`} this rate.`,
      );
    }
  }
  if (signal) {
    sentences.push(
      signal.quantity === "*A*"
        ? "The last term is the signal: *A* is absorbance, *ε* the molar absorption coefficient of the followed species, *l* the path length."
        : `The last term is the signal: *S* is ${form.signal.quantity.trim().toLowerCase()}, *b* what 1 mol L^-1 of the followed species adds to it.`,
    );
  }
  return {
    terms,
    words: sentences.map((sentence) => sentence.charAt(0).toUpperCase() + sentence.slice(1)).join(" "),
  };
}

function signalChange(quantity: string): SignalChange {
  return /^absorb/i.test(quantity.trim())
    ? { kind: "signal", factor: "*ε* *l*", quantity: "*A*" }
    : { kind: "signal", factor: "*b*", quantity: "*S*" };
}

function sized(stoichiometricNumber: number): Pick<RateTerm, "sign" | "divisor"> {
  const size = Math.abs(stoichiometricNumber);
  return { sign: stoichiometricNumber < 0 ? "−" : "", divisor: size === 1 ? "" : printed(size) };
}

function printed(size: number): string {
  return String(Number(size.toPrecision(4)));
}
