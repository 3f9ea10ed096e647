import type { Handle } from "../database";

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
