import { z } from "zod";
import { moment, sha256Column } from "../column";

export const importLayoutRow = z.object({
  group_id: z.string(),
  /** Of the names and units of a file's columns. */
  heading_hash: sha256Column,
  /** JSON, as the reader of files defines it. */
  corrections: z.string(),
  file_name: z.string(),
  member_id: z.string(),
  at: moment,
});

export type ImportLayoutTable = z.infer<typeof importLayoutRow>;
