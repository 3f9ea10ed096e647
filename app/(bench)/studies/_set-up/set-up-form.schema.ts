import { z } from "zod";
import { concentrationUnit, speciesRole, timeUnit } from "@/db/sheet/sheet.schema";

/**
 * The set-up as it stands in boxes: texts as typed, read into the sheet's units only when it is kept. New study and
 * Set-up share it. Limits of length are those of the sheet; what the texts mean is decided by `readSetUpForm`.
 */
export const speciesForm = z.object({
  /** Empty for a row that is new. Never a name that every object carries: what runs hold is found by this id. */
  id: z
    .string()
    .max(64)
    .refine((id) => !(id in Object.prototype), "This row is not one of the study. Load the page again."),
  symbol: z.string().max(12, "A symbol has at most 12 characters."),
  name: z.string().max(120, "A name has at most 120 characters."),
  formula: z.string().max(120, "A formula has at most 120 characters."),
  stoichiometricNumber: z.number().min(-99).max(99),
  charge: z.number().int().min(-9).max(9),
  role: speciesRole,
  inLaw: z.boolean(),
  unit: concentrationUnit,
  followed: z.boolean(),
});

export const signalForm = z.object({
  kind: z.enum(["none", "concentration", "calibrated"]),
  concentrationUnit,
  quantity: z.string().max(60, "The quantity has at most 60 characters."),
  unit: z.string().max(20, "The unit has at most 20 characters."),
  perMolar: z.string().max(80),
  blank: z.string().max(80),
});

export const setUpForm = z.object({
  name: z.string().max(160, "A name has at most 160 characters."),
  reaction: z.string().max(400, "A reaction has at most 400 characters."),
  timeUnit,
  hazards: z.string().max(4000, "Cautions have at most 4000 characters."),
  species: z.array(speciesForm).max(24, "A study holds at most 24 species."),
  temperature: z.string().max(80),
  ionicStrength: z.string().max(80),
  pathLength: z.string().max(80),
  wavelength: z.string().max(80),
  activationEnergy: z.string().max(80),
  sampleInterval: z.string().max(80),
  solvent: z.string().max(200, "The solvent has at most 200 characters."),
  electrolyte: z.string().max(120, "The electrolyte has at most 120 characters."),
  signal: signalForm,
});

export type SetUpForm = z.infer<typeof setUpForm>;
export type SpeciesForm = z.infer<typeof speciesForm>;
