import { z } from "zod";
import { bytes } from "../column";

export const revisionRow = z.object({
  study_id: z.string(),
  number: z.number().int().positive(),
  /** Deflated canonical JSON of the sheet. */
  sheet: bytes,
});

export type RevisionTable = z.infer<typeof revisionRow>;
