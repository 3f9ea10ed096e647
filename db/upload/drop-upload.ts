import type { Kysely } from "kysely";
import { dropBlob } from "../blob/blob.commands";
import type { Database } from "../database";
import { type Actor, mayActAs } from "../member/actor";

/** Drops a file that waits for its preview; false where no such file waits in a study of the actor's group. */
export async function dropUpload(
  db: Kysely<Database>,
  actor: Actor,
  { studyId, uploadId }: { studyId: string; uploadId: string },
): Promise<boolean> {
  const waiting = await db
    .selectFrom("incoming_upload")
    .innerJoin("study", "study.id", "incoming_upload.study_id")
    .select("incoming_upload.blob_id")
    .where("incoming_upload.id", "=", uploadId)
    .where("incoming_upload.study_id", "=", studyId)
    .where("incoming_upload.state", "=", "received")
    .where("study.group_id", "=", actor.groupId)
    .executeTakeFirst();
  if (waiting === undefined || !mayActAs(actor.role, "analyst")) return false;
  await db.deleteFrom("incoming_upload").where("id", "=", uploadId).execute();
  await dropBlob(db, waiting.blob_id);
  return true;
}
