import type { Kysely, Transaction } from "kysely";
import { dropBlob, sealBlob } from "../blob/blob.commands";
import type { Database } from "../database";
import { bytesKeptByGroup } from "../group/bytes-kept";
import { newIdentifier } from "../identifier";
import { BYTES_PER_GROUP, limitSentences, POINTS_PER_STUDY } from "../limits";
import { type Actor, mayActAs } from "../member/actor";
import { isMixed, stockedSpecies } from "../sheet/mixed-run";
import type { Sheet, SheetRun, SheetUpload } from "../sheet/sheet.schema";
import { type ChangeResult, type ChangeTarget, changeStudyIn } from "../study/change-study";
import { readStudy } from "../study/study.queries";
import { packTrace, type StoredTrace } from "../trace/trace-bytes";
import { dropStaged, type StagedTrace, sealTraces, stageTraces } from "../trace/write-trace";
import { addedNote, type NewRun, withRuns } from "./run.commands";

/** A run with its readings. `column` says where in the file they stood. */
export interface TracedRun extends Omit<NewRun, "id" | "trace"> {
  readonly trace: StoredTrace;
  readonly column: string;
  /** A run of the sheet that has neither trace nor rate yet and takes these readings; null for a new run. */
  readonly plannedRunId?: string | null;
}

export interface TraceImport {
  /** The received file that the runs were read from; null when they were pasted or pushed. */
  readonly uploadId: string | null;
  /** How the file was read, in words. */
  readonly reading: string;
  readonly runs: readonly TracedRun[];
}

/**
 * Stores an upload, its traces and its runs. Long work (packing, writing parts) comes first, a short transaction at
 * a time, and belongs to nothing yet; one last small transaction then makes all of it part of the study, or none.
 */
export async function addTraces(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  wanted: TraceImport,
): Promise<ChangeResult> {
  const early = await objection(db, actor, target, wanted);
  if (early !== undefined) return early;

  const packed = await Promise.all(wanted.runs.map((run) => packTrace(run.trace)));
  const staged = await stageTraces(db, packed);
  const outcome = await db.transaction().execute((trx) => storeIn(trx, actor, target, wanted, staged));
  await dropStaged(db, outcome.unneeded);
  if (outcome.unneededFile !== null) await dropBlob(db, outcome.unneededFile);
  return outcome.result;
}

/** What can be said before any byte is written. */
async function objection(
  db: Kysely<Database>,
  actor: Actor,
  { studyId }: ChangeTarget,
  wanted: TraceImport,
): Promise<ChangeResult | undefined> {
  const study = await readStudy(db, actor, studyId);
  if (study === undefined) return { status: "not-found" };
  if (!mayActAs(actor.role, "analyst")) return { status: "forbidden" };
  if (wanted.runs.length === 0) return { status: "refused", message: "No run was found in the file." };
  const empty = wanted.runs.find((run) => run.trace.timeSeconds.length === 0);
  if (empty !== undefined) {
    return {
      status: "refused",
      message: `${empty.label} has no readings. Leave it out or choose its column.`,
    };
  }
  const added = wanted.runs.reduce((sum, run) => sum + run.trace.timeSeconds.length, 0);
  const points = study.sheet.runs.reduce((sum, run) => sum + (run.trace?.points ?? 0), added);
  if (points > POINTS_PER_STUDY) return { status: "refused", message: limitSentences.points(points) };
  const kept = (await bytesKeptByGroup(db, actor.groupId)) + 16 * added;
  if (kept > BYTES_PER_GROUP) return { status: "refused", message: limitSentences.group(kept) };
  return undefined;
}

interface Outcome {
  readonly result: ChangeResult;
  /** Staged traces that are kept already, or all of them when nothing was changed. */
  readonly unneeded: readonly StagedTrace[];
  readonly unneededFile: number | null;
}

