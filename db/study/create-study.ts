import type { Kysely, Transaction } from "kysely";
import type { Database } from "../database";
import { newIdentifier } from "../identifier";
import { type Actor, mayActAs } from "../member/actor";
import { recordRevision } from "../revision/revision.commands";
import { studyColumns } from "../sheet/sheet.columns";
import { SHEET_VERSION, type Sheet } from "../sheet/sheet.schema";
import { sheetProblem } from "../sheet/sheet-problem";
import { inOrder } from "../sheet/sheet-rows";
import { NO_PREPARATION, UNSAID_CONDITIONS, UNSAID_SIGNAL } from "../sheet/unsaid";
import { writeSheet } from "../sheet/write-sheet";
import type { SetUp } from "./set-up.schema";

export type CreateResult =
  | { readonly status: "created"; readonly studyId: string; readonly number: number; readonly revision: 1 }
  | { readonly status: "refused"; readonly message: string }
  | { readonly status: "forbidden" };

/** A study without runs, all orders free, as revision 1. Numbers count up within the group. */
export async function createStudy(
  db: Kysely<Database>,
  actor: Actor,
  setUp: SetUp,
  options: { invented: boolean } = { invented: false },
): Promise<CreateResult> {
  if (!mayActAs(actor.role, "analyst")) return { status: "forbidden" };
  const sheet: Sheet = {
    version: SHEET_VERSION,
    ...setUp,
    study: { ...setUp.study, invented: options.invented },
    orders: {},
    ...NO_PREPARATION,
    conditions: { ...UNSAID_CONDITIONS, ...setUp.conditions },
    signal: setUp.signal?.kind === "calibrated" ? { ...UNSAID_SIGNAL, ...setUp.signal } : setUp.signal,
    runs: [],
    uploads: [],
  };
  const problem = sheetProblem(sheet);
  if (problem !== undefined) return { status: "refused", message: problem };
  return db.transaction().execute((trx) => insertStudy(trx, actor, inOrder(sheet)));
}

async function insertStudy(trx: Transaction<Database>, actor: Actor, sheet: Sheet): Promise<CreateResult> {
  const studyId = newIdentifier();
  const at = new Date().toISOString();
  const last = await trx
    .selectFrom("study")
    .select((eb) => eb.fn.max("number").as("number"))
    .where("group_id", "=", actor.groupId)
    .executeTakeFirst();
  const number = Number(last?.number ?? 0) + 1;
  await trx
    .insertInto("study")
    .values({
      id: studyId,
      group_id: actor.groupId,
      number,
      revision: 1,
      created_at: at,
      updated_at: at,
      ...studyColumns(sheet),
    })
    .execute();
  await writeSheet(trx, { studyId, revision: 1, at }, sheet);
  await recordRevision(
    trx,
    {
      studyId,
      groupId: actor.groupId,
      number: 1,
      memberId: actor.memberId,
      verb: "created",
      summary: `Study ${number} created: ${sheet.study.name}`,
      at,
    },
    sheet,
  );
  return { status: "created", studyId, number, revision: 1 };
}
