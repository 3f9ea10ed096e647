"use client";

import { useId, useState } from "react";
import { Button } from "@/app/_ui/button";
import { SeverityMark } from "@/app/_ui/check";
import { Dialog } from "@/app/_ui/dialog";
import { Field, Select } from "@/app/_ui/field";
import { MarginSection } from "@/app/_ui/margin";
import { keepDispensing } from "../actions";
import { inVolumeUnit } from "../dispensing-form";
import type { DispensingForm } from "../schema";
import { useDialogForm } from "./use-dialog-form";

/** Mark and uncertainty of deliveries, with the dialog that changes them. */
export function Dispensing({
  studyId,
  revision,
  facts,
  form,
  canEdit,
}: {
  studyId: string;
  revision: number;
  facts: readonly { readonly name: string; readonly value: string }[];
  form: DispensingForm;
  canEdit: boolean;
}) {
  const [open, setOpen] = useState(false);
  return (
    <MarginSection title="Volumes">
      <dl className="fact-list">
        {facts.map(({ name, value }) => (
          <div key={name} className="contents">
            <dt>{name}</dt>
            <dd>{value}</dd>
          </div>
        ))}
      </dl>
      <p className="mt-1.5 text-label text-ink-3">
        Standard uncertainty of one delivery.{" "}
        {canEdit && (
          <Button kind="text" aria-label="Change mark and deliveries" onClick={() => setOpen(true)}>
            Change
          </Button>
        )}
      </p>
      {open && (
        <DispensingDialog
          studyId={studyId}
          revision={revision}
          before={form}
          onClose={() => setOpen(false)}
        />
      )}
    </MarginSection>
  );
}

function DispensingDialog({
  studyId,
  revision,
  before,
  onClose,
}: {
  studyId: string;
  revision: number;
  before: DispensingForm;
  onClose: () => void;
}) {
  const formId = useId();
  const { form, change, faults, message, working, onSubmit } = useDialogForm(
    before,
    (filled) => keepDispensing({ studyId, base: revision, form: filled }),
    onClose,
  );
  const unit = form.unit === "mL" ? "mL" : "µL";
  const box = (path: "mark" | "upTo" | "absolute" | "percent") => ({
    value: form[path],
    error: faults[path],
    inputMode: "decimal" as const,
    onChange: (event: { target: { value: string } }) => change({ [path]: event.target.value }),
  });

  return (
    <Dialog
      open
      onOpenChange={(next) => !next && onClose()}
      title="Mark and deliveries"
      lead="They count for every mixture of the study; a run may have a mark of its own."
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="primary" type="submit" form={formId} disabled={working}>
            Keep these
          </Button>
        </>
      }
    >
      <form id={formId} onSubmit={onSubmit} noValidate className="mt-3 grid grid-cols-2 gap-3">
        <Select
          label="Volumes in"
          value={form.unit}
          onChange={(event) => change(inVolumeUnit(form, event.target.value === "mL" ? "mL" : "uL"))}
        >
          <option value="uL">µL</option>
          <option value="mL">mL</option>
        </Select>
        <Field label="Made up to" unit={unit} placeholder="not to a mark" {...box("mark")} />
        <Field label="Small deliveries, to" unit={unit} placeholder="none" {...box("upTo")} />
        <Field label="Each of them ±" unit={unit} {...box("absolute")} />
        <div className="col-span-2">
          <Field
            label="Other deliveries ±"
            unit="%"
            placeholder="exact"
            hint="One standard uncertainty of pipette and hand, as repeated weighings of water show it."
            {...box("percent")}
          />
        </div>
        {message !== null && (
          <p role="alert" className="col-span-2">
            <SeverityMark severity="blocks">{message}</SeverityMark>
          </p>
        )}
      </form>
    </Dialog>
  );
}
