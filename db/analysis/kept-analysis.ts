import type { Handle } from "../database";
import { analysisRow } from "./analysis.table";

/**
 * Results by the hash of their inputs, as JSON text that the caller parses. A cache and nothing more: rows may
 * vanish at any time, and a result of another version of the library is not given back.
 */

/** `last_used_at` is written at most this often. */
const USED_EVERY_MS = 3600 * 1000;

export interface AnalysisKey {
  readonly hash: string;
  readonly kind: string;
  readonly coreVersion: string;
}

export async function findAnalysis(
  db: Handle,
  key: AnalysisKey,
  now = new Date(),
): Promise<string | undefined> {
  const found = await findAnalyses(db, key, [key.hash], now);
  return found.get(key.hash);
}

const HASHES_PER_STATEMENT = 500;

/** Many results of one kind at once, by hash; those not kept are missing from the map. */
export async function findAnalyses(
  db: Handle,
  { kind, coreVersion }: Omit<AnalysisKey, "hash">,
  hashes: readonly string[],
  now = new Date(),
): Promise<Map<string, string>> {
  const found = new Map<string, string>();
  const stale: string[] = [];
  for (let start = 0; start < hashes.length; start += HASHES_PER_STATEMENT) {
    const rows = await db
      .selectFrom("analysis")
      .selectAll()
      .where("hash", "in", hashes.slice(start, start + HASHES_PER_STATEMENT))
      .where("kind", "=", kind)
      .where("core_version", "=", coreVersion)
      .execute();
    for (const row of rows.map((one) => analysisRow.parse(one))) {
      found.set(row.hash, row.json);
      if (now.getTime() - Date.parse(row.last_used_at) > USED_EVERY_MS) stale.push(row.hash);
    }
  }
  for (let start = 0; start < stale.length; start += HASHES_PER_STATEMENT) {
    await db
      .updateTable("analysis")
      .set({ last_used_at: now.toISOString() })
      .where("hash", "in", stale.slice(start, start + HASHES_PER_STATEMENT))
      .execute();
  }
  return found;
}

export async function keepAnalysis(
  db: Handle,
  key: AnalysisKey,
  json: string,
  now = new Date(),
): Promise<void> {
  await db
    .replaceInto("analysis")
    .values({
      hash: key.hash,
      kind: key.kind,
      core_version: key.coreVersion,
      json,
      bytes: Buffer.byteLength(json),
      last_used_at: now.toISOString(),
    })
    .execute();
}

/** Removes the results least lately used until at most `keepBytes` are left; gives how many went. */
export async function pruneAnalyses(db: Handle, keepBytes: number): Promise<number> {
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
