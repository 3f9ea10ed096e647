import type { Transaction } from "kysely";
import { canonicalJson, sha256Of } from "../canonical-json";
import type { Database } from "../database";
import type { AuditEntryTable } from "./audit.table";

/** What the first entry of a group names as its predecessor. */
export const CHAIN_START = "0".repeat(64);

export interface NewEntry {
  readonly groupId: string;
  readonly memberId: string | null;
  readonly verb: string;
  /** One sentence for the activity page; ids and labels, no names of people. */
  readonly summary: string;
  readonly at: string;
  /** For a revision of a study. */
  readonly studyId?: string;
  readonly revision?: number;
  readonly sheetHash?: string;
}

/**
 * Adds an entry to the end of the group's chain, in the transaction that makes the change it speaks of: neither
 * is ever there without the other.
 */
export async function appendEntry(trx: Transaction<Database>, entry: NewEntry): Promise<AuditEntryTable> {
  const last = await trx
    .selectFrom("audit_entry")
    .select(["number", "hash"])
    .where("group_id", "=", entry.groupId)
    .orderBy("number", "desc")
    .limit(1)
    .executeTakeFirst();
  const open = {
    group_id: entry.groupId,
    number: (last?.number ?? 0) + 1,
    study_id: entry.studyId ?? null,
    revision: entry.revision ?? null,
    sheet_hash: entry.sheetHash ?? null,
    member_id: entry.memberId,
    verb: entry.verb,
    summary: entry.summary,
    at: entry.at,
    previous_hash: last?.hash ?? CHAIN_START,
  };
  const row = { ...open, hash: entryHash(open) };
  await trx.insertInto("audit_entry").values(row).execute();
  return row;
}

/** Covers every other column, among them the predecessor's hash and the hash of the sheet. */
export function entryHash(entry: Omit<AuditEntryTable, "hash">): string {
  const { group_id, number, study_id, revision, sheet_hash, member_id, verb, summary, at, previous_hash } =
    entry;
  return sha256Of(
    canonicalJson({
      group_id,
      number,
      study_id,
      revision,
      sheet_hash,
      member_id,
      verb,
      summary,
      at,
      previous_hash,
    }),
  );
}
