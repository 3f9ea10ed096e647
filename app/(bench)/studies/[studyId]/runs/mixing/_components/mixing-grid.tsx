"use client";

import { type ReactNode, useMemo, useState } from "react";
import { SeverityMark } from "@/app/_ui/check";
import { Grid } from "@/app/_ui/grid/grid";
import type { GridBand, GridColumn, GridRow, GridStep } from "@/app/_ui/grid/grid-shape";
import { Prose } from "@/app/_ui/prose";
import { RunMark } from "@/app/_ui/run-mark";
import { Unit } from "@/app/_ui/unit";
import { ConflictDialog } from "../../_components/conflict-dialog";
import { useRunDraft } from "../../_components/use-run-draft";
import { MARK, readMixingCells, VOLUME } from "../../_mixing/mixing-row";
import { CONCENTRATION, type Mixture, STRENGTH, TOTAL } from "../../_mixing/mixture";
import { draftFaults, isBlank, type KeptRowTexts } from "../../draft-rows";
import { keepVolumes } from "../actions";
import {
  headingName,
  type MixingColumn,
  type MixingGridView,
  type MixingRow,
  volumeHeadingFault,
} from "../mixing-grid.view";
import { typedMixture, typedWords } from "../typed-mixture";
import { useMixingChange } from "./mixing-change";

const MOST_RUNS = 2000;

