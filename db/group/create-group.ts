import type { Transaction } from "kysely";
import { appendEntry } from "../audit/append-entry";
import type { Database } from "../database";
import { newIdentifier } from "../identifier";

/** A research group and its id, with the first entry of its chain. */
export async function createGroup(
  trx: Transaction<Database>,
  group: { name: string; invented: boolean },
): Promise<string> {
  const id = newIdentifier();
  const at = new Date().toISOString();
  await trx
    .insertInto("research_group")
    .values({ id, name: group.name, invented: group.invented ? 1 : 0, created_at: at })
    .execute();
  await appendEntry(trx, {
    groupId: id,
    memberId: null,
    verb: "group made",
    summary: "The group was made.",
    at,
  });
  return id;
}
