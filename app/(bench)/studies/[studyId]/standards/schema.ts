import { z } from "zod";
import { concentrationUnit } from "@/db/sheet/sheet.schema";

const target = { studyId: z.string().min(1).max(64), base: z.number().int().nonnegative() };

export const standardLinesInput = z.object({
  ...target,
  /** Unit of the concentrations in the lines: the one that the page showed, whatever the set-up says by now. */
  unit: concentrationUnit,
  lines: z.string().max(40_000),
});

export const settingsInput = z.object({
  ...target,
  speciesId: z.string().max(64),
  intercept: z.enum(["fitted", "none"]),
  weighting: z.enum(["none", "proportional"]),
  unit: concentrationUnit,
  /** As typed, in `unit`; empty where the line has no such end. */
  low: z.string().max(40),
  high: z.string().max(40),
  /** Percent, as typed. */
  stock: z.string().max(40),
});

export const followInput = z.object({ ...target, follow: z.boolean() });

export const standardAsideInput = z.object({
  ...target,
  standardId: z.string().min(1).max(64),
  /** null takes it back. */
  reason: z.string().trim().min(1).max(300).nullable(),
});
