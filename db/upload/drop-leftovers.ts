import type { Kysely } from "kysely";
import { dropBlob } from "../blob/blob.commands";
import type { Database } from "../database";

/** How long a received file waits for its preview to be confirmed. */
const WAITING_MS = 24 * 3600 * 1000;

/**
 * At start, before requests: what was being received when the process ended, files that nobody confirmed within a
 * day, and traces that were staged for a change that never came. Nothing that a sheet ever named is among them.
 */
export async function dropLeftovers(db: Kysely<Database>, now = new Date()): Promise<number> {
  await db.deleteFrom("incoming_upload").where("state", "=", "receiving").execute();
  await db
    .deleteFrom("incoming_upload")
    .where("at", "<", new Date(now.getTime() - WAITING_MS).toISOString())
    .execute();
  const orphans = await db
    .selectFrom("blob")
    .leftJoin("incoming_upload", "incoming_upload.blob_id", "blob.id")
    .select("blob.id")
    .where("blob.state", "=", "receiving")
    .where("incoming_upload.id", "is", null)
    .execute();
  for (const { id } of orphans) await dropBlob(db, id);
  return orphans.length;
}
