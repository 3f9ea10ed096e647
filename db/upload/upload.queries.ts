import { blobParts, findBlob } from "../blob/blob.queries";
import type { Handle } from "../database";
import type { Actor } from "../member/actor";

export interface UploadedFile {
  readonly uploadId: string;
  readonly fileName: string;
  readonly size: number;
  readonly sha256: string;
  /** `waiting` for its preview to be confirmed, or `stored` with the study. */
  readonly state: "waiting" | "stored";
  /** The file byte for byte, in pieces of at most 1 MiB; may be read more than once. */
  bytes(): AsyncIterable<Uint8Array>;
}

/** A file of a study of the actor's group; undefined for an outsider, an unknown one and one still arriving. */
export async function openUpload(
  db: Handle,
  actor: Actor,
  { studyId, uploadId }: { studyId: string; uploadId: string },
): Promise<UploadedFile | undefined> {
  const waiting = await db
    .selectFrom("incoming_upload")
    .innerJoin("study", "study.id", "incoming_upload.study_id")
    .select([
      "incoming_upload.blob_id",
      "incoming_upload.file_name",
      "incoming_upload.size",
      "incoming_upload.sha256",
    ])
    .where("incoming_upload.id", "=", uploadId)
    .where("incoming_upload.study_id", "=", studyId)
    .where("incoming_upload.state", "=", "received")
    .where("study.group_id", "=", actor.groupId)
    .executeTakeFirst();
  if (waiting?.sha256 != null) {
    const { blob_id, file_name, size, sha256 } = waiting;
    return {
      uploadId,
      fileName: file_name,
      size,
      sha256,
      state: "waiting",
      bytes: () => blobParts(db, blob_id),
    };
  }
  const stored = await db
    .selectFrom("upload")
    .innerJoin("study", "study.id", "upload.study_id")
    .select(["upload.file_name", "upload.size", "upload.sha256"])
    .where("upload.id", "=", uploadId)
    .where("upload.study_id", "=", studyId)
    .where("study.group_id", "=", actor.groupId)
    .executeTakeFirst();
  if (stored === undefined) return undefined;
  const blob = await findBlob(db, stored.sha256);
  if (blob === undefined) throw new Error(`The bytes of file ${stored.sha256} are missing.`);
  return {
    uploadId,
    fileName: stored.file_name,
    size: stored.size,
    sha256: stored.sha256,
    state: "stored",
    bytes: () => blobParts(db, blob.id),
  };
}
