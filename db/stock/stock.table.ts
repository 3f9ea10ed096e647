import { z } from "zod";

/** A stock of the sheet. Dilution columns are null together. */
export const stockRow = z.object({
  study_id: z.string(),
  id: z.string(),
  symbol: z.string(),
  name: z.string(),
  position: z.number(),
  from_stock_id: z.string().nullable(),
  taken_microlitre: z.number().nullable(),
  taken_microlitre_uncertainty: z.number().nullable(),
  mark_microlitre: z.number().nullable(),
  mark_microlitre_uncertainty: z.number().nullable(),
  lot: z.string(),
  made_on: z.string(),
  how_known: z.string(),
  changed_in: z.number(),
  removed_in: z.number().nullable(),
});

export type StockTable = z.infer<typeof stockRow>;

export const stockContentRow = z.object({
  study_id: z.string(),
  stock_id: z.string(),
  species_id: z.string(),
  molar: z.number(),
  molar_uncertainty: z.number(),
});

export type StockContentTable = z.infer<typeof stockContentRow>;
