import type { Kysely } from "kysely";
import type { Database } from "../database";

export interface KeptAnalysis {
  readonly hash: string;
  readonly kind: string;
  readonly result: unknown;
}

/**
 * Keeps computed results, all in one transaction, and drops what another version of the library made: it would
 * never be read again. Results are no data: they carry no audit entry and may vanish.
 */
export async function keepAnalyses(
  db: Kysely<Database>,
  coreVersion: string,
  analyses: readonly KeptAnalysis[],
  now = new Date(),
): Promise<void> {
  if (analyses.length === 0) return;
  await db.transaction().execute(async (trx) => {
    await trx.deleteFrom("analysis").where("core_version", "!=", coreVersion).execute();
    for (const { hash, kind, result } of analyses) {
      const json = JSON.stringify(result);
      await trx
        .insertInto("analysis")
        .values({
          hash,
          kind,
          core_version: coreVersion,
          json,
          bytes: Buffer.byteLength(json),
          last_used_at: now.toISOString(),
        })
        .onConflict((conflict) => conflict.column("hash").doNothing())
        .execute();
    }
  });
}
