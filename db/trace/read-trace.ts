import { blobParts, findBlob } from "../blob/blob.queries";
import { bytes as bytesColumn } from "../column";
import type { Handle } from "../database";
import { type StoredTrace, traceOf } from "./trace-bytes";

/**
 * A trace by its SHA-256, which only a sheet tells: whoever asks has been given the sheet. Throws where the bytes
 * are missing, since a sheet never names a trace that is not kept.
 */
export async function readTrace(db: Handle, sha256: string): Promise<StoredTrace> {
  const blob = await findBlob(db, sha256);
  if (blob === undefined) throw new Error(`The bytes of trace ${sha256} are missing.`);
  const parts: Uint8Array[] = [];
  for await (const part of blobParts(db, blob.id)) parts.push(part);
  return traceOf(Buffer.concat(parts));
}

const HASHES_PER_STATEMENT = 64;

/** Many traces by hash in few statements, for a whole study. */
export async function readTraces(db: Handle, hashes: Iterable<string>): Promise<Map<string, StoredTrace>> {
  const wanted = [...new Set(hashes)];
  const traces = new Map<string, StoredTrace>();
  for (let start = 0; start < wanted.length; start += HASHES_PER_STATEMENT) {
    const rows = await db
      .selectFrom("blob")
      .innerJoin("blob_part", "blob_part.blob_id", "blob.id")
      .select(["blob.sha256", "blob_part.bytes"])
      .where("blob.sha256", "in", wanted.slice(start, start + HASHES_PER_STATEMENT))
      .orderBy("blob.id")
      .orderBy("blob_part.n")
      .execute();
    const parts = new Map<string, Uint8Array[]>();
    for (const row of rows) {
      if (row.sha256 === null) continue;
      const part = bytesColumn.parse(row.bytes);
      const known = parts.get(row.sha256);
      if (known === undefined) parts.set(row.sha256, [part]);
      else known.push(part);
    }
    for (const [sha256, list] of parts) traces.set(sha256, traceOf(Buffer.concat(list)));
  }
  const missing = wanted.find((sha256) => !traces.has(sha256));
  if (missing !== undefined) throw new Error(`The bytes of trace ${missing} are missing.`);
  return traces;
}
