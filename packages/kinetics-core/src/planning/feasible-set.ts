import { inARow, numberInWords } from "kinetics-core/quantities";

/** Starting concentrations by species, in the unit of the law. */
export type Recipe = Readonly<Record<string, number>>;

/** What can be mixed and measured: a box in ln c, cut by the volumes that the stocks take. */
export interface FeasibleSet {
  /** Least and greatest concentration of each species, above 0; equal where it is not varied. */
  readonly ranges: Readonly<Record<string, readonly [number, number]>>;
  /** Stock concentration of each species that takes volume: Σ c_i/stock_i ≤ 1. */
  readonly stocks: Readonly<Record<string, number>>;
}

export interface PlanningStock {
  readonly species: string;
  /** Of the stock, in the unit of the law. */
  readonly concentration: number;
  /** Least volume that is pipetted well, and the greatest at hand; in the unit of `totalVolume`. */
  readonly leastVolume: number;
  readonly mostVolume: number;
}

export interface FeasibleRequest {
  readonly stocks: readonly PlanningStock[];
  readonly totalVolume: number;
  /** Concentrations between which a species can be measured: the linear range of the followed one. */
  readonly limits?: Readonly<Record<string, readonly [number, number]>>;
}

export type FeasibleResult =
  | { readonly status: "feasible"; readonly set: FeasibleSet }
  | { readonly status: "nothing-feasible"; readonly place: string; readonly message: string };

/** Volumes and limits into ranges. Refuses stocks that cannot be mixed at all, and says which. */
export function feasibleSet({ stocks, totalVolume, limits = {} }: FeasibleRequest): FeasibleResult {
  const refuse = (place: string, message: string): FeasibleResult => ({
    status: "nothing-feasible",
    place,
    message,
  });
  if (!(totalVolume > 0) || !Number.isFinite(totalVolume))
    return refuse("totalVolume", `The total volume is ${totalVolume}; it must be above 0.`);
  const ranges: Record<string, readonly [number, number]> = {};
  for (const [index, stock] of stocks.entries()) {
    const { species, concentration, leastVolume, mostVolume } = stock;
    if (!(concentration > 0) || !(leastVolume > 0) || !(mostVolume >= leastVolume))
      return refuse(
        `stocks.${index}`,
        `The stock of ${species} needs a concentration above 0 and a least volume above 0 and not over the greatest.`,
      );
    const [least, most] = limits[species] ?? [0, Number.POSITIVE_INFINITY];
    const low = Math.max((concentration * leastVolume) / totalVolume, least);
    const high = Math.min((concentration * Math.min(mostVolume, totalVolume)) / totalVolume, most);
    if (!(low <= high))
      return refuse(
        `stocks.${index}`,
        `${species} cannot be set within its limits: its stock gives ${numberInWords((concentration * leastVolume) / totalVolume)} at least, the limit is ${numberInWords(high)}. Dilute the stock.`,
      );
    ranges[species] = [low, high];
  }
  const set: FeasibleSet = {
    ranges,
    stocks: Object.fromEntries(stocks.map(({ species, concentration }) => [species, concentration])),
  };
  const leanest = Object.fromEntries(Object.entries(ranges).map(([name, [low]]) => [name, low]));
  return isFeasible(set, leanest)
    ? { status: "feasible", set }
    : refuse(
        "totalVolume",
        `The least volumes of ${inARow(Object.keys(ranges))} together exceed the total volume. Use stronger stocks or a larger vessel.`,
      );
}

/** Rounding of a share of the volume is no overflow. */
const TOLERANCE = 1e-9;

export function isFeasible({ ranges, stocks }: FeasibleSet, recipe: Recipe): boolean {
  let share = 0;
  for (const [name, [low, high]] of Object.entries(ranges)) {
    const value = recipe[name] ?? Number.NaN;
    if (!(value >= low * (1 - TOLERANCE) && value <= high * (1 + TOLERANCE))) return false;
    share += value / (stocks[name] ?? Number.POSITIVE_INFINITY);
  }
  return share <= 1 + TOLERANCE;
}

/** Recipes of a grid together; more species get fewer levels each. */
const MOST_RECIPES = 4000;
const MOST_LEVELS = 13;
const FEWEST_LEVELS = 2;

/** A grid of feasible recipes, even in ln c, ends included. */
export function recipeGrid(set: FeasibleSet): readonly Recipe[] {
  const varied = Object.values(set.ranges).filter(([low, high]) => high > low).length;
  const levels = Math.max(
    FEWEST_LEVELS,
    Math.min(MOST_LEVELS, Math.floor(MOST_RECIPES ** (1 / Math.max(varied, 1)))),
  );
  let recipes: Recipe[] = [{}];
  for (const [name, [low, high]] of Object.entries(set.ranges)) {
    const values =
      high > low ? Array.from({ length: levels }, (_, i) => low * (high / low) ** (i / (levels - 1))) : [low];
    recipes = recipes.flatMap((recipe) => values.map((value) => ({ ...recipe, [name]: value })));
  }
  return recipes.filter((recipe) => isFeasible(set, recipe));
}

/** A step in ln c below which no pipette follows. */
const FINEST_STEP = 0.005;

/**
 * From a recipe to a better one nearby, by steps in ln c of one species, or of two against each other so that it can
 * slide along the limit of the volume; the step is halved where none helps. `score` is to be large; null: not usable.
 */
export function refineRecipe(
  set: FeasibleSet,
  start: Recipe,
  score: (recipe: Recipe) => number | null,
): { readonly recipe: Recipe; readonly score: number } {
  const names = Object.entries(set.ranges).flatMap(([name, [low, high]]) => (high > low ? [name] : []));
  let best = { recipe: start, score: score(start) ?? Number.NEGATIVE_INFINITY };
  for (let step = 0.4; step >= FINEST_STEP; ) {
    let improved = false;
    for (const moves of movesOf(names, step)) {
      const moved = within(set, { ...best.recipe, ...movedBy(best.recipe, moves) });
      const value = moved === null ? null : score(moved);
      if (moved === null || value === null || !(value > best.score + 1e-12 * Math.abs(best.score))) continue;
      best = { recipe: moved, score: value };
      improved = true;
    }
    if (!improved) step /= 2;
  }
  return best;
}

type Move = readonly [string, number];

function movesOf(names: readonly string[], step: number): readonly (readonly Move[])[] {
  return names.flatMap((name, i) => [
    [[name, step] as const],
    [[name, -step] as const],
    ...names.slice(i + 1).flatMap((other) => [
      [[name, step] as const, [other, -step] as const],
      [[name, -step] as const, [other, step] as const],
    ]),
  ]);
}

function movedBy(recipe: Recipe, moves: readonly Move[]): Recipe {
  return Object.fromEntries(moves.map(([name, step]) => [name, (recipe[name] ?? 0) * Math.exp(step)]));
}

/** Cut back to the ranges; null where the volume does not suffice. */
function within(set: FeasibleSet, recipe: Recipe): Recipe | null {
  const cut = Object.fromEntries(
    Object.entries(recipe).map(([name, value]) => {
      const [low, high] = set.ranges[name] ?? [value, value];
      return [name, Math.min(high, Math.max(low, value))];
    }),
  );
  return isFeasible(set, cut) ? cut : null;
}
