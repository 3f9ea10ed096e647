import { concentrationToMolar } from "kinetics-core/quantities";
import type { TracePreview } from "@/app/_import/preview";
import type { SpeciesContext } from "@/app/_import/reading";
import { parseNumber } from "@/app/_worksheet/typed-number/parse-number";
import { prefilled } from "./view";

/** Typed texts by trace source and species id, over what the file or a planned run gives. */
export type TypedRecipes = Readonly<Record<string, Readonly<Record<string, string>>>>;

export interface RecipeRow {
  readonly trace: TracePreview;
  readonly texts: Readonly<Record<string, string>>;
  readonly faults: Readonly<Record<string, string>>;
  /** mol L⁻¹ by species id, where given and readable. */
  readonly molar: Readonly<Record<string, number>>;
}

/** What the boxes of one trace hold: as typed, else as the file or the planned run gives it. */
export function recipeRow(
  trace: TracePreview,
  species: readonly SpeciesContext[],
  typed: TypedRecipes,
): RecipeRow {
  const texts: Record<string, string> = {};
  const faults: Record<string, string> = {};
  const molar: Record<string, number> = {};
  for (const one of species) {
    const given = trace.recipe[one.id];
    const before = given === undefined ? "" : prefilled(given.molar, one);
    const text = given?.mixed ? before : (typed[trace.source]?.[one.id] ?? before);
    texts[one.id] = text;
    if (given !== undefined && text === before) {
      // Untouched: the very number of the file, not one that went through the text of a box.
      molar[one.id] = given.molar;
      continue;
    }
    const reading = parseNumber(text);
    if (reading.status === "not-a-number") faults[one.id] = reading.message;
    else if (reading.status === "number" && reading.value < 0)
      faults[one.id] = "A concentration is not negative.";
    else if (reading.status === "number") molar[one.id] = concentrationToMolar(reading.value, one.unit);
  }
  return { trace, texts, faults, molar };
}
