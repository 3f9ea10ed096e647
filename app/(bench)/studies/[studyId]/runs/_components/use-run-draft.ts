"use client";

import { useRouter } from "next/navigation";
import { useRef, useState } from "react";
import type { ActionResult } from "@/app/_server/action-result";
import type { GridStep } from "@/app/_ui/grid/grid-shape";
import type { useStudyChange } from "../../../_change/use-study-change";
import {
  adoptRows,
  applyStep,
  type CellBefore,
  type Draft,
  emptyDraft,
  type KeptRowTexts,
  keepableRows,
  restoreCells,
  rowOrder,
  withoutKept,
  withoutRows,
} from "../draft-rows";
import type { KeptRows } from "../kept-rows";
import type { RowEdit } from "../schema";

/** A step as undo sees it: cells that never left the page, and the revision that the others became. */
interface MadeStep {
  readonly cells: readonly CellBefore[];
  readonly after: readonly CellBefore[];
  readonly revision: Promise<number | null>;
}

/** Rows that were kept in a revision which the page has not received yet: they leave the draft when it arrives. */
interface Arriving {
  readonly rows: readonly RowEdit[];
  readonly revision: number;
}

export interface RowConflict {
  readonly revision: number;
  readonly rows: readonly RowEdit[];
  readonly theirs: Readonly<Record<string, Readonly<Record<string, string>>>>;
}

/** The action that keeps edited and new rows as one revision. */
export type KeepRows = (input: {
  studyId: string;
  base: number;
  rows: readonly RowEdit[];
}) => Promise<ActionResult<KeptRows>>;

/**
 * Typing in the grid: each finished step is kept at once as one revision, as far as its rows are read; what is not
 * read stays in the draft. Undo takes back the whole step, in the sheet and on the page.
 */
