"use client";

import { useId } from "react";
import { Button } from "@/app/_ui/button";
import { SeverityMark } from "@/app/_ui/check";
import { Dialog } from "@/app/_ui/dialog";
import { Field, Select } from "@/app/_ui/field";
import { keepStock } from "../actions";
import type { StockForm } from "../schema";
import type { SpeciesChoice, StockRow } from "../view";
import { useDialogForm } from "./use-dialog-form";

const UNITS = [
  ["mol/L", "mol L⁻¹"],
  ["mmol/L", "mmol L⁻¹"],
  ["umol/L", "µmol L⁻¹"],
] as const;

/** One stock: what it holds, or which stock it was diluted from. */
export function StockDialog({
  studyId,
  revision,
  stockId,
  before,
  species,
  others,
  volumeUnit,
  onClose,
}: {
  studyId: string;
  revision: number;
  /** Null for a new one. */
  stockId: string | null;
  before: StockForm;
  species: readonly SpeciesChoice[];
  others: readonly StockRow[];
  volumeUnit: string;
  onClose: () => void;
}) {
  const formId = useId();
  const { form, change, faults, message, working, onSubmit } = useDialogForm(
    before,
    (filled) => keepStock({ studyId, base: revision, stockId, form: filled }),
    onClose,
  );
  const box = (path: "symbol" | "name" | "taken" | "mark" | "lot" | "madeOn" | "howKnown") => ({
    value: form[path],
    error: faults[path],
    onChange: (event: { target: { value: string } }) => change({ [path]: event.target.value }),
  });

  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title={stockId === null ? "Add a stock" : `Stock ${before.symbol || before.name}`}
      lead="What volumes are taken from: a solution, a dilution of another stock, or the medium alone."
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="primary" type="submit" form={formId} disabled={working}>
            {stockId === null ? "Add this stock" : "Keep this stock"}
          </Button>
        </>
      }
    >
      <form id={formId} onSubmit={onSubmit} noValidate className="mt-3 grid gap-3">
        <div className="grid grid-cols-[88px_minmax(0,1fr)] gap-3">
          <Field label="Symbol" maxLength={12} {...box("symbol")} />
          <Field label="Name" maxLength={160} placeholder="KOH, carbonate-free" {...box("name")} />
        </div>
        <Select
          label="Made from"
          value={form.fromStockId}
          onChange={(event) => change({ fromStockId: event.target.value })}
        >
          <option value="">its solutes, or nothing but the medium</option>
          {others.map((stock) => (
            <option key={stock.stockId} value={stock.stockId}>
              a dilution of {stock.name}
            </option>
          ))}
        </Select>
        {form.fromStockId === "" ? (
          <Contents form={form} species={species} faults={faults} onChange={change} />
        ) : (
          <div className="grid grid-cols-2 gap-3">
            <Field label="Taken" unit={volumeUnit} placeholder="1000 ± 4" {...box("taken")} />
            <Field label="Made up to" unit={volumeUnit} placeholder="10000 ± 10" {...box("mark")} />
          </div>
        )}
        <div className="grid grid-cols-2 gap-3">
          <Field label="Lot" maxLength={60} {...box("lot")} />
          <Field label="Made" maxLength={40} placeholder="13 Mar" {...box("madeOn")} />
        </div>
        <Field
          label="How known"
          maxLength={120}
          placeholder="titrated, three portions"
          {...box("howKnown")}
        />
        {message !== null && (
          <p role="alert">
            <SeverityMark severity="blocks">{message}</SeverityMark>
          </p>
        )}
      </form>
    </Dialog>
  );
}

function Contents({
  form,
  species,
  faults,
  onChange,
}: {
  form: StockForm;
  species: readonly SpeciesChoice[];
  faults: Readonly<Record<string, string>>;
  onChange: (part: Partial<StockForm>) => void;
}) {
  return (
    <fieldset className="grid gap-2.5 border-y border-rule py-3">
      <legend className="sr-only">Concentrations</legend>
      <Select
        label="Concentrations in"
        value={form.unit}
        onChange={(event) => {
          const unit = UNITS.find(([value]) => value === event.target.value)?.[0];
          if (unit !== undefined) onChange({ unit });
        }}
      >
        {UNITS.map(([value, words]) => (
          <option key={value} value={value}>
            {words}
          </option>
        ))}
      </Select>
      <div className="grid grid-cols-2 gap-x-3 gap-y-2.5">
        {species.map(({ id, label }) => (
          <Field
            key={id}
            label={label}
            placeholder="none"
            value={form.contents[id] ?? ""}
            error={faults[`contents.${id}`]}
            onChange={(event) => onChange({ contents: { ...form.contents, [id]: event.target.value } })}
          />
        ))}
      </div>
      <p className="hint">
        With its standard uncertainty, 20.02 ± 0.12. The ions of one salt get the same value and share its
        error. All boxes empty: the medium alone.
      </p>
    </fieldset>
  );
}
