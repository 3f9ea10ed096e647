import { z } from "zod";
import { moment, sha256Column } from "../column";

export const shareLinkRow = z.object({
  id: z.string(),
  study_id: z.string(),
  token_hash: sha256Column,
  label: z.string(),
  /** Null follows the study. */
  frozen_revision: z.number().int().positive().nullable(),
  member_id: z.string(),
  created_at: moment,
  expires_at: moment.nullable(),
  revoked_at: moment.nullable(),
  /** Requested, not opened: mail scanners follow links too. */
  last_requested_at: moment.nullable(),
  requests: z.number().int().nonnegative(),
});

export type ShareLinkTable = z.infer<typeof shareLinkRow>;
