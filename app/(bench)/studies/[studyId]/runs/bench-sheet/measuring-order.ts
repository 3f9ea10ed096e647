import { randomDraws } from "kinetics-core/random";
import type { SheetRun, SheetSpecies } from "@/db/sheet/sheet.schema";

/** In which order the runs of a session are measured. */
export const ORDERS = ["least", "random", "table"] as const;
export type Order = (typeof ORDERS)[number];

type Mixed = Pick<SheetRun, "concentrations">;

/**
 * `least`: by the species that is varied most, then by the next, so that what is left in a cell or pipette is less than
 * what follows. `random`: shuffled by the seed (Fisher and Yates), the same for the same seed. `table`: as they stand.
 */
export function measuringOrder<Run extends Mixed>(
  runs: readonly Run[],
  species: readonly Pick<SheetSpecies, "id">[],
  order: Order,
  seed: number,
): readonly Run[] {
  if (order === "table") return runs;
  if (order === "random") return shuffled(runs, seed);
  const keys = [...species].sort((a, b) => spread(runs, b.id) - spread(runs, a.id));
  return runs.toSorted((a, b) => {
    for (const { id } of keys) {
      const difference = molarOf(a, id) - molarOf(b, id);
      if (Math.abs(difference) > SAME_LEVEL * molarOf(a, id)) return difference;
    }
    return 0;
  });
}

/** Levels this close are one. */
const SAME_LEVEL = 0.005;

/** The species that the runs vary most; null where they vary none. */
export function mostVaried<Species extends Pick<SheetSpecies, "id">>(
  runs: readonly Mixed[],
  species: readonly Species[],
): Species | null {
  const [first] = [...species].sort((a, b) => spread(runs, b.id) - spread(runs, a.id));
  return first !== undefined && spread(runs, first.id) > 1 + SAME_LEVEL ? first : null;
}

/** Largest over smallest concentration; without one of 0 or more where a run holds none. */
function spread(runs: readonly Mixed[], id: string): number {
  const values = runs.map((run) => molarOf(run, id));
  const least = Math.min(...values);
  const most = Math.max(...values);
  if (most === 0) return 1;
  return least === 0 ? Number.POSITIVE_INFINITY : most / least;
}

function molarOf({ concentrations }: Mixed, id: string): number {
  return concentrations[id]?.molar ?? 0;
}

function shuffled<Run>(runs: readonly Run[], seed: number): readonly Run[] {
  const draws = randomDraws(seed);
  const order = runs.map((run) => run);
  for (let last = order.length - 1; last > 0; last -= 1) {
    const chosen = draws.whole(last + 1);
    const [one, other] = [order[last], order[chosen]];
    if (one !== undefined && other !== undefined) {
      order[last] = other;
      order[chosen] = one;
    }
  }
  return order;
}
