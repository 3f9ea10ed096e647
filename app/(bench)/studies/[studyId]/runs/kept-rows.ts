import "server-only";
import { notFound } from "next/navigation";
import { type ActionResult, done } from "@/app/_server/action-result";
import { type ChangedLaw, changeWithEffect } from "@/app/_server/study-change";
import type { Handle } from "@/db/database";
import { newIdentifier } from "@/db/identifier";
import type { Actor } from "@/db/member/actor";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import { readStudy } from "@/db/study/study.queries";
import { changeRows, type RowReader, type RowsRefusal } from "./change-rows";
import type { Cells } from "./run-row";
import type { RowEdit } from "./schema";

export type KeptRows =
  /** `runIds` by the page's key of each row. */
  | ({ readonly status: "kept"; readonly runIds: Readonly<Record<string, string>> } & ChangedLaw)
  /** Some rows are not read; nothing was kept. By row key and column. */
  | { readonly status: "faults"; readonly faults: RowsRefusal }
  /** Others changed the same rows: their texts as they are now, by run id. */
  | {
      readonly status: "conflict";
      readonly revision: number;
      readonly theirs: Readonly<Record<string, Cells>>;
    };

interface RowTexts extends RowReader {
  readonly cellsOf: (run: SheetRun) => Cells;
}

/** Keeps edited and new rows of a grid as one revision, read as that grid reads them. */
export async function keptRows(
  db: Handle,
  actor: Actor,
  input: { readonly studyId: string; readonly base: number; readonly rows: readonly RowEdit[] },
  textsOf: (sheet: Sheet) => RowTexts,
): Promise<ActionResult<KeptRows>> {
  const study = (await readStudy(db, actor, input.studyId)) ?? notFound();
  const reader = textsOf(study.sheet);
  const runIds = Object.fromEntries(input.rows.map((row) => [row.key, row.runId ?? newIdentifier()]));
  const seen: { faults: RowsRefusal | null; conflict: boolean } = { faults: null, conflict: false };
  const outcome = await changeWithEffect(db, actor, input.studyId, async () => {
    const result = await changeRows(db, actor, input, { rows: input.rows, runIds, reader });
    if ("faults" in result) {
      seen.faults = result.faults;
      return { status: "unchanged" };
    }
    seen.conflict = result.status === "conflict";
    return result;
  });
  if (seen.faults !== null) return done({ status: "faults", faults: seen.faults });
  if (seen.conflict) {
    const { sheet, revision } = (await readStudy(db, actor, input.studyId)) ?? notFound();
    const { cellsOf } = textsOf(sheet);
    const wanted = new Set(input.rows.map(({ runId }) => runId));
    const theirs = sheet.runs.flatMap((run) => (wanted.has(run.id) ? [[run.id, cellsOf(run)] as const] : []));
    return done({ status: "conflict", revision, theirs: Object.fromEntries(theirs) });
  }
  return outcome.ok ? done({ status: "kept", runIds, ...outcome.value }) : outcome;
}
