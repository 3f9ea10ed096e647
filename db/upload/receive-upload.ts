import { createHash } from "node:crypto";
import type { Kysely } from "kysely";
import { appendPart, beginBlob, dropBlob, PART_BYTES } from "../blob/blob.commands";
import type { Database } from "../database";
import { bytesKeptByGroup } from "../group/bytes-kept";
import { newIdentifier } from "../identifier";
import { BYTES_PER_FILE, BYTES_PER_GROUP, limitSentences } from "../limits";
import { type Actor, mayActAs } from "../member/actor";

export type ReceiveResult =
  | {
      readonly status: "received";
      readonly uploadId: string;
      readonly sha256: string;
      readonly size: number;
    }
  | {
      readonly status: "refused";
      readonly code: "too-large" | "group-full" | "empty" | "incomplete";
      readonly message: string;
    }
  | { readonly status: "not-found" }
  | { readonly status: "forbidden" };

/**
 * Takes a file as it comes, byte for byte, in parts of a transaction each, and waits with it for somebody to look
 * at the preview. `declaredBytes` is what the sender announced, null where nothing was: a file that ends short of
 * it is refused, as a cut-off file reads like a shorter one. Whatever is refused or breaks off leaves nothing.
 */
export async function receiveUpload(
  db: Kysely<Database>,
  actor: Actor,
  file: { studyId: string; fileName: string; declaredBytes: number | null },
  source: AsyncIterable<Uint8Array>,
): Promise<ReceiveResult> {
  const study = await db
    .selectFrom("study")
    .select("id")
    .where("id", "=", file.studyId)
    .where("group_id", "=", actor.groupId)
    .executeTakeFirst();
  if (study === undefined) return { status: "not-found" };
  if (!mayActAs(actor.role, "analyst")) return { status: "forbidden" };
  if (file.declaredBytes !== null && file.declaredBytes > BYTES_PER_FILE) {
    return { status: "refused", code: "too-large", message: limitSentences.file(file.declaredBytes) };
  }

  const { uploadId, blobId } = await begin(db, actor, file);
  let received: Received;
  try {
    received = await storeParts(db, blobId, source);
  } catch (error) {
    await drop(db, uploadId, blobId);
    throw error;
  }
  const refusal = await db.transaction().execute(async (trx) => {
    // Asked once the file is whole: files that arrive beside each other count against each other.
    const kept = await bytesKeptByGroup(trx, actor.groupId);
    const found = refusalOf(received, kept, file.declaredBytes);
    if (found === undefined) {
      await trx
        .updateTable("incoming_upload")
        .set({ state: "received", size: received.size, sha256: received.sha256 })
        .where("id", "=", uploadId)
        .execute();
    }
    return found;
  });
  if (refusal !== undefined) {
    await drop(db, uploadId, blobId);
    return refusal;
  }
  return { status: "received", uploadId, sha256: received.sha256, size: received.size };
}

async function begin(
  db: Kysely<Database>,
  actor: Actor,
  file: { studyId: string; fileName: string },
): Promise<{ uploadId: string; blobId: number }> {
  const uploadId = newIdentifier();
  return db.transaction().execute(async (trx) => {
    const blobId = await beginBlob(trx, "none");
    await trx
      .insertInto("incoming_upload")
      .values({
        id: uploadId,
        study_id: file.studyId,
        member_id: actor.memberId,
        blob_id: blobId,
        file_name: file.fileName,
        state: "receiving",
        size: 0,
        sha256: null,
        at: new Date().toISOString(),
      })
      .execute();
    return { uploadId, blobId };
  });
}

interface Received {
  readonly size: number;
  readonly sha256: string;
  readonly overLimit: boolean;
}

/** Gathers chunks of any size into parts. Stops reading, and so the sender, once the file is over the limit. */
async function storeParts(
  db: Kysely<Database>,
  blobId: number,
  source: AsyncIterable<Uint8Array>,
): Promise<Received> {
  const hash = createHash("sha256");
  const part = Buffer.alloc(PART_BYTES);
  let filled = 0;
  let size = 0;
  let n = 0;
  for await (const chunk of source) {
    size += chunk.byteLength;
    if (size > BYTES_PER_FILE) return { size, sha256: "", overLimit: true };
    hash.update(chunk);
    for (let taken = 0; taken < chunk.byteLength; ) {
      const piece = chunk.subarray(taken, taken + PART_BYTES - filled);
      part.set(piece, filled);
      filled += piece.byteLength;
      taken += piece.byteLength;
      if (filled === PART_BYTES) {
        await appendPart(db, blobId, n++, part);
        filled = 0;
      }
    }
  }
  if (filled > 0) await appendPart(db, blobId, n, part.subarray(0, filled));
  return { size, sha256: hash.digest("hex"), overLimit: false };
}

function refusalOf(
  { size, overLimit }: Received,
  keptByGroup: number,
  declaredBytes: number | null,
): Extract<ReceiveResult, { status: "refused" }> | undefined {
  const refused = (code: Extract<ReceiveResult, { status: "refused" }>["code"], message: string) =>
    ({ status: "refused", code, message }) as const;
  if (overLimit) return refused("too-large", limitSentences.file(declaredBytes));
  if (declaredBytes !== null && declaredBytes !== size) {
    return refused(
      "incomplete",
      `The file broke off: ${size} of ${declaredBytes} bytes arrived. Nothing was kept; send it again.`,
    );
  }
  if (size === 0) {
    return refused("empty", "The file is empty. Choose the file that holds the readings.");
  }
  if (keptByGroup + size > BYTES_PER_GROUP) {
    return refused("group-full", limitSentences.group(keptByGroup + size));
  }
  return undefined;
}

async function drop(db: Kysely<Database>, uploadId: string, blobId: number): Promise<void> {
  await db.deleteFrom("incoming_upload").where("id", "=", uploadId).execute();
  await dropBlob(db, blobId);
}
