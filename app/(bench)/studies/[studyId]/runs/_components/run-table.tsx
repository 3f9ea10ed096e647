"use client";

import { type ReactNode, useState, useTransition } from "react";
import { Button } from "@/app/_ui/button";
import { Prose } from "@/app/_ui/prose";
import { RunMark } from "@/app/_ui/run-mark";
import { ColumnHead, DataTable, GroupRow } from "@/app/_ui/table";
import { AlignedNumber } from "@/app/_ui/value";
import { useStudyChange } from "../../../_change/use-study-change";
import { putIntoBin, repeatRecipe, restoreFromBin, setAside, takeBack } from "../actions";
import type { RunRow, RunSheetView } from "../view";
import { type RunName, SetAsideDialog } from "./set-aside-dialog";

/** The run sheet as it is read: grouped by series, with what can be done to the runs that are ticked. */
export function RunTable({
  studyId,
  revision,
  view,
  sparks,
  canEdit,
}: {
  studyId: string;
  revision: number;
  view: RunSheetView;
  /** A small trace per run id. */
  sparks: Readonly<Record<string, ReactNode>>;
  canEdit: boolean;
}) {
  const { report } = useStudyChange(studyId);
  const [ticked, setTicked] = useState<ReadonlySet<string>>(new Set());
  const [asking, setAsking] = useState<readonly RunName[] | null>(null);
  const [working, start] = useTransition();
  const rows = view.groups.flatMap((group) => group.rows);
  const chosen = rows.filter((row) => ticked.has(row.runId));
  const standing = chosen.filter((row) => row.state !== "set-aside");
  const aside = chosen.filter((row) => row.state === "set-aside");
  const columns = view.columns.length + (canEdit ? 6 : 5);
  const idsOf = (some: readonly RunRow[]) => some.map(({ runId }) => runId);

  function act(change: () => ReturnType<typeof takeBack>) {
    start(async () => {
      if (report(await change())) setTicked(new Set());
    });
  }

  return (
    <div>
      <DataTable caption="Runs of this study" className="run-table">
        <thead>
          <tr>
            {canEdit && (
              <th scope="col" className="w-[26px] phone:w-11">
                <span className="sr-only">Select</span>
              </th>
            )}
            <ColumnHead>Run</ColumnHead>
            {view.columns.map((column) => (
              <ColumnHead key={column.speciesId} numeric unit={column.unit}>
                <Prose text={column.head} />
              </ColumnHead>
            ))}
            <ColumnHead numeric unit="°C" className="phone:hidden">
              Cell
            </ColumnHead>
            <ColumnHead numeric note={"\u00a0"} className="phone:hidden">
              Points
            </ColumnHead>
            <ColumnHead note={view.sparkNote}>Trace</ColumnHead>
            <ColumnHead className="phone:hidden">Remark</ColumnHead>
          </tr>
        </thead>
        {view.groups.map((group) => (
          <tbody key={group.key}>
            <GroupRow columns={columns}>
              <b>{group.name}</b>
              <Prose text={group.detail} />
            </GroupRow>
            {group.rows.map((row) => (
              <tr
                key={row.runId}
                id={`run-${row.runId}`}
                className={row.state === "set-aside" ? "set-aside" : undefined}
              >
                {canEdit && (
                  <td>
                    <input
                      type="checkbox"
                      className="checkbox"
                      aria-label={`Select ${row.label}`}
                      checked={ticked.has(row.runId)}
                      onChange={(event) => {
                        const next = new Set(ticked);
                        if (event.target.checked) next.add(row.runId);
                        else next.delete(row.runId);
                        setTicked(next);
                      }}
                    />
                  </td>
                )}
                <th scope="row">
                  <RunMark mark={row.mark} label={row.label} state={row.state} />
                </th>
                {view.columns.map((column, index) => (
                  <td key={column.speciesId} className="num">
                    <AlignedNumber text={row.concentrations[index] ?? null} {...column} />
                  </td>
                ))}
                <td className="num phone:hidden">{row.cell ?? "\u2003"}</td>
                <td className="num phone:hidden">{row.points ?? "\u2003"}</td>
                <td className="whitespace-nowrap text-caption">
                  {row.entered === null ? (sparks[row.runId] ?? "\u2003") : <Prose text={row.entered} />}
                </td>
                <td className="text-caption phone:hidden">
                  <Prose text={row.remark} />
                </td>
              </tr>
            ))}
          </tbody>
        ))}
      </DataTable>
      {canEdit && (
        <p className="mt-3 flex flex-wrap items-center gap-2.5 text-label text-ink-3">
          <Button
            size="small"
            disabled={standing.length === 0 || working}
            onClick={() => setAsking(standing.map(({ runId, label }) => ({ runId, label })))}
          >
            Set aside…
          </Button>
          <Button
            size="small"
            disabled={aside.length === 0 || working}
            onClick={() => act(() => takeBack({ studyId, base: revision, runIds: idsOf(aside) }))}
          >
            Take back
          </Button>
          <Button
            size="small"
            disabled={chosen.length !== 1 || working}
            onClick={() =>
              act(() => repeatRecipe({ studyId, base: revision, runId: chosen[0]?.runId ?? "" }))
            }
          >
            New run from this recipe
          </Button>
          <Button
            size="small"
            disabled={chosen.length === 0 || working}
            onClick={() => act(() => putIntoBin({ studyId, base: revision, runIds: idsOf(chosen) }))}
          >
            Put into the bin
          </Button>
          <span>
            {chosen.length === 0
              ? "Select runs first. A run set aside keeps its trace and its reason."
              : `${chosen.length} of ${rows.length} selected.`}
          </span>
        </p>
      )}
      {view.bin.length > 0 && (
        <details className="disclosure mt-4" id="bin">
          <summary>{`In the bin (${view.bin.length})`}</summary>
          <ul className="mt-1 max-w-[560px]">
            {view.bin.map((run) => (
              <li
                key={run.runId}
                className="flex items-center gap-3 border-t border-rule-2 py-1.5 text-small"
              >
                <b className="font-semibold">{run.label}</b>
                <span className="flex-1 text-ink-2">{run.note}</span>
                {canEdit && (
                  <Button
                    size="small"
                    disabled={working}
                    onClick={() =>
                      act(() => restoreFromBin({ studyId, base: revision, runIds: [run.runId] }))
                    }
                  >
                    {`Restore ${run.label}`}
                  </Button>
                )}
              </li>
            ))}
          </ul>
        </details>
      )}
      <SetAsideDialog
        studyId={studyId}
        runs={asking}
        onClose={() => setAsking(null)}
        onSetAside={async (reason) => {
          const result = await setAside({
            studyId,
            base: revision,
            runIds: (asking ?? []).map(({ runId }) => runId),
            reason,
          });
          if (report(result)) setTicked(new Set());
          setAsking(null);
        }}
      />
    </div>
  );
}
