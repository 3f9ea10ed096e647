import { z } from "zod";

/** A scan of the sheet; its points are a blob of their SHA-256, like those of a trace. */
export const scanRow = z.object({
  study_id: z.string(),
  id: z.string(),
  label: z.string(),
  position: z.number(),
  species_id: z.string().nullable(),
  molar: z.number().nullable(),
  points_sha256: z.string(),
  points: z.number(),
  points_upload_id: z.string().nullable(),
  points_column: z.string(),
  changed_in: z.number(),
  removed_in: z.number().nullable(),
});

export type ScanTable = z.infer<typeof scanRow>;
