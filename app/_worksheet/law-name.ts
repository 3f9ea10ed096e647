import type { SheetSpecies } from "@/db/sheet/sheet.schema";

/** The name under which the law, its tables and its checks speak of a species. */
export function lawName(species: SheetSpecies): string {
  return species.symbol || species.formula || species.name;
}
