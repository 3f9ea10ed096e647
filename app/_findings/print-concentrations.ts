import { concentrationDisplay } from "@/app/_worksheet/display-units";
import type { SheetRun, SheetSpecies } from "@/db/sheet/sheet.schema";

/** A column of starting concentrations in the species' unit, to common decimals. */
export interface PrintedConcentrations {
  /** In the order of the runs; null where a run holds none. */
  readonly texts: readonly (string | null)[];
  readonly integerDigits: number;
  readonly fractionDigits: number;
}

const MOST_DECIMALS = 6;

/**
 * Decimals follow the finest uncertainty of the column (its first digit), and never hide a digit of four that a
 * value was typed with: 0.50, 2.00 and 4.00, or 20.0 to 100.0.
 */
export function printConcentrations(species: SheetSpecies, runs: readonly SheetRun[]): PrintedConcentrations {
  const { factor } = concentrationDisplay(species.unit);
  const amounts = runs.map((run) => run.concentrations[species.id]);
  const values = amounts.map((amount) =>
    amount === undefined ? null : Number((amount.molar * factor).toPrecision(4)),
  );
  const decimals = Math.min(
    MOST_DECIMALS,
    Math.max(
      0,
      ...values.map((value) => (value === null ? 0 : decimalsOf(value))),
      ...amounts.map((amount, index) => {
        const uncertainty = (amount?.relativeUncertainty ?? 0) * (values[index] ?? 0);
        return uncertainty > 0 ? Math.min(3, Math.ceil(-Math.log10(uncertainty) - 1e-9)) : 0;
      }),
    ),
  );
  const texts = values.map((value) => (value === null ? null : value.toFixed(decimals)));
  return {
    texts,
    integerDigits: Math.max(1, ...texts.map((text) => text?.split(".")[0]?.length ?? 1)),
    fractionDigits: decimals,
  };
}

function decimalsOf(value: number): number {
  const [mantissa = "", exponent = "0"] = String(value).split("e");
  return Math.max(0, (mantissa.split(".")[1]?.length ?? 0) - Number(exponent));
}
