import { z } from "zod";
import { moment, sha256Column } from "../column";

/** A raw file of the sheet; its bytes are the blob of the same SHA-256. */
export const uploadRow = z.object({
  study_id: z.string(),
  id: z.string(),
  sha256: sha256Column,
  file_name: z.string(),
  size: z.number(),
  at: z.string(),
  member_id: z.string(),
  reading: z.string(),
  changed_in: z.number(),
  removed_in: z.number().nullable(),
});

export type UploadTable = z.infer<typeof uploadRow>;

/**
 * A file on its way in. `receiving` while parts arrive, `received` once whole and hashed; it then waits for
 * somebody to look at the preview and either store its runs or drop it.
 */
export const incomingUploadRow = z.object({
  id: z.string(),
  study_id: z.string(),
  member_id: z.string(),
  blob_id: z.number(),
  file_name: z.string(),
  state: z.enum(["receiving", "received"]),
  size: z.number(),
  sha256: sha256Column.nullable(),
  at: moment,
});

export type IncomingUploadTable = z.infer<typeof incomingUploadRow>;
