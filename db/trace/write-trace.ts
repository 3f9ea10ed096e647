import type { Kysely, Transaction } from "kysely";
import { appendPart, beginBlob, dropBlob, PART_BYTES, sealBlob } from "../blob/blob.commands";
import type { Database, Handle } from "../database";
import { type PackedTrace, packTraceNow, type StoredTrace } from "./trace-bytes";

/** Stores one trace in the caller's transaction and gives its SHA-256. For long traces stage them first. */
export async function writeTrace(trx: Transaction<Database>, trace: StoredTrace): Promise<string> {
  const packed = packTraceNow(trace);
  const blobId = await writeParts(trx, packed);
  const sealed = await sealBlob(trx, blobId, packed);
  // Kept already: the parts just written are not needed, and go with their blob.
  if (!sealed) await trx.deleteFrom("blob").where("id", "=", blobId).execute();
  return packed.sha256;
}

export interface StagedTrace extends Omit<PackedTrace, "deflated"> {
  readonly blobId: number;
}

/**
 * Writes packed traces ahead of the transaction that will name them, at most about 1 MiB in each transaction. Until
 * `sealTraces` they belong to nothing and go at the next start.
 */
export async function stageTraces(
  db: Kysely<Database>,
  traces: readonly PackedTrace[],
): Promise<StagedTrace[]> {
  const staged: StagedTrace[] = [];
  for (const batch of batches(traces)) {
    const [first] = batch;
    if (batch.length === 1 && first !== undefined) {
      staged.push(await stage(db, first));
      continue;
    }
    const rows = await db.transaction().execute(async (trx) => {
      const done: StagedTrace[] = [];
      for (const trace of batch) done.push(await stage(trx, trace));
      return done;
    });
    staged.push(...rows);
  }
  return staged;
}

/** Names staged traces by their hashes; gives those that were kept already, to be dropped afterwards. */
export async function sealTraces(
  trx: Transaction<Database>,
  staged: readonly StagedTrace[],
): Promise<StagedTrace[]> {
  const known: StagedTrace[] = [];
  for (const trace of staged) {
    if (!(await sealBlob(trx, trace.blobId, trace))) known.push(trace);
  }
  return known;
}

export async function dropStaged(db: Kysely<Database>, staged: readonly StagedTrace[]): Promise<void> {
  for (const trace of staged) await dropBlob(db, trace.blobId);
}

async function stage(db: Handle, { deflated, ...trace }: PackedTrace): Promise<StagedTrace> {
  return { ...trace, blobId: await writeParts(db, { deflated }) };
}

async function writeParts(db: Handle, { deflated }: { deflated: Uint8Array }): Promise<number> {
  const blobId = await beginBlob(db, "deflate");
  for (let start = 0, n = 0; start < deflated.byteLength; start += PART_BYTES, n++) {
    await appendPart(db, blobId, n, deflated.subarray(start, start + PART_BYTES));
  }
  return blobId;
}

/** Small traces together up to a part's size, long ones alone. */
function batches(traces: readonly PackedTrace[]): PackedTrace[][] {
  const all: PackedTrace[][] = [];
  let room = 0;
  for (const trace of traces) {
    const last = all.at(-1);
    if (last === undefined || trace.deflated.byteLength > room) {
      all.push([trace]);
      room = PART_BYTES;
    } else {
      last.push(trace);
    }
    room -= trace.deflated.byteLength;
  }
  return all;
}
