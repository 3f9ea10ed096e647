import type { Generated } from "kysely";
import { z } from "zod";
import { bytes, moment, sha256Column } from "../column";

export const blobRow = z.object({
  id: z.number(),
  /** Of the bytes before `codec`; null until the blob is stored whole. */
  sha256: sha256Column.nullable(),
  state: z.enum(["receiving", "stored"]),
  codec: z.enum(["none", "deflate"]),
  /** Length before `codec`. */
  size: z.number(),
  created_at: moment,
});

export type BlobTable = Omit<z.infer<typeof blobRow>, "id"> & { id: Generated<number> };

export const blobPartRow = z.object({ blob_id: z.number(), n: z.number(), bytes });

export type BlobPartTable = z.infer<typeof blobPartRow>;
