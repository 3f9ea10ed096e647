import type { Sheet, SheetRun, SheetSpecies } from "@/db/sheet/sheet.schema";

/** Runs on the sheet, in their order: everything but the bin. */
export function presentRuns(sheet: Sheet): readonly SheetRun[] {
  return sheet.runs.filter((run) => run.removedIn === null).sort((a, b) => a.position - b.position);
}

/** Species whose starting concentration is a column of the run sheet, in the order in which the law names them. */
export function lawSpecies(sheet: Sheet): readonly SheetSpecies[] {
  return sheet.species.filter((species) => species.inLaw).sort((a, b) => a.position - b.position);
}

export function followedSpecies(sheet: Sheet): SheetSpecies | null {
  return sheet.species.find((species) => species.id === sheet.followedSpeciesId) ?? null;
}
