import { sql } from "kysely";
import type { Handle } from "../database";

/** What a group's studies hold: raw files, files still waiting, and traces at 16 bytes a point. */
export async function bytesKeptByGroup(db: Handle, groupId: string): Promise<number> {
  const { rows } = await sql<{ bytes: number }>`
    select
      (select coalesce(sum(upload.size), 0) from upload
        join study on study.id = upload.study_id where study.group_id = ${groupId})
      + (select coalesce(sum(incoming_upload.size), 0) from incoming_upload
        join study on study.id = incoming_upload.study_id where study.group_id = ${groupId})
      + (select coalesce(sum(16 * run.trace_points), 0) from run
        join study on study.id = run.study_id where study.group_id = ${groupId}) as bytes
  `.execute(db);
  return rows[0]?.bytes ?? 0;
}
