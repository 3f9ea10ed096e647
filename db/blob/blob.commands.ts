import type { Kysely, Transaction } from "kysely";
import type { Database, Handle } from "../database";
import type { BlobTable } from "./blob.table";

/**
 * Bytes by their SHA-256. A blob is begun without a name, takes its parts, and is sealed under its hash once whole;
 * equal bytes are kept once. Sealed blobs are never changed and never removed.
 */

/** The largest part: inserting it holds the writer for about 2 ms, 20 MB at once would for 100. */
export const PART_BYTES = 1024 ** 2;

export async function beginBlob(db: Handle, codec: BlobTable["codec"]): Promise<number> {
  const row = await db
    .insertInto("blob")
    .values({ sha256: null, state: "receiving", codec, size: 0, created_at: new Date().toISOString() })
    .returning("id")
    .executeTakeFirstOrThrow();
  return row.id;
}

/** Part `n`, counted from 0, of at most `PART_BYTES`. Outside a transaction it is one of its own. */
export async function appendPart(db: Handle, blobId: number, n: number, bytes: Uint8Array): Promise<void> {
  await db.insertInto("blob_part").values({ blob_id: blobId, n, bytes }).execute();
}

/**
 * Seals the blob under the hash and length of its bytes before `codec`. Where the same bytes are kept already the
 * blob stays unsealed and false comes back: drop it after the transaction.
 */
export async function sealBlob(
  trx: Transaction<Database>,
  blobId: number,
  content: { sha256: string; size: number },
): Promise<boolean> {
  if (await hasBlob(trx, content.sha256)) return false;
  const { numUpdatedRows } = await trx
    .updateTable("blob")
    .set({ state: "stored", sha256: content.sha256, size: content.size })
    .where("id", "=", blobId)
    .where("state", "=", "receiving")
    .executeTakeFirst();
  if (numUpdatedRows !== 1n) throw new Error(`Blob ${blobId} is gone or sealed already.`);
  return true;
}

async function hasBlob(db: Handle, sha256: string): Promise<boolean> {
  const row = await db.selectFrom("blob").select("id").where("sha256", "=", sha256).executeTakeFirst();
  return row !== undefined;
}

/** Removes a blob that was never sealed, part by part so that nobody waits for it. */
export async function dropBlob(db: Kysely<Database>, blobId: number): Promise<void> {
  const blob = await db.selectFrom("blob").select("state").where("id", "=", blobId).executeTakeFirst();
  if (blob === undefined || blob.state === "stored") return;
  const parts = await db.selectFrom("blob_part").select("n").where("blob_id", "=", blobId).execute();
  for (const { n } of parts) {
    await db.deleteFrom("blob_part").where("blob_id", "=", blobId).where("n", "=", n).execute();
  }
  await db.deleteFrom("blob").where("id", "=", blobId).where("state", "=", "receiving").execute();
}
