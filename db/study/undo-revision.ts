import type { Kysely, Transaction } from "kysely";
import type { Database } from "../database";
import { type Actor, mayActAs } from "../member/actor";
import { readRevisionSheet } from "../revision/revision.queries";
import { readSheet } from "../sheet/read-sheet";
import { rowsInWords } from "../sheet/row-words";
import { rowsOf, type SheetRows, sameRow, sheetOf, touchedRows } from "../sheet/sheet-rows";
import { type ChangeResult, changeStudyIn, type Derive } from "./change-study";

/**
 * Undoes one revision by a forward change: the rows it touched become again what they were before it. Refused when
 * one of them changed since, as that later work would be lost. Runs that the revision added go to the bin; files
 * stay. Undoing an undo is the redo. `derive` works out what follows from rows that come back, such as the concentrations
 * of a run whose stock changed while it was in the bin.
 */
export async function undoRevision(
  db: Kysely<Database>,
  actor: Actor,
  target: { studyId: string; revision: number },
  derive?: Derive,
): Promise<ChangeResult> {
  return db.transaction().execute((trx) => undoIn(trx, actor, target, derive));
}

async function undoIn(
  trx: Transaction<Database>,
  actor: Actor,
  { studyId, revision }: { studyId: string; revision: number },
  derive: Derive | undefined,
): Promise<ChangeResult> {
  const study = await trx
    .selectFrom("study")
    .select("revision")
    .where("id", "=", studyId)
    .where("group_id", "=", actor.groupId)
    .executeTakeFirst();
  if (study === undefined) return { status: "not-found" };
  if (!mayActAs(actor.role, "analyst")) return { status: "forbidden" };
  const after = await readRevisionSheet(trx, studyId, revision);
  if (after === undefined) return { status: "not-found" };
  const before = await readRevisionSheet(trx, studyId, revision - 1);
  const current = await readSheet(trx, studyId);
  if (before === undefined || current === undefined) {
    return {
      status: "refused",
      message: "The first revision made the study; there is nothing before it to go back to.",
    };
  }
  const changed = [...touchedRows(rowsOf(before), rowsOf(after))];
  const since = changed.filter((key) => !sameRow(key, rowsOf(after), rowsOf(current)));
  if (since.length > 0) {
    const rows = rowsInWords(since, current, after, before);
    return {
      status: "refused",
      message: `Revision ${revision} cannot be undone by itself, since ${rows} changed after it. Undo the later change first, or edit by hand.`,
    };
  }
  const entry = await trx
    .selectFrom("audit_entry")
    .select(["verb", "summary"])
    .where("study_id", "=", studyId)
    .where("revision", "=", revision)
    .executeTakeFirstOrThrow();
  return changeStudyIn(
    trx,
    actor,
    { studyId, base: study.revision },
    noteOf(entry),
    (sheet, next) => sheetOf(sheet.version, restored(rowsOf(sheet), rowsOf(before), changed, next)),
    derive,
  );
}

const UNDID = "Undid: ";
const REDID = "Redid: ";

function noteOf(entry: { verb: string; summary: string }): { verb: string; summary: string } {
  return entry.verb === "undone"
    ? { verb: "redone", summary: REDID + entry.summary.replace(UNDID, "") }
    : { verb: "undone", summary: UNDID + entry.summary.replace(REDID, "") };
}

function restored(
  current: SheetRows,
  before: SheetRows,
  keys: readonly string[],
  revision: number,
): SheetRows {
  const rows = new Map(current);
  for (const key of keys) {
    if (before.has(key)) rows.set(key, before.get(key));
    else if (key.startsWith("runs/")) rows.set(key, binned(current.get(key), revision));
    else if (!key.startsWith("uploads/")) rows.delete(key);
  }
  return rows;
}

function binned(run: unknown, revision: number): unknown {
  return typeof run === "object" ? { ...run, removedIn: revision } : run;
}
