import type { Handle } from "../database";
import type { Actor } from "../member/actor";
import { researchGroupRow } from "./group.table";

export interface Group {
  readonly groupId: string;
  readonly name: string;
  /** Fictional: made for demonstration. */
  readonly invented: boolean;
}

/** The actor's own group. */
export async function readGroup(db: Handle, actor: Actor): Promise<Group | undefined> {
  const row = await db
    .selectFrom("research_group")
    .selectAll()
    .where("id", "=", actor.groupId)
    .executeTakeFirst();
  if (row === undefined) return undefined;
  const group = researchGroupRow.parse(row);
  return { groupId: group.id, name: group.name, invented: group.invented === 1 };
}

/** Whether an invented group is here, for the server, which refuses to show one to the outside. */
export async function hasInventedGroup(db: Handle): Promise<boolean> {
  const row = await db
    .selectFrom("research_group")
    .select("id")
    .where("invented", "=", 1)
    .limit(1)
    .executeTakeFirst();
  return row !== undefined;
}
