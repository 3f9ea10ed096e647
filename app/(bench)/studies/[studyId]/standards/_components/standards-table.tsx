"use client";

import { type FormEvent, useId, useState, useTransition } from "react";
import { Button } from "@/app/_ui/button";
import { Dialog } from "@/app/_ui/dialog";
import { Field } from "@/app/_ui/field";
import { typeset } from "@/app/_ui/prose";
import { ColumnHead, DataTable } from "@/app/_ui/table";
import type { useStudyChange } from "../../../_change/use-study-change";
import { setStandardAside } from "../actions";
import type { StandardRow } from "../standard-rows";
import type { StandardsView } from "../view";
import type { StandardsTarget } from "./standards-sheet";

/** Every standard with its readings and what the line leaves of them; one is set aside with a reason, and taken back. */
export function StandardsTable({
  target,
  view,
  change,
  canEdit,
}: {
  target: StandardsTarget;
  view: StandardsView;
  change: ReturnType<typeof useStudyChange>;
  canEdit: boolean;
}) {
  const [asked, setAsked] = useState<StandardRow | null>(null);
  const [working, start] = useTransition();

  function set(row: StandardRow, reason: string | null) {
    start(async () => {
      change.report(await setStandardAside({ ...target, standardId: row.id, reason }));
      setAsked(null);
    });
  }

  return (
    <>
      <DataTable caption="Standards">
        <thead>
          <tr>
            <ColumnHead>Level</ColumnHead>
            <ColumnHead numeric unit={view.unitText}>
              Concentration
            </ColumnHead>
            <ColumnHead className="pl-4!" note={view.quantity}>
              Readings
            </ColumnHead>
            <ColumnHead numeric>Mean</ColumnHead>
            <ColumnHead numeric>Residual</ColumnHead>
            <ColumnHead className="pl-4!">Remark</ColumnHead>
          </tr>
        </thead>
        <tbody>
          {view.rows.map((row) => (
            <tr key={row.id} className={row.state === "set-aside" ? "set-aside" : undefined}>
              <th scope="row" className="font-semibold!">
                {row.state === "set-aside" ? <s>{row.label}</s> : row.label}
              </th>
              <td className="num">{typeset(row.concentration)}</td>
              <td className="whitespace-nowrap pl-4!">{row.readings.join("\u2003")}</td>
              <td className="num">{row.mean}</td>
              <td className="num">{row.residual}</td>
              <td className="pl-4!">
                <span className="flex items-baseline gap-x-3 whitespace-nowrap">
                  {row.remark !== "" && <span>{row.remark}</span>}
                  {canEdit && row.state !== "blank" && (
                    <Button
                      kind="text"
                      className="print:hidden"
                      disabled={working}
                      onClick={() => (row.state === "set-aside" ? set(row, null) : setAsked(row))}
                    >
                      {row.state === "set-aside" ? "Take back" : "Set aside"}
                      <span className="sr-only"> {row.label}</span>
                    </Button>
                  )}
                </span>
              </td>
            </tr>
          ))}
        </tbody>
      </DataTable>
      <AsideDialog row={asked} working={working} onClose={() => setAsked(null)} onSetAside={set} />
    </>
  );
}

function AsideDialog({
  row,
  working,
  onClose,
  onSetAside,
}: {
  row: StandardRow | null;
  working: boolean;
  onClose: () => void;
  onSetAside: (row: StandardRow, reason: string) => void;
}) {
  const form = useId();
  const [fault, setFault] = useState<string | undefined>(undefined);

  function onSubmit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const reason = String(new FormData(event.currentTarget).get("reason") ?? "").trim();
    if (reason === "") {
      setFault("A standard is set aside with a reason. Say in a few words what was wrong.");
      return;
    }
    setFault(undefined);
    if (row !== null) onSetAside(row, reason);
  }

  return (
    <Dialog
      open={row !== null}
      onOpenChange={(open) => {
        if (open) return;
        setFault(undefined);
        onClose();
      }}
      title={`Set ${row?.label ?? ""} aside`}
      lead="It keeps its readings and its place on the table, and can be taken back at any time."
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="primary" type="submit" form={form} disabled={working}>
            {`Set ${row?.label ?? ""} aside`}
          </Button>
        </>
      }
    >
      <form id={form} onSubmit={onSubmit} noValidate className="mt-3">
        <Field label="Reason" name="reason" maxLength={300} placeholder="bends away" error={fault} />
      </form>
    </Dialog>
  );
}
