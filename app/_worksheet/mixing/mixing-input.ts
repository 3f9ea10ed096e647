import type { MixingInput, Portion, Solute } from "kinetics-core/mixing";
import type { Mixing, Sheet, SheetRun, SheetSpecies, SheetStock } from "@/db/sheet/sheet.schema";
import { lawName } from "../law-name";

/** Stocks, how they are dispensed, and what they may hold. */
export type Preparation = Pick<Sheet, "stocks" | "mixing" | "species">;

/**
 * What `mixRuns` takes, from the stocks and volumes of the sheet. Volumes in µL, concentrations in mol L⁻¹. Species of
 * the law go by the name under which the law knows them, the others by their id.
 */
export function mixingInput(
  sheet: Preparation,
  runs: readonly Pick<SheetRun, "label" | "volumes" | "markMicrolitre">[],
): MixingInput {
  const { stocks, mixing, species } = sheet;
  const byId = new Map(stocks.map((stock) => [stock.id, stock]));
  return {
    solutions: stocks.filter(holdsSolutes).map((stock) => {
      const { dilution } = stock;
      if (dilution === null) {
        return { kind: "stock", name: stockName(stock), solutes: solutesOf(stock, species) };
      }
      const from = byId.get(dilution.fromStockId);
      return {
        kind: "mixture",
        name: stockName(stock),
        portions: [
          {
            solution: from === undefined ? dilution.fromStockId : stockName(from),
            volume: dilution.takenMicrolitre.value,
            standardUncertainty: dilution.takenMicrolitre.standardUncertainty,
          },
        ],
        total: {
          kind: "mark",
          volume: dilution.markMicrolitre.value,
          standardUncertainty: dilution.markMicrolitre.standardUncertainty,
        },
      };
    }),
    runs: runs.map((run) => {
      const mark = run.markMicrolitre ?? mixing.markMicrolitre;
      return {
        label: run.label,
        portions: Object.entries(run.volumes).map(([id, volume]) =>
          portionOf(byId.get(id), id, volume, mixing),
        ),
        total:
          mark === null
            ? { kind: "sum" }
            : { kind: "mark", volume: mark, standardUncertainty: deliveryUncertainty(mark, mixing) },
      };
    }),
    charges: Object.fromEntries(species.map((one) => [mixingName(one), one.charge])),
  };
}

/** Under which a stock stands in tables and sentences; no two stocks of a sheet share it. */
export function stockName(stock: Pick<SheetStock, "symbol" | "name">): string {
  return stock.symbol || stock.name;
}

export function mixingName(species: SheetSpecies): string {
  return species.inLaw ? lawName(species) : species.id;
}

/** Standard uncertainty of one delivery of this size, µL. */
export function deliveryUncertainty(microlitre: number, { deliveries }: Pick<Mixing, "deliveries">): number {
  const fits = deliveries.find(
    ({ upToMicrolitre }) => upToMicrolitre === null || microlitre <= upToMicrolitre,
  );
  const entry = fits ?? deliveries.at(-1);
  return entry === undefined ? 0 : Math.hypot(entry.absoluteMicrolitre, entry.relative * microlitre);
}

function holdsSolutes(stock: SheetStock): boolean {
  return stock.dilution !== null || Object.keys(stock.contents).length > 0;
}

function portionOf(
  stock: SheetStock | undefined,
  id: string,
  volume: number,
  mixing: Pick<Mixing, "deliveries">,
): Portion {
  return {
    solution: stock === undefined ? id : holdsSolutes(stock) ? stockName(stock) : null,
    volume,
    standardUncertainty: volume === 0 ? 0 : deliveryUncertainty(volume, mixing),
  };
}

/**
 * Species with one concentration and one uncertainty are ions of one substance, weighed in together, and share its
 * error; others are substances of their own.
 */
function solutesOf(stock: SheetStock, species: readonly SheetSpecies[]): Solute[] {
  const names = new Map(species.map((one) => [one.id, mixingName(one)]));
  const solutes = new Map<string, { concentration: Solute["concentration"]; members: string[] }>();
  for (const [id, concentration] of Object.entries(stock.contents)) {
    const key = `${concentration.value}/${concentration.standardUncertainty}`;
    const known = solutes.get(key);
    if (known === undefined) solutes.set(key, { concentration, members: [names.get(id) ?? id] });
    else known.members.push(names.get(id) ?? id);
  }
  return [...solutes.values()].map(({ concentration, members }) => ({
    name: members.join(", "),
    concentration,
    species: Object.fromEntries(members.map((member) => [member, 1])),
  }));
}
