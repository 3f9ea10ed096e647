import { z } from "zod";
import type { Handle } from "../database";

const keptRow = z.object({ hash: z.string(), json: z.string() });

const HASHES_PER_STATEMENT = 200;

/** Kept results by the hash of their inputs, as parsed JSON; a hash that is missing here was never kept or was dropped. */
export async function readAnalyses(
  db: Handle,
  coreVersion: string,
  hashes: readonly string[],
): Promise<Map<string, unknown>> {
  const kept = new Map<string, unknown>();
  for (let start = 0; start < hashes.length; start += HASHES_PER_STATEMENT) {
    const rows = await db
      .selectFrom("analysis")
      .select(["hash", "json"])
      .where("core_version", "=", coreVersion)
      .where("hash", "in", hashes.slice(start, start + HASHES_PER_STATEMENT))
      .execute();
    for (const row of rows) {
      const { hash, json } = keptRow.parse(row);
      kept.set(hash, JSON.parse(json));
    }
  }
  return kept;
}
