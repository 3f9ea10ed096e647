import { type Flag, inARow } from "kinetics-core/quantities";
import type { RateLawInput, SharedUncertainty } from "./rate-law";
import type { UsableRun } from "./usable-runs";

/**
 * Errors that runs share. A common relative error e of a stock moves ln v by Σ n_i e over the species made from it; on
 * the rate (ε·l) it moves the measured ln v by e. Where one calibration gives both the rates and a stock's
 * concentration the two partly cancel: the effect is 1 − Σ n_i.
 */
export interface SharedError {
  readonly source: string;
  readonly species: readonly number[];
  readonly onRate: boolean;
  readonly relative: number;
  /** Indices of the runs that share it; null where all do alike, so that it moves k and never the orders. */
  readonly runs: readonly number[] | null;
  /** For each of `runs`: how many times `relative` it moves each of `species`. Null where all are 1. */
  readonly factors: readonly (readonly number[])[] | null;
}

export function sharedErrors(
  input: RateLawInput,
  runs: readonly UsableRun[],
): { readonly errors: readonly SharedError[]; readonly flags: readonly Flag[] } {
  const flags: Flag[] = [];
  const errors = (input.shared ?? []).flatMap((shared) => {
    const unknown = shared.species.filter((name) => !input.species.includes(name));
    if (unknown.length > 0)
      flags.push({
        code: "shared-species-unknown",
        severity: "weakens",
        message: `The shared error ${sourceOf(shared)} names ${inARow(unknown)}, which the law does not contain; that part was not counted. Correct the name, or add the species to the law.`,
      });
    if (!(shared.relative > 0) || !Number.isFinite(shared.relative)) return [];
    const common = membersOf(shared, runs);
    const members = shared.factors === undefined ? common : (common ?? runs.map((_, j) => j));
    if (members !== null && members.length === 0) return [];
    const species = [...new Set(shared.species)]
      .map((name) => input.species.indexOf(name))
      .filter((i) => i >= 0);
    return [
      {
        source: sourceOf(shared),
        species,
        onRate: shared.onRate ?? false,
        relative: shared.relative,
        runs: members,
        factors:
          shared.factors === undefined || members === null
            ? null
            : members.map((j) => species.map((i) => factorOf(shared, runs[j], input.species[i]))),
      },
    ];
  });
  return { errors, flags };
}

/** Change of ln v per unit of the relative error; in the `member`-th of its runs where its factors differ. */
export function effectOf(error: SharedError, orders: readonly number[], member?: number): number {
  const factors = member === undefined ? undefined : error.factors?.[member];
  return error.species.reduce(
    (sum, i, place) => sum - (orders[i] ?? 0) * (factors?.[place] ?? 1),
    error.onRate ? 1 : 0,
  );
}

/** Standard deviation that the error brings to each run's ln v, with its sign. */
export function loadingOf(error: SharedError, orders: readonly number[], rows: number): Float64Array {
  const column = new Float64Array(rows);
  if (error.runs === null) column.fill(error.relative * effectOf(error, orders));
  else
    error.runs.forEach((j, member) => {
      column[j] = error.relative * effectOf(error, orders, member);
    });
  return column;
}

/** Readings of one mixture have one recipe, so the first that is named speaks for all. */
function factorOf(shared: SharedUncertainty, run: UsableRun | undefined, species = ""): number {
  const label = run?.readings.find((reading) => shared.factors?.[reading] !== undefined);
  const factor = label === undefined ? undefined : shared.factors?.[label]?.[species];
  return factor !== undefined && Number.isFinite(factor) ? factor : 1;
}

/** An averaged run shares an error if any of its readings does: it is one mixture. */
function membersOf(shared: SharedUncertainty, runs: readonly UsableRun[]): readonly number[] | null {
  if (shared.runs === undefined) return null;
  const labels = new Set(shared.runs);
  const members = runs.flatMap((run, j) => (run.readings.some((label) => labels.has(label)) ? [j] : []));
  return members.length === runs.length ? null : members;
}

function sourceOf(shared: SharedUncertainty): string {
  if (shared.source !== undefined && shared.source !== "") return shared.source;
  const stock = shared.species.length > 0 ? `Stock of ${inARow(shared.species)}` : "";
  const what = shared.onRate === true ? (stock === "" ? "Rate scale" : `${stock} and the rate scale`) : stock;
  const named = what === "" ? "Shared error" : what;
  return shared.runs === undefined ? named : `${named} (${inARow(shared.runs, 4)})`;
}
