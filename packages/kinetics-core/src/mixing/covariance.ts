import type { BudgetLine } from "kinetics-core/rate-law";
import type { MixedRow, Mixing } from "./mixing";

/** A concentration of a run: which row of the sheet, which species. */
export interface ConcentrationPlace {
  readonly label: string;
  readonly species: string;
}

/**
 * Covariance of concentrations of the runs, (mol/L)², row and column in the order of `places`: Σ over sources of the
 * product of their effects. Null where a place names a run that was not mixed.
 */
export function concentrationCovariance(
  mixing: Mixing,
  places: readonly ConcentrationPlace[],
): readonly (readonly number[])[] | null {
  const effects = places.map(({ label, species }) => {
    const row = mixedRun(mixing, label);
    return row === null
      ? null
      : new Map(row.effects.map((effect) => [effect.source, effect.concentrations[species] ?? 0]));
  });
  if (effects.some((one) => one === null)) return null;
  return effects.map((first) =>
    effects.map((second) => {
      let sum = 0;
      for (const [source, effect] of first ?? []) sum += effect * (second?.get(source) ?? 0);
      return sum;
    }),
  );
}

/**
 * Where the uncertainty of one concentration comes from, as relative standard uncertainties by source, largest first;
 * the deliveries of one step or run are one line. Empty where it is exact, 0, or of a run that was not mixed.
 */
export function concentrationBudget(
  mixing: Mixing,
  { label, species }: ConcentrationPlace,
): readonly BudgetLine[] {
  const row = mixedRun(mixing, label);
  const concentration = row?.concentrations[species] ?? 0;
  if (row === null || concentration === 0) return [];
  const squares = new Map<string, number>();
  for (const { source, concentrations } of row.effects) {
    const name = mixing.sources[source]?.name ?? "";
    const part = ((concentrations[species] ?? 0) / concentration) ** 2;
    if (part > 0) squares.set(name, (squares.get(name) ?? 0) + part);
  }
  return [...squares]
    .map(([source, square]) => ({ source, relative: Math.sqrt(square) }))
    .sort((a, b) => b.relative - a.relative);
}

function mixedRun(mixing: Mixing, label: string): MixedRow | null {
  const row = mixing.runs.find((one) => one.label === label && one.status === "mixed");
  return row?.status === "mixed" ? row : null;
}
