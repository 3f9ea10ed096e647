import type { Handle } from "../database";
import { blobPartRow, type blobRow } from "./blob.table";

/**
 * The parts of a blob as they are stored, in order. Each is a statement of its own: no read transaction stays open
 * while the reader waits for its client, which would make the write-ahead log grow without bound.
 */
export async function* blobParts(db: Handle, blobId: number): AsyncGenerator<Uint8Array> {
  for (let n = 0; ; n++) {
    const row = await db
      .selectFrom("blob_part")
      .selectAll()
      .where("blob_id", "=", blobId)
      .where("n", "=", n)
      .executeTakeFirst();
    if (row === undefined) return;
    yield blobPartRow.parse(row).bytes;
  }
}

/** A sealed blob by its hash; undefined where there is none. */
export async function findBlob(
  db: Handle,
  sha256: string,
): Promise<Pick<typeof blobRow._zod.output, "id" | "codec" | "size"> | undefined> {
  return db
    .selectFrom("blob")
    .select(["id", "codec", "size"])
    .where("sha256", "=", sha256)
    .where("state", "=", "stored")
    .executeTakeFirst();
}
