import { forRateLaw, mixRuns } from "kinetics-core/mixing";
import type { SharedUncertainty } from "kinetics-core/rate-law";
import { isMixed, stockedSpecies } from "@/db/sheet/mixed-run";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import { lawSpecies, presentRuns } from "../present-runs";
import { mixingInput, mixingName } from "./mixing-input";

/**
 * The sheet with the concentrations of every run that has volumes worked out from them. To be applied by whatever
 * changes a stock, a volume, a mark or the uncertainty of deliveries, in the same change: applied again it changes
 * nothing. A run whose volumes do not add up keeps the concentrations it had, and so does a species that no stock holds.
 */
export function remixed(sheet: Sheet): Sheet {
  const mixed = presentRuns(sheet).filter(isMixed);
  if (mixed.length === 0) return sheet;
  const stocked = stockedSpecies(sheet.stocks);
  const species = lawSpecies(sheet).filter(({ id }) => stocked.has(id));
  const { runs } = forRateLaw(mixRuns(mixingInput(sheet, mixed)), species.map(mixingName));
  const byLabel = new Map(runs.map((row) => [row.label, row]));
  return {
    ...sheet,
    runs: sheet.runs.map((run) => {
      const row = isMixed(run) && run.removedIn === null ? byLabel.get(run.label) : undefined;
      if (row === undefined) return run;
      const worked = species.map((one) => {
        const name = mixingName(one);
        const molar = row.concentrations[name] ?? 0;
        return [
          one.id,
          { molar, relativeUncertainty: Math.min(1, row.relativeUncertainty[name] ?? 0) },
        ] as const;
      });
      return { ...run, concentrations: { ...run.concentrations, ...Object.fromEntries(worked) } };
    }),
  };
}

/** Errors that runs share through stocks and dilution steps, by the names of the law. */
export function sharedThroughStocks(sheet: Sheet, runs: readonly SheetRun[]): readonly SharedUncertainty[] {
  const mixed = runs.filter(isMixed);
  if (mixed.length === 0) return [];
  const names = lawSpecies(sheet).map(mixingName);
  return forRateLaw(mixRuns(mixingInput(sheet, mixed)), names).shared;
}
