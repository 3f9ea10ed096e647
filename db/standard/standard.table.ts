import { z } from "zod";
import { flag } from "../column";

/** A standard of the sheet. `signals` is a JSON array of numbers. */
export const standardRow = z.object({
  study_id: z.string(),
  id: z.string(),
  label: z.string(),
  position: z.number(),
  molar: z.number(),
  molar_uncertainty: z.number(),
  signals: z.string(),
  is_blank: flag,
  set_aside_reason: z.string().nullable(),
  set_aside_member_id: z.string().nullable(),
  set_aside_at: z.string().nullable(),
  remark: z.string(),
  changed_in: z.number(),
  removed_in: z.number().nullable(),
});

export type StandardTable = z.infer<typeof standardRow>;
