import { z } from "zod";
import { type Role, role } from "./member.table";

/**
 * Who is asking: a member of one group, as found on this very request. Every query and command takes it and gives
 * an outsider nothing.
 */
export const actor = z.object({
  memberId: z.string(),
  accountId: z.string(),
  groupId: z.string(),
  role,
  name: z.string(),
  initials: z.string(),
});

export type Actor = z.infer<typeof actor>;

const standing: Readonly<Record<Role, number>> = { reader: 0, analyst: 1, lead: 2 };

/** Whether someone in role `held` may do what `needed` may do: lead above analyst above reader. */
export function mayActAs(held: Role, needed: Role): boolean {
  return standing[held] >= standing[needed];
}
