import type { Kysely } from "kysely";
import type { Database } from "../database";
import type { Actor } from "../member/actor";
import type { Sheet, SheetRun } from "../sheet/sheet.schema";
import { UNSAID_RUN } from "../sheet/unsaid";
import {
  type Apply,
  type ChangeNote,
  type ChangeResult,
  type ChangeTarget,
  changeStudy,
  type Derive,
} from "../study/change-study";

/**
 * What can be done to runs, each a thin use of `changeStudy`. An id that names no run of the sheet is refused by
 * a sentence and nothing is changed: half a wish is never carried out.
 */

/** What a person says about a run; the rest starts empty. */
export type NewRun = Pick<SheetRun, "id" | "label" | "concentrations"> &
  Partial<
    Pick<
      SheetRun,
      | "temperatureKelvin"
      | "block"
      | "mixture"
      | "volumes"
      | "markMicrolitre"
      | "trace"
      | "enteredRate"
      | "timeZeroSeconds"
      | "remark"
    >
  >;

/** New runs stand below the others, in the order given. */
export function addRuns(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  runs: readonly NewRun[],
): Promise<ChangeResult> {
  return changeStudy(db, actor, target, addedNote(runs), withRuns(runs));
}

export function addedNote(runs: readonly NewRun[]): ChangeNote {
  return { verb: "runs added", summary: `${labels(runs)} added.` };
}

/** The change that `addRuns` makes, for commands that add runs together with something else. */
export function withRuns(added: readonly NewRun[]): (sheet: Sheet) => Sheet {
  return (sheet) => {
    const next = sheet.runs.reduce((least, run) => Math.max(least, run.position + 1), 0);
    const runs = added.map(
      (run, index): SheetRun => ({
        temperatureKelvin: null,
        block: null,
        mixture: null,
        trace: null,
        enteredRate: null,
        timeZeroSeconds: 0,
        remark: "",
        ...UNSAID_RUN,
        ...run,
        position: next + index,
        window: null,
        setAside: null,
        changedIn: 0,
        removedIn: null,
      }),
    );
    return { ...sheet, runs: [...sheet.runs, ...runs] };
  };
}

/** Fields that the run sheet edits in place. */
export type RunEdit = Partial<
  Pick<
    SheetRun,
    | "label"
    | "concentrations"
    | "temperatureKelvin"
    | "block"
    | "mixture"
    | "volumes"
    | "markMicrolitre"
    | "enteredRate"
    | "remark"
  >
>;

/** Sets runs aside with one reason. They keep trace and place; the law no longer stands on them. */
export function setRunsAside(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  runIds: readonly string[],
  reason: string,
): Promise<ChangeResult> {
  const setAside = { reason: reason.trim(), memberId: actor.memberId, at: new Date().toISOString() };
  return changeStudy(
    db,
    actor,
    target,
    { verb: "set aside", summary: about(runIds, `set aside: ${setAside.reason}`) },
    (sheet, revision) =>
      setAside.reason === ""
        ? { refused: "A run is set aside with a reason. Say in a few words what was wrong." }
        : onRuns(runIds, (run) => ({ ...run, setAside }))(sheet, revision),
  );
}

export function takeRunsBack(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  runIds: readonly string[],
): Promise<ChangeResult> {
  return changeStudy(
    db,
    actor,
    target,
    { verb: "taken back", summary: about(runIds, "taken back") },
    onRuns(runIds, (run) => ({ ...run, setAside: null })),
  );
}

/** Puts runs into the bin. */
export function removeRuns(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  runIds: readonly string[],
): Promise<ChangeResult> {
  return changeStudy(
    db,
    actor,
    target,
    { verb: "removed", summary: about(runIds, "put into the bin") },
    onRuns(runIds, (run, revision) => ({ ...run, removedIn: run.removedIn ?? revision })),
  );
}

/**
 * Takes runs out of the bin; refused where another run has taken their label meanwhile. `derive` works out what follows from
 * their volumes, since a stock may have changed.
 */
export function restoreRuns(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  runIds: readonly string[],
  derive?: Derive,
): Promise<ChangeResult> {
  return changeStudy(
    db,
    actor,
    target,
    { verb: "restored", summary: about(runIds, "restored from the bin") },
    onRuns(runIds, (run) => ({ ...run, removedIn: null })),
    derive,
  );
}

/** A window by hand, in the trace's clock; null gives the run back to the study's rule. */
export function setRunWindow(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  runId: string,
  window: SheetRun["window"],
): Promise<ChangeResult> {
  const done = window === null ? "window back to the study's rule" : "window set by hand";
  return changeStudy(
    db,
    actor,
    target,
    { verb: "window", summary: about([runId], done) },
    onRuns([runId], (run) => ({ ...run, window })),
  );
}

/** Time of mixing on the trace's clock. */
export function setTimeZero(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  runIds: readonly string[],
  timeZeroSeconds: number,
): Promise<ChangeResult> {
  return changeStudy(
    db,
    actor,
    target,
    {
      verb: "time zero",
      summary: about(runIds, `time zero at ${String(timeZeroSeconds).replace("-", "\u2212")} s`),
    },
    onRuns(runIds, (run) => ({ ...run, timeZeroSeconds })),
  );
}

/** Edits the runs that are named; refused where one of them is not on the sheet. */
export function onRuns(
  runIds: readonly string[],
  edit: (run: SheetRun, revision: number) => SheetRun,
): Apply {
  return (sheet, revision) => {
    const ids = new Set(runIds);
    if (ids.size === 0) return { refused: "No run was named. Select runs first." };
    const known = new Set(sheet.runs.map((run) => run.id));
    if (runIds.some((id) => !known.has(id))) {
      return { refused: "One of the runs is not in this study. Load the page again and select once more." };
    }
    return { ...sheet, runs: sheet.runs.map((run) => (ids.has(run.id) ? edit(run, revision) : run)) };
  };
}

/** "R03 and R10 set aside: …" with the labels as they were before the change. */
export function about(runIds: readonly string[], done: string): ChangeNote["summary"] {
  return (before) => `${labels(before.runs.filter((run) => runIds.includes(run.id)))} ${done}.`;
}

function labels(runs: readonly { label: string }[]): string {
  const names = runs.map((run) => run.label);
  if (names.length > 6) return `${names.slice(0, 5).join(", ")} and ${names.length - 5} more runs`;
  return names.length < 2 ? names.join("") : `${names.slice(0, -1).join(", ")} and ${names.at(-1)}`;
}