export function useRunDraft({
  studyId,
  revision,
  kept,
  keep,
  change,
}: {
  studyId: string;
  revision: number;
  kept: KeptRowTexts;
  keep: KeepRows;
  /** The history of changes that the page has made. */
  change: ReturnType<typeof useStudyChange>;
}) {
  const router = useRouter();
  const { announce, refuse, undo, redo, isOpen } = change;
  const [draft, setDraft] = useState<Draft>(emptyDraft);
  const [said, say] = useState("");
  const [conflict, setConflict] = useState<RowConflict | null>(null);
  const [waiting, setWaiting] = useState(0);
  const [arriving, setArriving] = useState<readonly Arriving[]>([]);
  // What the new rows of this page became, by their keys.
  const [runIds, setRunIds] = useState<Readonly<Record<string, string>>>({});
  const knownIds = useRef(runIds);
  // One change at a time: the next may be about a row that the last one makes, and starts from its revision.
  const queue = useRef<Promise<unknown>>(Promise.resolve());
  const latest = useRef(revision);
  latest.current = Math.max(latest.current, revision);
  const made = useRef<MadeStep[]>([]);
  const undone = useRef<MadeStep[]>([]);

  const onSheet = new Set(kept.rows.map((row) => row.runId));
  const landed = Object.fromEntries(
    Object.entries(runIds).filter(([key, id]) => onSheet.has(id) && draft.newKeys.includes(key)),
  );
  if (Object.keys(landed).length > 0) setDraft((now) => adoptRows(now, landed));
  const arrived = arriving.filter((group) => group.revision <= revision);
  if (arrived.length > 0) {
    setArriving(arriving.filter((group) => group.revision > revision));
    setDraft((now) =>
      arrived
        .flatMap(({ rows }) => rows)
        .reduce((left, { key, cells }) => withoutKept(left, keyIn(left, key), cells), now),
    );
  }

  /** Under which key a row's texts lie: a new row's own until it came back as a run. */
  function keyIn(now: Draft, key: string): string {
    return now.newKeys.includes(key) ? key : (knownIds.current[key] ?? key);
  }

  /** The revision that the rows became; null where none did. */
  function send(rows: readonly RowEdit[]): Promise<number | null> {
    const sent = queue.current.then(() => sendNow(rows));
    // A change that failed was told of by its own promise; the next one is not held up by it.
    queue.current = sent.catch(() => null);
    return sent;
  }

  async function sendNow(wanted: readonly RowEdit[]): Promise<number | null> {
    const rows = wanted.map((row) => ({ ...row, runId: row.runId ?? knownIds.current[row.key] ?? null }));
    setWaiting((count) => count + 1);
    try {
      const result = await keep({ studyId, base: latest.current, rows });
      if (!result.ok) {
        refuse(result.message);
        return null;
      }
      const { value } = result;
      if (value.status === "faults") {
        say(
          Object.values(value.faults).flatMap((row) => Object.values(row))[0] ?? "Some cells are not read.",
        );
        return null;
      }
      if (value.status === "conflict") {
        setConflict({ revision: value.revision, rows, theirs: value.theirs });
        return null;
      }
      const made = rows.flatMap(({ key, runId }): [string, string][] => {
        const id = value.runIds[key];
        return runId === null && id !== undefined ? [[key, id]] : [];
      });
      knownIds.current = { ...knownIds.current, ...Object.fromEntries(made) };
      setRunIds(knownIds.current);
      const at = value.revision;
      if (at !== null) {
        latest.current = Math.max(latest.current, at);
        announce(value);
      }
      setArriving((groups) => [...groups, { rows, revision: at ?? latest.current }]);
      return at;
    } finally {
      setWaiting((count) => count - 1);
    }
  }

  async function onStep(drawn: GridStep) {
    // A run that began as a row of this page is drawn under its first key.
    const changes = drawn.changes.map((change) =>
      change.rowId === null ? change : { ...change, rowId: keyIn(draft, change.rowId) },
    );
    const step = { ...drawn, changes };
    const applied = applyStep(draft, step, kept);
    setDraft(applied.draft);
    say(step.said);
    const after = applied.before.map(({ key, column }) => ({
      key,
      column,
      text: applied.draft.texts[key]?.[column],
    }));
    const rows = keepableRows(applied.draft, applied.touched, kept);
    const sent = new Set(rows.map(({ key }) => key));
    const onPage = (cells: readonly CellBefore[]) => cells.filter(({ key }) => !sent.has(key));
    const entry = { cells: onPage(applied.before), after: onPage(after) };
    undone.current = [];
    const revision = rows.length === 0 ? Promise.resolve(null) : send(rows);
    made.current.push({ ...entry, revision });
    await revision;
  }

  async function onUndo() {
    const step = made.current.pop();
    if (step === undefined) return say("Nothing to undo here.");
    setDraft((now) => restoreCells(now, heldNow(now, step.cells)));
    const at = await step.revision;
    const by = at !== null && isOpen(at) ? await undo(at) : null;
    undone.current.push({ ...step, revision: Promise.resolve(by) });
    say("Undone.");
  }

  async function onRedo() {
    const step = undone.current.pop();
    if (step === undefined) return say("Nothing to redo here.");
    setDraft((now) => restoreCells(now, heldNow(now, step.after)));
    const at = await step.revision;
    const by = at === null ? null : await redo(at);
    made.current.push({ ...step, revision: Promise.resolve(by) });
    say("Done again.");
  }

  function heldNow(now: Draft, cells: readonly CellBefore[]): readonly CellBefore[] {
    return cells.map((cell) => ({ ...cell, key: keyIn(now, cell.key) }));
  }

  return {
    draft,
    order: rowOrder(draft, kept, runIds),
    said,
    say,
    conflict,
    saving: waiting > 0,
    onStep,
    onUndo,
    onRedo,
    /** Drops what was typed into a row; the kept values show again. */
    discard: (key: string) => setDraft((now) => withoutRows(now, [key])),
    takeTheirs: () => {
      if (conflict !== null)
        setDraft((now) =>
          withoutRows(
            now,
            conflict.rows.map(({ key }) => keyIn(now, key)),
          ),
        );
      setConflict(null);
      router.refresh();
    },
    putMineOver: async () => {
      if (conflict === null) return;
      setConflict(null);
      latest.current = Math.max(latest.current, conflict.revision);
      const revision = send(conflict.rows);
      made.current.push({ cells: [], after: [], revision });
      await revision;
    },
  };
}
