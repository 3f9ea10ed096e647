import type { Role } from "@/db/member/member.table";

const WHO_MAY: Record<Role, string> = {
  reader: "members of the group",
  analyst: "analysts and leads",
  lead: "leads",
};

/** The sentence for somebody whose role does not reach. */
export function roleRefusal(held: Role, needed: Role): string {
  return `Only ${WHO_MAY[needed]} can do this; your role in this group is ${held}. Nothing was changed.`;
}
