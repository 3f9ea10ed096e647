import type { Kysely, Transaction } from "kysely";
import type { Database } from "../database";
import { type Actor, mayActAs } from "../member/actor";
import { recordRevision } from "../revision/revision.commands";
import { readRevisionSheet } from "../revision/revision.queries";
import { mergeSheets } from "../sheet/merge-sheets";
import { readSheet } from "../sheet/read-sheet";
import { rowsInWords } from "../sheet/row-words";
import type { Sheet } from "../sheet/sheet.schema";
import { rowCountProblem, sheetProblem } from "../sheet/sheet-problem";
import { rowsOf, type SheetRows, sameRow, touchedRows } from "../sheet/sheet-rows";
import { writeSheet } from "../sheet/write-sheet";
import { whoChanged } from "./who-changed";

/**
 * The one door through which a study changes: role, conflict, limits, snapshot, chain and audit in one transaction.
 *
 * The editor saw revision `base`, so `apply` is asked what they want of that sheet; the rows it touches are found
 * by comparing. If somebody changed other rows meanwhile, those stay as they are now and the touched ones are laid
 * over them. Only a row that both changed is a conflict.
 */
export interface ChangeTarget {
  readonly studyId: string;
  readonly base: number;
}

export interface ChangeNote {
  /** A short word for what was done, "set aside". */
  readonly verb: string;
  /** One sentence for the history, or a function that makes it from the sheets before and after. */
  readonly summary: string | ((before: Sheet, after: Sheet) => string);
}

/** What `apply` answers instead of a sheet when the wish cannot be met: a sentence with the way out. */
export interface Refusal {
  readonly refused: string;
}

/**
 * Pure: gives a new sheet and leaves the old one alone. `revision` is the number that the change will get, for
 * `removedIn`. `changedIn` of runs is kept up here.
 */
export type Apply = (sheet: Sheet, revision: number) => Sheet | Refusal;

export type ChangeResult =
  | { readonly status: "changed"; readonly revision: number; readonly summary: string }
  | { readonly status: "unchanged" }
  | { readonly status: "conflict"; readonly message: string }
  | { readonly status: "refused"; readonly message: string }
  | { readonly status: "not-found" }
  | { readonly status: "forbidden" };

/**
 * Works out anew what follows from the rest of a sheet; made above the store, which knows no chemistry. It sees the sheet as
 * it will stand, with others' rows in it, and what it changes is part of the same revision and no cause of a conflict.
 */
export type Derive = (sheet: Sheet) => Sheet;

const NOTHING_FOLLOWS: Derive = (sheet) => sheet;

export async function changeStudy(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  note: ChangeNote,
  apply: Apply,
  derive: Derive = NOTHING_FOLLOWS,
): Promise<ChangeResult> {
  return db.transaction().execute((trx) => changeStudyIn(trx, actor, target, note, apply, derive));
}

/** As `changeStudy`, inside a transaction of the caller's that keeps something else with it. */
export async function changeStudyIn(
  trx: Transaction<Database>,
  actor: Actor,
  { studyId, base }: ChangeTarget,
  note: ChangeNote,
  apply: Apply,
  derive: Derive = NOTHING_FOLLOWS,
): Promise<ChangeResult> {
  const study = await trx
    .selectFrom("study")
    .select(["group_id", "revision"])
    .where("id", "=", studyId)
    .where("group_id", "=", actor.groupId)
    .executeTakeFirst();
  if (study === undefined) return { status: "not-found" };
  if (!mayActAs(actor.role, "analyst")) return { status: "forbidden" };

  const current = await readSheet(trx, studyId);
  if (current === undefined) return { status: "not-found" };
  const seen = base === study.revision ? current : await readRevisionSheet(trx, studyId, base);
  if (seen === undefined) {
    return {
      status: "conflict",
      message: "This study was never at the revision you saw. Load the page again.",
    };
  }

  const revision = study.revision + 1;
  const wanted = apply(seen, revision);
  if ("refused" in wanted) return { status: "refused", message: wanted.refused };
  const touched = touchedRows(rowsOf(seen), rowsOf(wanted));
  if (touched.size === 0) return { status: "unchanged" };
  forbidVanishing(touched, rowsOf(wanted));

  const clashing = clashes(touched, rowsOf(seen), rowsOf(wanted), rowsOf(current));
  if (clashing.length > 0) {
    const rows = rowsInWords(clashing, current, seen);
    const who = await whoChanged(trx, actor, { studyId, base }, clashing);
    return {
      status: "conflict",
      message: `Since you opened this page, ${rows} ${clashing.length === 1 ? "was" : "were"} changed by ${who}. Your change was not made; look at the new state and repeat it.`,
    };
  }

  // A row that is already as wanted was changed by somebody else to the same: it keeps their revision.
  const [currentRows, wantedRows] = [rowsOf(current), rowsOf(wanted)];
  const open = new Set([...touched].filter((key) => !sameRow(key, wantedRows, currentRows)));
  if (open.size === 0) return { status: "unchanged" };
  const merged = withDerived(mergeSheets(current, marked(wanted, open, revision), open), derive, revision);
  const problem = rowCountProblem(rowsOf(merged)) ?? sheetProblem(merged);
  if (problem !== undefined) return { status: "refused", message: problem };

  const summary = typeof note.summary === "string" ? note.summary : note.summary(seen, wanted);
  const at = new Date().toISOString();
  await writeSheet(trx, { studyId, revision, at }, merged, current);
  await recordRevision(
    trx,
    {
      studyId,
      groupId: study.group_id,
      number: revision,
      memberId: actor.memberId,
      verb: note.verb,
      summary,
      at,
    },
    merged,
  );
  return { status: "changed", revision, summary };
}

/** Touched rows that also changed between what was seen and now, and not to the same. */
function clashes(touched: ReadonlySet<string>, seen: SheetRows, wanted: SheetRows, current: SheetRows) {
  return [...touched].filter((key) => !sameRow(key, seen, current) && !sameRow(key, wanted, current));
}

function withDerived(merged: Sheet, derive: Derive, revision: number): Sheet {
  const derived = derive(merged);
  const follows = touchedRows(rowsOf(merged), rowsOf(derived));
  return follows.size === 0 ? merged : mergeSheets(merged, marked(derived, follows, revision), follows);
}

/** The touched runs note the revision that changes them. */
function marked(wanted: Sheet, touched: ReadonlySet<string>, revision: number): Sheet {
  return {
    ...wanted,
    runs: wanted.runs.map((run) => (touched.has(`runs/${run.id}`) ? { ...run, changedIn: revision } : run)),
  };
}

function forbidVanishing(touched: ReadonlySet<string>, wanted: SheetRows): void {
  for (const key of touched) {
    if (!wanted.has(key) && (key.startsWith("runs/") || key.startsWith("uploads/"))) {
      throw new Error(`${key} left the sheet: runs go to the bin (removedIn), files stay.`);
    }
  }
}
