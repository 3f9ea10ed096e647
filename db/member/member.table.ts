import { z } from "zod";
import { moment } from "../column";

export const role = z.enum(["lead", "analyst", "reader"]);
export type Role = z.infer<typeof role>;

/** A person in a group. Named in the history by this id; who it is stands in the account. */
export const memberRow = z.object({
  id: z.string(),
  group_id: z.string(),
  account_id: z.string(),
  role,
  joined_at: moment,
  removed_at: moment.nullable(),
});

export type MemberTable = z.infer<typeof memberRow>;
