import { workedOut } from "@/app/_worksheet/worked-out";
import type { Handle } from "@/db/database";
import type { Actor } from "@/db/member/actor";
import { type NewRun, type RunEdit, withRuns } from "@/db/run/run.commands";
import type { SheetRun } from "@/db/sheet/sheet.schema";
import { type Apply, type ChangeResult, type ChangeTarget, changeStudy } from "@/db/study/change-study";
import type { Cells } from "./run-row";
import type { RowEdit } from "./schema";

/** By row key, then by column id: what is wrong. */
export type RowsRefusal = Readonly<Record<string, Readonly<Record<string, string>>>>;

interface RowsWanted {
  readonly rows: readonly RowEdit[];
  /** Ids by row key; those of new rows are fresh. */
  readonly runIds: Readonly<Record<string, string>>;
  readonly reader: RowReader;
}

/** How the texts of a row become a run: the run sheet and the mixing table read different columns. */
export interface RowReader {
  readonly edit: (cells: Cells, before: SheetRun) => { readonly faults: Cells; readonly edit: RunEdit };
  readonly make: (row: RowEdit, id: string) => { readonly faults: Cells; readonly run: NewRun };
}

/** Edits rows and adds new ones as one change, or says which cells are not read. */
export async function changeRows(
  db: Handle,
  actor: Actor,
  target: ChangeTarget,
  { rows, runIds, reader }: RowsWanted,
): Promise<ChangeResult | { readonly faults: RowsRefusal }> {
  let faults: Record<string, Readonly<Record<string, string>>> = {};
  const apply: Apply = (sheet) => {
    faults = {};
    const edits = new Map<string, RunEdit>();
    const added: NewRun[] = [];
    for (const row of rows) {
      const before = row.runId === null ? null : (sheet.runs.find((run) => run.id === row.runId) ?? null);
      if (row.runId !== null && before === null) {
        return { refused: "One of the runs is not in this study any more. Load the page again." };
      }
      const id = runIds[row.key];
      if (before === null && id !== undefined) {
        const made = reader.make(row, id);
        added.push(made.run);
        if (Object.keys(made.faults).length > 0) faults[row.key] = made.faults;
      } else if (before !== null) {
        const reading = reader.edit(row.cells, before);
        edits.set(before.id, reading.edit);
        if (Object.keys(reading.faults).length > 0) faults[row.key] = reading.faults;
      }
    }
    if (Object.keys(faults).length > 0) return { refused: "Some cells are not read." };
    const edited = { ...sheet, runs: sheet.runs.map((run) => ({ ...run, ...edits.get(run.id) })) };
    return added.length === 0 ? edited : withRuns(added)(edited);
  };
  const result = await changeStudy(db, actor, target, noteOf(rows), apply, workedOut);
  return Object.keys(faults).length > 0 ? { faults } : result;
}

function noteOf(rows: readonly RowEdit[]) {
  const added = rows.filter((row) => row.runId === null).map((row) => row.cells.label ?? "a run");
  const edited = new Set(rows.flatMap((row) => (row.runId === null ? [] : [row.runId])));
  const verb = added.length === 0 ? "run edited" : "runs added";
  return {
    verb,
    summary: (before: { runs: readonly { id: string; label: string }[] }) => {
      const names = before.runs.flatMap((run) => (edited.has(run.id) ? [run.label] : []));
      return [named(names, "edited"), named(added, "added")].filter((part) => part !== "").join(" ");
    },
  };
}

function named(labels: readonly string[], done: string): string {
  if (labels.length === 0) return "";
  if (labels.length > 6)
    return `${labels.slice(0, 5).join(", ")} and ${labels.length - 5} more runs ${done}.`;
  const last = labels.at(-1) ?? "";
  return `${labels.length === 1 ? last : `${labels.slice(0, -1).join(", ")} and ${last}`} ${done}.`;
}
