import type { SheetRun, SheetStock } from "./sheet.schema";

/** Concentrations follow from volumes; without any they were typed. */
export function isMixed(run: Pick<SheetRun, "volumes">): boolean {
  return Object.values(run.volumes).some((volume) => volume > 0);
}

/** Ids of the species that some stock holds: of a mixed run their concentrations are worked out, the others typed. */
export function stockedSpecies(stocks: readonly Pick<SheetStock, "contents">[]): ReadonlySet<string> {
  return new Set(stocks.flatMap((stock) => Object.keys(stock.contents)));
}
