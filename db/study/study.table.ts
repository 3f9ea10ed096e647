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
  activation_energy: z.number().nullable(),
  activation_energy_uncertainty: z.number().nullable(),
  reference_ionic_strength_molar: z.number().nullable(),
  sample_interval_seconds: z.number().nullable(),
  signal_kind: z.enum(["concentration", "calibrated"]).nullable(),
  signal_quantity: z.string().nullable(),
  signal_unit: z.string().nullable(),
  signal_per_molar: z.number().nullable(),
  signal_per_molar_uncertainty: z.number().nullable(),
  signal_blank: z.number().nullable(),
  signal_blank_uncertainty: z.number().nullable(),
  signal_source: z.string().nullable(),
  mixing_volume_unit: z.string(),
  mixing_mark_microlitre: z.number().nullable(),
  /** JSON array. */
  mixing_deliveries: z.string(),
  calibration_species_id: z.string().nullable(),
  calibration_intercept: z.string(),
  calibration_weighting: z.string(),
  calibration_range_low_molar: z.number().nullable(),
  calibration_range_high_molar: z.number().nullable(),
  calibration_stock_relative: z.number(),
});

export type StudyTable = z.infer<typeof studyRow>;
