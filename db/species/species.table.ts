import { z } from "zod";
import { flag } from "../column";
import { concentrationUnit, speciesRole } from "../sheet/sheet.schema";

export const speciesRow = z.object({
  study_id: z.string(),
  id: z.string(),
  symbol: z.string(),
  name: z.string(),
  formula: z.string(),
  stoichiometric_number: z.number(),
  charge: z.number(),
  role: speciesRole,
  in_law: flag,
  unit: concentrationUnit,
  position: z.number(),
  changed_in: z.number(),
  removed_in: z.number().nullable(),
});

export type SpeciesTable = z.infer<typeof speciesRow>;

/** Orders that somebody spoke about: `held_at` null is free. A species without a row is free as well. */
export const speciesOrderRow = z.object({
  study_id: z.string(),
  species_id: z.string(),
  held_at: z.number().nullable(),
  changed_in: z.number(),
  removed_in: z.number().nullable(),
});

export type SpeciesOrderTable = z.infer<typeof speciesOrderRow>;