async function storeIn(
  trx: Transaction<Database>,
  actor: Actor,
  target: ChangeTarget,
  wanted: TraceImport,
  staged: readonly StagedTrace[],
): Promise<Outcome> {
  const nothing = (result: ChangeResult): Outcome => ({ result, unneeded: staged, unneededFile: null });
  const waiting =
    wanted.uploadId === null ? null : await findWaiting(trx, actor, target.studyId, wanted.uploadId);
  if (waiting === undefined) {
    return nothing({
      status: "refused",
      message: "The file is no longer here: it was dropped, or its runs are stored already. Upload it again.",
    });
  }
  const upload: SheetUpload | null =
    waiting === null
      ? null
      : {
          id: waiting.id,
          sha256: waiting.sha256,
          fileName: waiting.fileName,
          size: waiting.size,
          at: waiting.at,
          memberId: waiting.memberId,
          reading: wanted.reading,
        };
  const runs = newRuns(wanted, staged);
  const result = await changeStudyIn(trx, actor, target, addedNote(runs.map(({ run }) => run)), (sheet) => {
    const next = withTracedRuns(sheet, runs);
    if ("refused" in next || upload === null) return next;
    return { ...next, uploads: [...next.uploads, upload] };
  });
  if (result.status !== "changed") return nothing(result);

  const unneeded = await sealTraces(trx, staged);
  if (waiting === null) return { result, unneeded, unneededFile: null };
  await trx.deleteFrom("incoming_upload").where("id", "=", waiting.id).execute();
  const sealed = await sealBlob(trx, waiting.blobId, waiting);
  return { result, unneeded, unneededFile: sealed ? null : waiting.blobId };
}

interface WantedRun {
  readonly run: NewRun;
  readonly plannedRunId: string | null;
}

function newRuns(wanted: TraceImport, staged: readonly StagedTrace[]): WantedRun[] {
  return wanted.runs.map(({ trace: _readings, column, plannedRunId = null, ...run }, index) => {
    const trace = staged[index];
    if (trace === undefined) throw new Error("every run has a staged trace");
    return {
      plannedRunId,
      run: {
        ...run,
        id: plannedRunId ?? newIdentifier(),
        trace: { sha256: trace.sha256, points: trace.points, uploadId: wanted.uploadId, column },
      },
    };
  });
}

/** New runs below the others; planned ones take their readings where they stand, and only if they have none. */
function withTracedRuns(sheet: Sheet, runs: readonly WantedRun[]): Sheet | { refused: string } {
  const planned = new Map(
    runs.flatMap(({ run, plannedRunId }) => (plannedRunId === null ? [] : [[plannedRunId, run] as const])),
  );
  const free = sheet.runs.filter(
    (run) => planned.has(run.id) && run.trace === null && run.enteredRate === null && run.removedIn === null,
  );
  if (free.length < planned.size) {
    return {
      refused:
        "A run that was to take readings has some already, or is gone. Look at the preview again; nothing was stored.",
    };
  }
  const filled = sheet.runs.map((run) => {
    const readings = planned.get(run.id);
    if (readings === undefined) return run;
    return { ...run, ...readings, concentrations: withWorkedOnes(sheet, run, readings.concentrations) };
  });
  const added = runs.flatMap(({ run, plannedRunId }) => (plannedRunId === null ? [run] : []));
  return withRuns(added)({ ...sheet, runs: filled });
}

/** What follows from volumes is not overwritten by what a file or a box says of the recipe. */
function withWorkedOnes(
  { stocks }: Sheet,
  planned: SheetRun,
  said: SheetRun["concentrations"],
): SheetRun["concentrations"] {
  if (!isMixed(planned)) return said;
  const stocked = stockedSpecies(stocks);
  const worked = Object.entries(planned.concentrations).filter(([id]) => stocked.has(id));
  return { ...said, ...Object.fromEntries(worked) };
}

interface WaitingUpload {
  readonly id: string;
  readonly blobId: number;
  readonly sha256: string;
  readonly fileName: string;
  readonly size: number;
  readonly at: string;
  readonly memberId: string;
}

async function findWaiting(
  trx: Transaction<Database>,
  actor: Actor,
  studyId: string,
  uploadId: string,
): Promise<WaitingUpload | undefined> {
  const row = await trx
    .selectFrom("incoming_upload")
    .innerJoin("study", "study.id", "incoming_upload.study_id")
    .select([
      "incoming_upload.id",
      "incoming_upload.blob_id as blobId",
      "incoming_upload.sha256",
      "incoming_upload.file_name as fileName",
      "incoming_upload.size",
      "incoming_upload.at",
      "incoming_upload.member_id as memberId",
    ])
    .where("incoming_upload.id", "=", uploadId)
    .where("incoming_upload.study_id", "=", studyId)
    .where("incoming_upload.state", "=", "received")
    .where("study.group_id", "=", actor.groupId)
    .executeTakeFirst();
  return row === undefined || row.sha256 === null ? undefined : { ...row, sha256: row.sha256 };
}
