import { ionicStrengthOf } from "kinetics-core/ionic-strength";
import { type Flag, inARow, numberInWords } from "kinetics-core/quantities";
import type { Composition, MixingInput } from "./mixing";
import type { Propagated } from "./propagate";

/** Charges that do not balance by more than this part of all charge: a counter-ion is missing, not a rounding. */
const LARGEST_IMBALANCE = 0.01;
/** In size: beyond any ion, polyelectrolytes included. */
const LARGEST_CHARGE = 1e4;

/** A solved solution in plain records by species, with its ionic strength. */
export function compositionOf(
  label: string,
  species: readonly string[],
  { concentrations, effects }: Propagated,
  totalVolume: number | null,
  charges: MixingInput["charges"],
): Composition {
  const record = (values: ArrayLike<number>) =>
    Object.fromEntries(species.map((name, i) => [name, values[i] ?? 0]));
  const variances = new Float64Array(species.length);
  for (const effect of effects.values())
    for (let i = 0; i < species.length; i++) variances[i] = (variances[i] ?? 0) + (effect[i] ?? 0) ** 2;
  const { ionicStrength, flags } = strengthOf(label, species, { concentrations, effects }, charges);
  return {
    totalVolume,
    concentrations: record(concentrations),
    standardUncertainties: record(variances.map(Math.sqrt)),
    effects: [...effects]
      .filter(([, effect]) => effect.some((value) => value !== 0))
      .map(([source, effect]) => ({ source, concentrations: record(effect) })),
    ionicStrength,
    flags,
  };
}

function strengthOf(
  label: string,
  species: readonly string[],
  { concentrations, effects }: Propagated,
  charges: MixingInput["charges"],
): Pick<Composition, "ionicStrength" | "flags"> {
  if (charges === undefined) return { ionicStrength: null, flags: [] };
  const numbers = species.map((name) => chargeOf(charges, name));
  const unknown = species.filter((_, i) => numbers[i] === undefined && (concentrations[i] ?? 0) > 0);
  if (unknown.length > 0)
    return {
      ionicStrength: null,
      flags: [
        {
          code: "charge-missing",
          severity: "note",
          message: `${label} has no ionic strength, since the charge of ${inARow(unknown)} is not given. Give it, 0 for a neutral species.`,
        },
      ],
    };
  const known = numbers.map((number) => number ?? 0);
  const value = ionicStrengthOf(concentrations, known);
  let variance = 0;
  for (const effect of effects.values()) variance += ionicStrengthOf(effect, known) ** 2;
  return {
    ionicStrength: { value, standardUncertainty: Math.sqrt(variance) },
    flags: imbalanceFlags(label, concentrations, known),
  };
}

/** Undefined where it is not given or is no charge that an ion has. */
function chargeOf(charges: Readonly<Record<string, number>>, species: string): number | undefined {
  const charge = Object.hasOwn(charges, species) ? charges[species] : undefined;
  return charge !== undefined && Math.abs(charge) <= LARGEST_CHARGE ? charge : undefined;
}

function imbalanceFlags(
  label: string,
  concentrations: Float64Array,
  charges: readonly number[],
): readonly Flag[] {
  let net = 0;
  let all = 0;
  charges.forEach((charge, i) => {
    net += charge * (concentrations[i] ?? 0);
    all += Math.abs(charge) * (concentrations[i] ?? 0);
  });
  if (Math.abs(net) <= LARGEST_IMBALANCE * all) return [];
  return [
    {
      code: "charges-unbalanced",
      severity: "weakens",
      message: `The charges in ${label} do not balance: ${numberInWords(Math.abs(net))} mol/L of ${net > 0 ? "positive" : "negative"} charge has no counter-ion, so its ionic strength is too small. Add the counter-ions to the stocks.`,
    },
  ];
}
