import { z } from "zod";
import { flag, moment } from "../column";
import { timeUnit } from "../sheet/sheet.schema";

/** A study's single-valued facts. A quantity and its standard uncertainty are two columns, null together. */
export const studyRow = z.object({
  id: z.string(),
  group_id: z.string(),
  /** Counts within the group, for people. */
  number: z.number().int().positive(),
  /** The latest revision, which this and the other tables show. */
  revision: z.number().int().positive(),
  created_at: moment,
  updated_at: moment,
  name: z.string(),
  invented: flag,
  reaction: z.string(),
  time_unit: timeUnit,
  hazards: z.string(),
  followed_species_id: z.string().nullable(),
  temperature_kelvin: z.number().nullable(),
  temperature_kelvin_uncertainty: z.number().nullable(),
  ionic_strength_molar: z.number().nullable(),
  ionic_strength_molar_uncertainty: z.number().nullable(),
  path_length_centimetre: z.number().nullable(),
  path_length_centimetre_uncertainty: z.number().nullable(),
  wavelength_nanometre: z.number().nullable(),
  solvent: z.string(),
  electrolyte: z.string(),
  signal_kind: z.enum(["concentration", "calibrated"]).nullable(),
  signal_quantity: z.string().nullable(),
  signal_unit: z.string().nullable(),
  signal_per_molar: z.number().nullable(),
  signal_per_molar_uncertainty: z.number().nullable(),
});

export type StudyTable = z.infer<typeof studyRow>;
