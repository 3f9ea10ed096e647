import type { RateLawRun, SharedUncertainty } from "kinetics-core/rate-law";
import type { ErrorSource, MixedRow, Mixing } from "./mixing";

/** Effects that differ by less than this part are equal, and effects of this part of the greatest are none. */
const SAME_EFFECT = 1e-9;

export interface RateLawMixtures {
  /** Runs that were mixed, in their order: join each with its rate by the label. */
  readonly runs: readonly Required<Pick<RateLawRun, "label" | "concentrations" | "relativeUncertainty">>[];
  /** What they share, one entry a source. */
  readonly shared: readonly SharedUncertainty[];
}

/**
 * The runs' concentrations and errors in the shape that `fitRateLaw` takes: the private part of each concentration by
 * species, the shared parts as errors with the labels of their runs and the name for the budget. A source that moves
 * several concentrations by different factors (a device in a sum of volumes, two stocks in one run) carries the factors.
 *
 * A run's own deliveries move its species together where they change the total volume; there each species keeps its own
 * relative uncertainty and the correlation within the run is left out, since the scatter of the runs shows it already.
 *
 * @param species of the law, in any order; one that no stock contains has the concentration 0.
 */
export function forRateLaw(mixing: Mixing, species: readonly string[]): RateLawMixtures {
  const rows = mixing.runs.filter((row) => row.status === "mixed");
  const relative = rows.map((row) => relativeEffects(row, species));
  const runs = rows.map((row, j) => ({
    label: row.label,
    concentrations: byName(species, (name) => row.concentrations[name] ?? 0),
    relativeUncertainty: byName(species, (_, i) =>
      Math.sqrt(
        row.effects.reduce(
          (sum, effect) =>
            mixing.sources[effect.source]?.kind === "run"
              ? sum + (relative[j]?.get(effect.source)?.[i] ?? 0) ** 2
              : sum,
          0,
        ),
      ),
    ),
  }));
  const labels = rows.map((row) => row.label);
  const loadings = mixing.sources.flatMap((source, index) =>
    source.kind === "run"
      ? []
      : [{ source, effects: relative.map((row) => row.get(index) ?? species.map(() => 0)) }],
  );
  return {
    runs,
    shared: joined(loadings).flatMap(({ source, effects }) => sharedOf(source, effects, labels, species)),
  };
}

/** Relative change of each concentration for one standard deviation of each source; 0 where there is no concentration. */
function relativeEffects(row: MixedRow, species: readonly string[]): ReadonlyMap<number, readonly number[]> {
  return new Map(
    row.effects.map(({ source, concentrations }) => [
      source,
      species.map((name) => {
        const concentration = row.concentrations[name] ?? 0;
        return concentration > 0 ? (concentrations[name] ?? 0) / concentration : 0;
      }),
    ]),
  );
}

interface Loading {
  readonly source: ErrorSource;
  /** Run by run, species by species. */
  readonly effects: readonly (readonly number[])[];
}

/** Deliveries of one step that act in proportion (aliquot and flask of a dilution) are one error of the step. */
function joined(loadings: readonly Loading[]): readonly Loading[] {
  const result: Loading[] = [];
  for (const loading of loadings) {
    const twin = result.findIndex(
      (one) =>
        one.source.kind === loading.source.kind &&
        one.source.name === loading.source.name &&
        ratioOf(one, loading) !== null,
    );
    const other = result[twin];
    const ratio = other === undefined ? null : ratioOf(other, loading);
    if (other === undefined || ratio === null) result.push(loading);
    else {
      const factor = Math.hypot(1, ratio);
      result[twin] = { ...other, effects: other.effects.map((row) => row.map((value) => factor * value)) };
    }
  }
  return result;
}

/** Factor between two loadings that are proportional; null where they are not. */
function ratioOf(first: Loading, second: Loading): number | null {
  const a = first.effects.flat();
  const b = second.effects.flat();
  const squares = a.reduce((sum, value) => sum + value * value, 0);
  if (squares === 0) return null;
  const ratio = a.reduce((sum, value, i) => sum + value * (b[i] ?? 0), 0) / squares;
  const greatest = greatestOf(b);
  return b.every((value, i) => Math.abs(value - ratio * (a[i] ?? 0)) <= SAME_EFFECT * greatest)
    ? ratio
    : null;
}

function sharedOf(
  source: ErrorSource,
  effects: readonly (readonly number[])[],
  labels: readonly string[],
  species: readonly string[],
): readonly SharedUncertainty[] {
  const flat = effects.flat();
  const relative = greatestOf(flat);
  if (relative === 0) return [];
  const sign = Math.sign(flat.find((value) => Math.abs(value) === relative) ?? 1);
  const factors = effects.map((row) =>
    row.map((value) => (Math.abs(value) <= SAME_EFFECT * relative ? 0 : (sign * value) / relative)),
  );
  const places = species.flatMap((_, i) => (factors.some((row) => row[i] !== 0) ? [i] : []));
  const members = labels.flatMap((_, j) => (factors[j]?.some((factor) => factor !== 0) ? [j] : []));
  const alike = members.every((j) =>
    places.every((i) => Math.abs((factors[j]?.[i] ?? 0) - 1) <= SAME_EFFECT),
  );
  return [
    {
      species: places.map((i) => species[i] ?? ""),
      relative,
      source: source.name,
      ...(members.length === labels.length ? {} : { runs: members.map((j) => labels[j] ?? "") }),
      ...(alike
        ? {}
        : {
            factors: Object.fromEntries(
              members.map((j) => [
                labels[j] ?? "",
                Object.fromEntries(places.map((i) => [species[i] ?? "", factors[j]?.[i] ?? 0])),
              ]),
            ),
          }),
    },
  ];
}

function greatestOf(values: readonly number[]): number {
  return values.reduce((greatest, value) => Math.max(greatest, Math.abs(value)), 0);
}

function byName(
  species: readonly string[],
  value: (name: string, index: number) => number,
): Readonly<Record<string, number>> {
  return Object.fromEntries(species.map((name, i) => [name, value(name, i)]));
}
