import { followedSpecies } from "@/app/_worksheet/present-runs";
import type { Sheet, SheetSpecies } from "@/db/sheet/sheet.schema";

/** What the standards contain: as said, else the species that is followed. */
export function calibratedSpecies(sheet: Sheet): SheetSpecies | null {
  const said = sheet.species.find(({ id }) => id === sheet.calibration.speciesId);
  return said ?? followedSpecies(sheet);
}
