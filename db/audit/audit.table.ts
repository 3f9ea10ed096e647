import { z } from "zod";
import { moment, sha256Column } from "../column";

/** One event of a group: a revision of a study (then with `sheet_hash`) or something else worth an entry. */
export const auditEntryRow = z.object({
  group_id: z.string(),
  /** Counts within the group without a gap; the order of events, which a clock is not. */
  number: z.number().int().positive(),
  study_id: z.string().nullable(),
  revision: z.number().int().positive().nullable(),
  sheet_hash: sha256Column.nullable(),
  /** Null for what the program did by itself. */
  member_id: z.string().nullable(),
  verb: z.string(),
  summary: z.string(),
  at: moment,
  previous_hash: sha256Column,
  hash: sha256Column,
});

export type AuditEntryTable = z.infer<typeof auditEntryRow>;
