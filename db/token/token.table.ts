import { z } from "zod";
import { moment, sha256Column } from "../column";

/** What a personal token may do: `write` includes `read`. */
export const tokenScope = z.enum(["read", "write"]);
export type TokenScope = z.infer<typeof tokenScope>;

export const personalTokenRow = z.object({
  id: z.string(),
  member_id: z.string(),
  name: z.string(),
  token_hash: sha256Column,
  scope: tokenScope,
  created_at: moment,
  expires_at: moment.nullable(),
  last_used_at: moment.nullable(),
  revoked_at: moment.nullable(),
});

export type PersonalTokenTable = z.infer<typeof personalTokenRow>;
