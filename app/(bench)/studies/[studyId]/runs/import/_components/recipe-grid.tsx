"use client";

import { useMemo, useState } from "react";
import type { Change } from "@/app/_import/change";
import { headingFault } from "@/app/_import/heading-unit";
import type { SpeciesContext } from "@/app/_import/reading";
import { Grid } from "@/app/_ui/grid/grid";
import type { GridColumn, GridRow, GridStep } from "@/app/_ui/grid/grid-shape";
import { SectionTitle } from "@/app/_ui/sheet";
import { Unit } from "@/app/_ui/unit";
import type { RecipeRow } from "../recipe-row";
import { speciesHead, speciesUnit } from "../view";

const LABEL = "label";

/** Labels and starting concentrations of the runs to be; takes a block copied from a spreadsheet. */
export function RecipeGrid({
  rows,
  species,
  change,
  onStep,
  onUndo,
  onRedo,
}: {
  rows: readonly RecipeRow[];
  species: readonly SpeciesContext[];
  change: (made: Change) => void;
  onStep: (step: GridStep) => void;
  onUndo: () => void;
  onRedo: () => void;
}) {
  const [said, setSaid] = useState("");
  const columns = useMemo(() => gridColumns(species), [species]);
  const gridRows = useMemo(() => rows.map((row) => gridRow(row, species)), [rows, species]);

  function take(step: GridStep) {
    setSaid(step.said);
    for (const { rowId, columnId, text } of step.changes) {
      if (columnId === LABEL && rowId !== null && text.trim() !== "") {
        change({ kind: "label", source: rowId, label: text.trim().slice(0, 40) });
      }
    }
    const typed = step.changes.filter(({ columnId }) => columnId !== LABEL);
    if (typed.length > 0) onStep({ ...step, changes: typed });
  }

  return (
    <section className="mt-6">
      <SectionTitle note="from the file or the planned run where they are given; paste a block from a spreadsheet, or type">
        Starting concentrations
      </SectionTitle>
      <Grid
        label="Labels and starting concentrations"
        columns={columns}
        rows={gridRows}
        editable
        onStep={take}
        onUndo={onUndo}
        onRedo={onRedo}
        onSay={setSaid}
        status={<p>{said}</p>}
      />
    </section>
  );
}

function gridColumns(species: readonly SpeciesContext[]): GridColumn[] {
  return [
    { id: LABEL, label: "Run", head: "Run", kind: "text", width: "110px" },
    ...species.map(
      (one): GridColumn => ({
        id: one.id,
        label: speciesHead(one),
        head: (
          <>
            {speciesHead(one)}
            <span className="head-unit">
              <Unit text={speciesUnit(one)} />
            </span>
          </>
        ),
        kind: "number",
        headingFault: (heading) => headingFault(heading, one.unit),
        width: "96px",
      }),
    ),
    { id: "column", label: "Read from", head: "Read from", kind: "text", readOnly: true, width: "150px" },
    {
      id: "reason",
      label: "Why this run",
      head: "Why this run",
      kind: "text",
      readOnly: true,
      width: "210px",
    },
  ];
}

function gridRow({ trace, texts, faults }: RecipeRow, species: readonly SpeciesContext[]): GridRow {
  const reason = reasonOf(trace, species);
  const wrong = species.find((one) => faults[one.id] !== undefined);
  return {
    id: trace.source,
    label: trace.label,
    readOnly: species.flatMap(({ id }) => (trace.recipe[id]?.mixed ? [id] : [])),
    cells: { ...texts, [LABEL]: trace.label, column: trace.column, reason },
    drawn: { reason: <span className="whitespace-normal text-caption">{reason}</span> },
    faults,
    ...(wrong
      ? {
          problem: {
            title: `${speciesHead(wrong)} of ${trace.label}`,
            detail: faults[wrong.id] ?? "",
            repairs: [],
          },
        }
      : {}),
  };
}

function reasonOf(trace: RecipeRow["trace"], species: readonly SpeciesContext[]): string {
  const recipes = species.flatMap((one) => {
    const entry = trace.recipe[one.id];
    return entry === undefined ? [] : [`${speciesHead(one)} ${entry.reason}`];
  });
  return [trace.labelReason, ...recipes].join("; ");
}
