import type { SheetStock } from "../sheet/sheet.schema";
import type { StockContentTable, StockTable } from "./stock.table";

export function stockColumns(studyId: string, stock: SheetStock, revision: number): StockTable {
  const { dilution } = stock;
  return {
    study_id: studyId,
    id: stock.id,
    symbol: stock.symbol,
    name: stock.name,
    position: stock.position,
    from_stock_id: dilution?.fromStockId ?? null,
    taken_microlitre: dilution?.takenMicrolitre.value ?? null,
    taken_microlitre_uncertainty: dilution?.takenMicrolitre.standardUncertainty ?? null,
    mark_microlitre: dilution?.markMicrolitre.value ?? null,
    mark_microlitre_uncertainty: dilution?.markMicrolitre.standardUncertainty ?? null,
    lot: stock.lot,
    made_on: stock.madeOn,
    how_known: stock.howKnown,
    changed_in: revision,
    removed_in: null,
  };
}

export function stockContentColumns(studyId: string, stock: SheetStock): StockContentTable[] {
  return Object.entries(stock.contents).map(([species_id, of]) => ({
    study_id: studyId,
    stock_id: stock.id,
    species_id,
    molar: of.value,
    molar_uncertainty: of.standardUncertainty,
  }));
}

/** Unparsed: `readSheet` parses the whole. */
export function stockFromColumns(row: StockTable, contents: readonly StockContentTable[]) {
  return {
    id: row.id,
    symbol: row.symbol,
    name: row.name,
    position: row.position,
    contents: Object.fromEntries(
      contents.map((of) => [of.species_id, { value: of.molar, standardUncertainty: of.molar_uncertainty }]),
    ),
    dilution:
      row.from_stock_id === null
        ? null
        : {
            fromStockId: row.from_stock_id,
            takenMicrolitre: {
              value: row.taken_microlitre,
              standardUncertainty: row.taken_microlitre_uncertainty,
            },
            markMicrolitre: {
              value: row.mark_microlitre,
              standardUncertainty: row.mark_microlitre_uncertainty,
            },
          },
    lot: row.lot,
    madeOn: row.made_on,
    howKnown: row.how_known,
  };
}
