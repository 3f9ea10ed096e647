import type { Transaction } from "kysely";
import { appendEntry } from "../audit/append-entry";
import type { Database } from "../database";
import type { Sheet } from "../sheet/sheet.schema";
import { packSheet } from "./packed-sheet";

/** Keeps the whole sheet as revision `number` of the study, with its audit entry. */
export async function recordRevision(
  trx: Transaction<Database>,
  revision: {
    studyId: string;
    groupId: string;
    number: number;
    memberId: string | null;
    verb: string;
    summary: string;
    at: string;
  },
  sheet: Sheet,
): Promise<void> {
  const { studyId, groupId, number, memberId, verb, summary, at } = revision;
  const { bytes, sheetHash } = packSheet(sheet);
  await appendEntry(trx, { groupId, memberId, verb, summary, at, studyId, revision: number, sheetHash });
  await trx.insertInto("revision").values({ study_id: studyId, number, sheet: bytes }).execute();
}
