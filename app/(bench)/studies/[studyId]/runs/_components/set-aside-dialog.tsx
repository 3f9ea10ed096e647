"use client";

import { type FormEvent, useEffect, useId, useState, useTransition } from "react";
import type { LawPreview } from "@/app/_server/study-change";
import { Button } from "@/app/_ui/button";
import { Dialog } from "@/app/_ui/dialog";
import { Field } from "@/app/_ui/field";
import { LawBeforeAfter } from "../../../_change/law-preview";
import { previewAside } from "../actions";

export interface RunName {
  readonly runId: string;
  readonly label: string;
}

/** Asks for the reason, with the law as it stands and as it would stand without the runs. */
export function SetAsideDialog({
  studyId,
  runs,
  onClose,
  onSetAside,
}: {
  studyId: string;
  /** Runs to set aside; null while the dialog is closed. */
  runs: readonly RunName[] | null;
  onClose: () => void;
  onSetAside: (reason: string) => Promise<void>;
}) {
  const form = useId();
  const [reason, setReason] = useState("");
  const [fault, setFault] = useState<string | undefined>(undefined);
  const [preview, setPreview] = useState<LawPreview | null>(null);
  const [working, start] = useTransition();
  const key = runs === null ? "" : runs.map(({ runId }) => runId).join(" ");

  useEffect(() => {
    setReason("");
    setFault(undefined);
    setPreview(null);
    if (key === "") return;
    let wanted = true;
    previewAside({ studyId, runIds: key.split(" "), aside: true }).then((result) => {
      if (wanted && result.ok) setPreview(result.value);
    });
    return () => {
      wanted = false;
    };
  }, [key, studyId]);

  const names = (runs ?? []).map(({ label }) => label);
  const what = names.length < 4 ? listed(names) : `${names.length} runs`;

  function onSubmit(event: FormEvent) {
    event.preventDefault();
    if (reason.trim() === "") {
      setFault("A run is set aside with a reason. Say in a few words what was wrong.");
      return;
    }
    start(() => onSetAside(reason.trim()));
  }

  return (
    <Dialog
      open={runs !== null}
      onOpenChange={(open) => !open && onClose()}
      title={`Set ${what} aside`}
      lead={
        names.length === 1
          ? "It keeps its trace and its place on the sheet, and can be taken back at any time."
          : "They keep their traces and their places on the sheet, and can be taken back at any time."
      }
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="primary" type="submit" form={form} disabled={working}>
            {`Set ${what} aside`}
          </Button>
        </>
      }
    >
      <form id={form} onSubmit={onSubmit} noValidate>
        {preview === null ? (
          <p className="my-3 border-y border-rule py-3 text-ink-2">Refitting without {what}.</p>
        ) : (
          <LawBeforeAfter before={preview.before} after={preview.after} />
        )}
        <Field
          label="Reason"
          value={reason}
          maxLength={300}
          placeholder="bubble at 6 s"
          error={fault}
          onChange={(event) => {
            setReason(event.target.value);
            setFault(undefined);
          }}
        />
      </form>
    </Dialog>
  );
}

function listed(names: readonly string[]): string {
  return names.length < 2 ? names.join("") : `${names.slice(0, -1).join(", ")} and ${names.at(-1)}`;
}
