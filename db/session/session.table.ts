import { z } from "zod";
import { moment, sha256Column } from "../column";

export const sessionRow = z.object({
  token_hash: sha256Column,
  account_id: z.string(),
  created_at: moment,
  last_seen_at: moment,
  /** The session ends when it was not seen for this long, and at `expires_at` in any case. */
  idle_seconds: z.number().int().positive(),
  expires_at: moment,
  ended_at: moment.nullable(),
});

export type SessionTable = z.infer<typeof sessionRow>;
