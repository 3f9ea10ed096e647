import type { Kysely } from "kysely";
import type { Database } from "../database";

const HASHES_PER_STATEMENT = 500;

/** Removes the oldest results until at most `keepBytes` of them are left; gives how many went. */
export async function pruneAnalyses(db: Kysely<Database>, keepBytes: number): Promise<number> {
  const rows = await db
    .selectFrom("analysis")
    .select(["hash", "bytes"])
    .orderBy("last_used_at", "desc")
    .orderBy("hash")
    .execute();
  let kept = 0;
  const surplus = rows.filter((row) => {
    kept += row.bytes;
    return kept > keepBytes;
  });
  for (let start = 0; start < surplus.length; start += HASHES_PER_STATEMENT) {
    const hashes = surplus.slice(start, start + HASHES_PER_STATEMENT).map((row) => row.hash);
    await db.deleteFrom("analysis").where("hash", "in", hashes).execute();
  }
  return surplus.length;
}