/** Volumes typed, pasted and filled like a spreadsheet; what they come to stands beside them while they are typed. */
export function MixingGrid({
  studyId,
  revision,
  view,
  canEdit,
}: {
  studyId: string;
  revision: number;
  view: MixingGridView;
  canEdit: boolean;
}) {
  const kept: KeptRowTexts = {
    rows: view.rows,
    faultsOf: (cells) => readMixingCells(cells, null, view.shape).faults,
  };
  const sheet = useRunDraft({ studyId, revision, kept, keep: keepVolumes, change: useMixingChange() });
  // Refusals that were left for now, with the total they were left at: another total asks again.
  const [left, setLeft] = useState<readonly string[]>([]);
  const faults = draftFaults(sheet.draft, kept);
  const keptById = new Map(view.rows.map((row) => [row.runId, row]));
  const columns = useMemo(() => view.columns.map((column) => gridColumn(column, view)), [view]);

  function repair(rowId: string, columnId: string, text: string, said: string) {
    const step: GridStep = { kind: "edit", changes: [{ rowId, newRow: -1, columnId, text }], said };
    void sheet.onStep(step);
  }

  let group: MixingRow["group"] | null = null;
  const rows = sheet.order.flatMap(({ key, runId }): GridRow[] => {
    const row = runId === null ? undefined : keptById.get(runId);
    if (row === undefined && !canEdit) return [];
    const typed = sheet.draft.texts[runId ?? key];
    const cells = { ...row?.cells, ...typed };
    const mixture = typed === undefined && row !== undefined ? row.mixture : typedMixture(view, cells);
    const made = mixingRow({
      key,
      row,
      cells,
      mixture,
      faults: faults[runId ?? key],
      left,
      onLeave: (mark) => setLeft((marks) => [...marks, mark]),
      onRepair: (columnId, text, said) => repair(key, columnId, text, said),
      onDiscard: () => sheet.discard(runId ?? key),
    });
    const heads = row?.group ?? "planned";
    const opens = heads !== group;
    group = heads;
    return [opens ? { ...made, group: GROUPS[heads] } : made];
  });

  return (
    <>
      <Grid
        label="Mixing table"
        columns={columns}
        bands={bandsOf(view)}
        rows={rows}
        editable={canEdit}
        roomForNewRows={MOST_RUNS - rows.length}
        onStep={(step) => void sheet.onStep(step)}
        onUndo={() => void sheet.onUndo()}
        onRedo={() => void sheet.onRedo()}
        onSay={sheet.say}
        speak={(rowId, columnId, text) =>
          typedWords(view, rows.find(({ id }) => id === rowId)?.cells ?? {}, columnId, text)
        }
        status={
          <>
            <p>{sheet.saving ? "Refitting." : sheet.said}</p>
            {canEdit && (
              <p className="text-right">
                <b>Paste a block</b> from a spreadsheet: headings name the stocks, rows become runs, decimal
                commas are read.
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

const GROUPS: Readonly<Record<MixingRow["group"], ReactNode>> = {
  measured: (
    <>
      <b>Measured.</b> Changing a volume here refits the law
    </>
  ),
  planned: (
    <>
      <b>Planned</b>, no trace yet. Not part of the law
    </>
  ),
};

function bandsOf({ columns, volumesHead, afterHead }: MixingGridView): GridBand[] {
  const volumes = columns.filter(({ id }) => id.startsWith(VOLUME)).length;
  const between = columns.filter(({ id }) => id === TOTAL || id === MARK).length;
  const after = columns.filter(({ id }) => id.startsWith(CONCENTRATION) || id === STRENGTH).length;
  return [
    { id: "run", head: null, columns: 1 },
    {
      id: "volumes",
      head: (
        <>
          <b>Volumes</b> {volumesHead}
        </>
      ),
      columns: volumes + between,
    },
    {
      id: "after",
      head: (
        <>
          <b>After mixing</b>
          {afterHead === "" ? "" : `, ${afterHead}`}
        </>
      ),
      columns: after,
      computed: true,
    },
    { id: "remark", head: null, columns: 1 },
  ];
}

function gridColumn(column: MixingColumn, { shape }: MixingGridView): GridColumn {
  const isVolume = column.id.startsWith(VOLUME);
  return {
    id: column.id,
    label: column.label,
    kind: column.kind,
    readOnly: column.computed,
    isNamed: (heading) => column.names.includes(headingName(heading)),
    ...(isVolume ? { headingFault: (heading: string) => volumeHeadingFault(heading, shape.unit) } : {}),
    width: column.id === "remark" ? "170px" : column.id.startsWith(CONCENTRATION) ? "104px" : "76px",
    head: (
      <>
        <Prose text={column.head} />
        <span className="head-unit">{column.unit === "" ? "\u00a0" : <Unit text={column.unit} />}</span>
      </>
    ),
  };
}

interface RowParts {
  readonly key: string;
  readonly row: MixingRow | undefined;
  readonly cells: Readonly<Record<string, string>>;
  /** Null where a volume is not read. */
  readonly mixture: Mixture | null;
  readonly faults: Readonly<Record<string, string>> | undefined;
  readonly left: readonly string[];
  readonly onLeave: (mark: string) => void;
  readonly onRepair: (columnId: string, text: string, said: string) => void;
  readonly onDiscard: () => void;
}

function mixingRow(parts: RowParts): GridRow {
  const { key, row, cells, mixture, faults } = parts;
  const label = cells.label?.trim() || row?.cells.label || "New run";
  const isRefused = mixture?.status === "refused";
  return {
    id: key,
    label,
    cells: { ...cells, ...computedCells(mixture) },
    drawn: {
      label:
        row === undefined ? (
          isBlank(cells) ? (
            <span className="text-ink-3">New run</span>
          ) : (
            label
          )
        ) : (
          <RunMark mark={row.mark} label={label} state={row.state} />
        ),
      ...(isRefused || (cells.remark ?? "") === ""
        ? { remark: <RemarkCell refused={isRefused} text={cells.remark || row?.aside || ""} /> }
        : {}),
    },
    ...(row === undefined ? { tone: "new" as const } : {}),
    ...(row?.state === "set-aside" ? { tone: "set-aside" as const } : {}),
    ...problemOf(parts, label, faults),
  };
}

function RemarkCell({ refused, text }: { refused: boolean; text: string }) {
  return (
    <>
      {refused && <SeverityMark severity="blocks">Refused</SeverityMark>} {text}
    </>
  );
}

function computedCells(mixture: Mixture | null): Record<string, string> {
  if (mixture === null || mixture.status === "empty") return { [TOTAL]: "" };
  if (mixture.status === "refused") return { [TOTAL]: mixture.total };
  const concentrations = Object.entries(mixture.concentrations).map(([id, text]) => [
    CONCENTRATION + id,
    text,
  ]);
  return {
    [TOTAL]: mixture.total,
    [STRENGTH]: mixture.ionicStrength,
    ...Object.fromEntries(concentrations),
  };
}

function problemOf(
  { key, row, mixture, left, onLeave, onRepair, onDiscard }: RowParts,
  label: string,
  faults: RowParts["faults"],
): Pick<GridRow, "faults" | "problem"> {
  if (faults !== undefined)
    return {
      faults,
      problem: {
        title:
          row === undefined ? `${label} is not kept yet` : `${label} keeps its last good values in the law`,
        detail: Object.values(faults).join(" "),
        repairs: [
          { label: row === undefined ? "Leave this row out" : "Return to the kept values", act: onDiscard },
        ],
      },
    };
  if (mixture?.status !== "refused") return {};
  const { refusal, total } = mixture;
  const mark = `${key} ${total}`;
  const wrong = Object.fromEntries(refusal.columns.map((column) => [column, refusal.title]));
  if (left.includes(mark)) return { faults: wrong };
  const keeps = row?.group === "measured" ? "The law keeps its last good concentrations." : "";
  return {
    faults: wrong,
    problem: {
      title: refusal.title,
      detail: [refusal.detail, keeps].filter((part) => part !== "").join(" "),
      repairs: [
        ...refusal.repairs.map((one) => ({
          label: one.label,
          act: () => onRepair(one.columnId, one.text, `${label}: ${one.label}.`),
        })),
        { label: "Leave for now", act: () => onLeave(mark) },
      ],
    },
  };
}
