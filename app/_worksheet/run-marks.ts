import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import type { RunMark } from "./analysis";
import { lawSpecies, presentRuns } from "./present-runs";

/**
 * One mark per run, everywhere. The base recipe is the one from which most runs differ in a single species;
 * the species varied first (in the order of the sheet) makes the first series, and so on. Levels count the
 * distinct concentrations of the series' species over the whole sheet, the base's own among them, lowest first,
 * so that a mark keeps its place when runs are set aside: the marks depend on recipes alone.
 */

const SERIES = ["first", "second", "third"] as const;

/** Concentrations that differ by less are one level: pipetting scatter, not a plan. */
const SAME_LEVEL = 0.005;

export function runMarks(sheet: Sheet): ReadonlyMap<string, RunMark> {
  const { runs, species, levels, recipes, base, order } = readDesign(sheet);
  const seen = new Set<string>();
  const marks = new Map<string, RunMark>();
  for (const run of runs) {
    const recipe = recipes.get(run.id) ?? [];
    const key = recipe.join(" ");
    const rank = order.findIndex((index) => recipe[index] !== base[index]);
    const index = order[rank];
    const varied = index === undefined ? undefined : species[index];
    marks.set(run.id, {
      series: varied === undefined ? "base" : (SERIES[Math.min(rank, SERIES.length - 1)] ?? "third"),
      level: index === undefined ? 0 : (recipe[index] ?? 0),
      levels: varied === undefined ? 1 : (levels.get(varied)?.length ?? 1),
      repeat: seen.has(key),
    });
    seen.add(key);
  }
  return marks;
}

/** Ids of the species in the order in which the sheet varies them; species that never vary are left out. */
export function variedSpecies(sheet: Sheet): readonly string[] {
  const { species, order } = readDesign(sheet);
  return order.flatMap((index) => species[index] ?? []);
}

/** Recipes as level numbers per species, so that pipetting scatter does not make two of one. */
function readDesign(sheet: Sheet) {
  const species = lawSpecies(sheet).map((one) => one.id);
  const runs = presentRuns(sheet);
  const levels = new Map(species.map((id) => [id, distinctLevels(runs, id)]));
  const recipes: Recipes = new Map(
    runs.map((run) => [run.id, species.map((id) => levelOf(levels.get(id) ?? [], molarOf(run, id)))]),
  );
  const base = baseRecipe(runs, recipes);
  return { runs, species, levels, recipes, base, order: varyingOrder(runs, recipes, base) };
}

/** Distinct concentrations of one species over some runs, in mol L⁻¹, ascending. */
export function distinctLevels(runs: readonly SheetRun[], speciesId: string): readonly number[] {
  const sorted = runs.map((run) => molarOf(run, speciesId)).sort((a, b) => a - b);
  const levels: number[] = [];
  for (const value of sorted) {
    const last = levels.at(-1);
    if (last === undefined || value - last > SAME_LEVEL * value) levels.push(value);
  }
  return levels;
}

function molarOf(run: SheetRun, speciesId: string): number {
  return run.concentrations[speciesId]?.molar ?? 0;
}

function levelOf(levels: readonly number[], value: number): number {
  let level = 0;
  for (let i = 0; i < levels.length; i++) if ((levels[i] ?? 0) <= value) level = i;
  return level;
}

type Recipes = ReadonlyMap<string, readonly number[]>;

function baseRecipe(runs: readonly SheetRun[], recipes: Recipes): readonly number[] {
  let best: { recipe: readonly number[]; neighbours: number; repeats: number } | null = null;
  for (const run of runs) {
    const recipe = recipes.get(run.id) ?? [];
    let neighbours = 0;
    let repeats = 0;
    for (const other of recipes.values()) {
      const differing = other.filter((level, i) => level !== recipe[i]).length;
      if (differing === 1) neighbours++;
      if (differing === 0) repeats++;
    }
    const better =
      best === null ||
      neighbours + repeats > best.neighbours + best.repeats ||
      (neighbours + repeats === best.neighbours + best.repeats && repeats > best.repeats);
    if (better) best = { recipe, neighbours, repeats };
  }
  return best?.recipe ?? [];
}

/** Indices of the species by the first run that varies it alone, then by the first run that varies it at all. */
function varyingOrder(
  runs: readonly SheetRun[],
  recipes: Recipes,
  base: readonly number[],
): readonly number[] {
  const alone: number[] = [];
  const together: number[] = [];
  for (const run of runs) {
    const recipe = recipes.get(run.id) ?? [];
    const differing = recipe.flatMap((level, index) => (level === base[index] ? [] : [index]));
    const target = differing.length === 1 ? alone : together;
    for (const index of differing) if (!target.includes(index)) target.push(index);
  }
  return [...alone, ...together.filter((index) => !alone.includes(index))];
}
