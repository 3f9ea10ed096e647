import { bytes as bytesColumn } from "../column";
import type { Handle } from "../database";
import { packSheet, unpackSheet } from "../revision/packed-sheet";
import { readSheet } from "../sheet/read-sheet";
import { CHAIN_START, entryHash } from "./append-entry";
import { type AuditEntryTable, auditEntryRow } from "./audit.table";

export type ChainVerdict =
  | { readonly status: "holds"; readonly entries: number; readonly head: string }
  /** `entry` is the first one that does not fit, `message` says what about it. */
  | { readonly status: "broken"; readonly entry: number; readonly message: string };

/**
 * Recomputes a group's chain from its first entry: numbers without a gap, every hash over its own entry and its
 * predecessor, every snapshot under the hash its entry names, and the present tables equal to the latest snapshot.
 *
 * Whoever can rewrite the whole file can rewrite the whole chain: compare the head with one that was written down
 * elsewhere (`seenHead`, from a signed report or a mail).
 */
export async function verifyChainOfGroup(
  db: Handle,
  groupId: string,
  seenHead?: string,
): Promise<ChainVerdict> {
  const rows = await db
    .selectFrom("audit_entry")
    .selectAll()
    .where("group_id", "=", groupId)
    .orderBy("number")
    .execute();
  let previous = CHAIN_START;
  let seen = seenHead === undefined;
  const latest = new Map<string, AuditEntryTable>();
  for (const [index, row] of rows.entries()) {
    const entry = auditEntryRow.parse(row);
    const broken = (message: string): ChainVerdict => ({ status: "broken", entry: entry.number, message });
    if (entry.number !== index + 1) return broken(`Entry ${index + 1} is missing.`);
    if (entry.previous_hash !== previous) return broken("It does not follow from the entry before it.");
    if (entry.hash !== entryHash(entry)) return broken("Its hash does not fit what it says.");
    if (entry.study_id !== null && entry.revision !== null) {
      const before = latest.get(entry.study_id)?.revision ?? 0;
      if (entry.revision !== before + 1) return broken(`Revision ${before + 1} of its study is missing.`);
      const problem = await snapshotProblem(db, entry.study_id, entry.revision, entry.sheet_hash);
      if (problem !== undefined) return broken(problem);
      latest.set(entry.study_id, entry);
    }
    previous = entry.hash;
    seen ||= entry.hash === seenHead;
  }
  const studies = await db
    .selectFrom("study")
    .select(["id", "revision"])
    .where("group_id", "=", groupId)
    .execute();
  for (const { id, revision } of studies) {
    const entry = latest.get(id);
    const present = await readSheet(db, id);
    if (
      entry?.revision !== revision ||
      present === undefined ||
      packSheet(present).sheetHash !== entry.sheet_hash
    ) {
      return {
        status: "broken",
        entry: entry?.number ?? rows.length,
        message: `The tables of study ${id} differ from its latest recorded revision.`,
      };
    }
  }
  if (!seen) {
    return {
      status: "broken",
      entry: rows.length,
      message: "The head that you hold is no entry of this chain: it was rewritten or cut since.",
    };
  }
  return { status: "holds", entries: rows.length, head: previous };
}

async function snapshotProblem(
  db: Handle,
  studyId: string,
  revision: number,
  sheetHash: string | null,
): Promise<string | undefined> {
  const row = await db
    .selectFrom("revision")
    .select("sheet")
    .where("study_id", "=", studyId)
    .where("number", "=", revision)
    .executeTakeFirst();
  if (row === undefined) return `The sheet of revision ${revision} is missing.`;
  try {
    return unpackSheet(bytesColumn.parse(row.sheet)).sheetHash === sheetHash
      ? undefined
      : `The sheet of revision ${revision} is not the one that was recorded.`;
  } catch {
    return `The sheet of revision ${revision} cannot be read.`;
  }
}
