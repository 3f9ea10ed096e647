"use client";

import { useRouter } from "next/navigation";
import { useRef, useState } from "react";
import type { GridStep } from "@/app/_ui/grid/grid-shape";
import { useStudyChange } from "../../../_change/use-study-change";
import { keepRows } from "../actions";
import {
  applyStep,
  type CellBefore,
  type Draft,
  emptyDraft,
  keepableRows,
  restoreCells,
  withoutRows,
} from "../draft-rows";
import type { RunGridView } from "../run-grid.view";
import type { RowEdit } from "../schema";

/** A step as undo sees it: cells that never left the page, and the revision that the others became. */
interface MadeStep {
  readonly cells: readonly CellBefore[];
  readonly after: readonly CellBefore[];
  readonly revision: number | null;
}

export interface RowConflict {
  readonly revision: number;
  readonly rows: readonly RowEdit[];
  readonly theirs: Readonly<Record<string, Readonly<Record<string, string>>>>;
}

/**
 * Typing in the grid: each finished step is kept at once as one revision, as far as its rows are read; what is not
 * read stays in the draft. Undo takes back the whole step, in the sheet and on the page.
 */
export function useRunDraft({
  studyId,
  revision,
  view,
}: {
  studyId: string;
  revision: number;
  view: RunGridView;
}) {
  const router = useRouter();
  const { announce, refuse, undo, redo, isOpen } = useStudyChange(studyId, { latestOnly: true });
  const [draft, setDraft] = useState<Draft>(emptyDraft);
  const [said, say] = useState("");
  const [conflict, setConflict] = useState<RowConflict | null>(null);
  const [waiting, setWaiting] = useState(0);
  // Rows that were kept in a revision which the page has not received yet: they leave the draft when it arrives.
  const [arriving, setArriving] = useState<
    readonly { readonly keys: readonly string[]; readonly revision: number }[]
  >([]);
  const latest = useRef(revision);
  latest.current = Math.max(latest.current, revision);
  const made = useRef<MadeStep[]>([]);
  const undone = useRef<MadeStep[]>([]);

  const arrived = arriving.filter((group) => group.revision <= revision);
  if (arrived.length > 0) {
    setArriving(arriving.filter((group) => group.revision > revision));
    setDraft((now) =>
      withoutRows(
        now,
        arrived.flatMap(({ keys }) => keys),
      ),
    );
  }

  /** The revision that the rows became; null where none did. */
  async function send(rows: readonly RowEdit[], base: number): Promise<number | null> {
    setWaiting((count) => count + 1);
    try {
      const result = await keepRows({ studyId, base, rows });
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
      const at = value.revision;
      if (at !== null) {
        latest.current = Math.max(latest.current, at);
        announce(value);
      }
      setArriving((groups) => [
        ...groups,
        { keys: rows.map(({ key }) => key), revision: at ?? latest.current },
      ]);
      return at;
    } finally {
      setWaiting((count) => count - 1);
    }
  }

  async function onStep(step: GridStep) {
    const applied = applyStep(draft, step, view);
    setDraft(applied.draft);
    say(step.said);
    // A row that is typed into again is no longer the one that was kept.
    setArriving((groups) =>
      groups.map((group) => ({ ...group, keys: group.keys.filter((key) => !applied.touched.includes(key)) })),
    );
    const after = applied.before.map(({ key, column }) => ({
      key,
      column,
      text: applied.draft.texts[key]?.[column],
    }));
    const rows = keepableRows(applied.draft, applied.touched, view);
    const sent = new Set(rows.map(({ key }) => key));
    const onPage = (cells: readonly CellBefore[]) => cells.filter(({ key }) => !sent.has(key));
    const entry = { cells: onPage(applied.before), after: onPage(after) };
    undone.current = [];
    if (rows.length === 0) {
      made.current.push({ ...entry, revision: null });
      return;
    }
    made.current.push({ ...entry, revision: await send(rows, latest.current) });
  }

  async function onUndo() {
    const step = made.current.pop();
    if (step === undefined) return say("Nothing to undo here.");
    setDraft((now) => restoreCells(now, step.cells));
    const by = step.revision !== null && isOpen(step.revision) ? await undo(step.revision) : null;
    undone.current.push({ ...step, revision: by });
    say("Undone.");
  }

  async function onRedo() {
    const step = undone.current.pop();
    if (step === undefined) return say("Nothing to redo here.");
    setDraft((now) => restoreCells(now, step.after));
    const by = step.revision === null ? null : await redo(step.revision);
    made.current.push({ ...step, revision: by });
    say("Done again.");
  }

  return {
    draft,
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
            conflict.rows.map(({ key }) => key),
          ),
        );
      setConflict(null);
      router.refresh();
    },
    putMineOver: async () => {
      if (conflict === null) return;
      setConflict(null);
      latest.current = Math.max(latest.current, conflict.revision);
      made.current.push({ cells: [], after: [], revision: await send(conflict.rows, conflict.revision) });
    },
  };
}
