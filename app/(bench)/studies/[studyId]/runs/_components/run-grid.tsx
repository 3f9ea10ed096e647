"use client";

import { headingFault } from "@/app/_import/heading-unit";
import { Grid } from "@/app/_ui/grid/grid";
import type { GridColumn, GridProblem, GridRow } from "@/app/_ui/grid/grid-shape";
import { Prose } from "@/app/_ui/prose";
import { RunMark } from "@/app/_ui/run-mark";
import { Unit } from "@/app/_ui/unit";
import { useStudyChange } from "../../../_change/use-study-change";
import { keepRows } from "../actions";
import { draftFaults, isBlank, type KeptRowTexts } from "../draft-rows";
import type { RunGridColumn, RunGridRow, RunGridView } from "../run-grid.view";
import { readCells } from "../run-row";
import { ConflictDialog } from "./conflict-dialog";
import { useRunDraft } from "./use-run-draft";

const MOST_RUNS = 2000;

/** Runs as a grid: typed, pasted and filled like a spreadsheet; every step is kept as soon as it is read. */
export function RunGrid({
  studyId,
  revision,
  view,
  canEdit,
}: {
  studyId: string;
  revision: number;
  view: RunGridView;
  canEdit: boolean;
}) {
  const kept: KeptRowTexts = {
    rows: view.rows,
    faultsOf: (cells) => readCells(cells, null, view.shape).faults,
  };
  const sheet = useRunDraft({
    studyId,
    revision,
    kept,
    keep: keepRows,
    change: useStudyChange(studyId, { latestOnly: true }),
  });
  const faults = draftFaults(sheet.draft, kept);
  const keptById = new Map(view.rows.map((row) => [row.runId, row]));
  const rows = sheet.order.flatMap(({ key, runId }) => {
    const row = runId === null ? undefined : keptById.get(runId);
    if (row !== undefined) return [keptRow(key, row, view, sheet, faults)];
    return canEdit ? [newRow(key, sheet, faults)] : [];
  });
  const columnOf = new Map(view.columns.map((column) => [column.id, column]));
  return (
    <>
      <Grid
        label="Runs of this study"
        columns={view.columns.map(gridColumn)}
        rows={rows}
        editable={canEdit}
        roomForNewRows={MOST_RUNS - rows.length}
        onStep={(step) => void sheet.onStep(step)}
        onUndo={() => void sheet.onUndo()}
        onRedo={() => void sheet.onRedo()}
        onSay={sheet.say}
        speak={(_, columnId, text) => {
          const fault = readCells({ [columnId]: text }, null, view.shape).faults[columnId];
          const unit = columnOf.get(columnId)?.unit ?? "";
          return (
            fault ??
            (text.trim() === "" ? "Empty." : `${text.trim()}${unit === "" ? "" : ` ${plainUnit(unit)}`}.`)
          );
        }}
        status={
          <>
            <p>{sheet.saving ? "Refitting." : sheet.said}</p>
            {canEdit && (
              <p className="text-right">
                <b>Paste a block</b> from a spreadsheet: rows become runs, decimal commas are read. 50.0 ± 0.4
                carries its standard uncertainty.
              </p>
            )}
          </>
        }
      />
      <ConflictDialog
        conflict={sheet.conflict}
        columns={view.columns}
        onTakeTheirs={sheet.takeTheirs}
        onPutMineOver={() => void sheet.putMineOver()}
      />
    </>
  );
}

function gridColumn(column: RunGridColumn): GridColumn {
  return {
    id: column.id,
    label: column.label,
    kind: column.kind,
    headingFault: (heading) => headingFault(heading, column.unit),
    width: column.id === "remark" ? "180px" : column.kind === "number" ? "92px" : "84px",
    head: (
      <>
        <Prose text={column.head} />
        <span className="head-unit">{column.unit === "" ? "\u00a0" : <Unit text={column.unit} />}</span>
      </>
    ),
  };
}

type Sheet = ReturnType<typeof useRunDraft>;
type Faults = ReturnType<typeof draftFaults>;

function keptRow(id: string, row: RunGridRow, view: RunGridView, sheet: Sheet, faults: Faults): GridRow {
  const cells = { ...row.cells, ...sheet.draft.texts[row.runId] };
  const label = cells.label || row.cells.label || "run";
  return {
    id,
    label,
    cells,
    readOnly: row.workedOut,
    drawn: { label: <RunMark mark={row.mark} label={label} state={row.state} /> },
    ...(row.state === "set-aside" ? { tone: "set-aside" as const } : {}),
    ...faultsOf(faults[row.runId], view, label, {
      label: "Return to the kept values",
      act: () => sheet.discard(row.runId),
    }),
  };
}

function newRow(key: string, sheet: Sheet, faults: Faults): GridRow {
  const cells = sheet.draft.texts[key] ?? {};
  const label = cells.label?.trim() || "New run";
  return {
    id: key,
    label,
    cells,
    tone: "new",
    ...(isBlank(cells) ? { drawn: { label: <span className="text-ink-3">New run</span> } } : {}),
    ...faultsOf(faults[key], null, label, { label: "Leave this row out", act: () => sheet.discard(key) }),
  };
}

function faultsOf(
  faults: Readonly<Record<string, string>> | undefined,
  view: RunGridView | null,
  label: string,
  repair: GridProblem["repairs"][number],
): Pick<GridRow, "faults" | "problem"> {
  if (faults === undefined) return {};
  return {
    faults,
    problem: {
      title: view === null ? `${label} is not kept yet` : `${label} keeps its last good values in the law`,
      detail: Object.values(faults).join(" "),
      repairs: [repair],
    },
  };
}

function plainUnit(unit: string): string {
  return unit.replaceAll("^-1", "⁻¹");
}
