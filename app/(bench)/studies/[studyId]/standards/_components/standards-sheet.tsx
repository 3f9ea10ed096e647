"use client";

import { useState } from "react";
import { CalibrationFigure } from "@/app/_figures/calibration-figure";
import type { CalibrationFigureView } from "@/app/_figures/figure-view";
import { PlacedResidualsFigure } from "@/app/_figures/placed-residuals-figure";
import { Button } from "@/app/_ui/button";
import { EmptyState } from "@/app/_ui/empty-state";
import { Notice } from "@/app/_ui/notice";
import { typeset } from "@/app/_ui/prose";
import { SectionTitle, Sheet } from "@/app/_ui/sheet";
import { Unit } from "@/app/_ui/unit";
import { useStudyChange } from "../../../_change/use-study-change";
import type { StandardsView } from "../view";
import { FollowLine } from "./follow-line";
import { LineSettings } from "./line-settings";
import { ReadingForm } from "./reading-form";
import { RunRangeTable } from "./run-range-table";
import { StandardsEditor } from "./standards-editor";
import { StandardsMargin } from "./standards-margin";
import { StandardsTable } from "./standards-table";

export interface StandardsTarget {
  readonly studyId: string;
  readonly base: number;
}

/** The standards station: line, residuals and table, what follows from them, and the boxes that change them. */
export function StandardsSheet({
  studyId,
  revision,
  canEdit,
  view,
}: {
  studyId: string;
  revision: number;
  canEdit: boolean;
  view: StandardsView;
}) {
  const target = { studyId, base: revision };
  const change = useStudyChange(studyId);
  const [edits, setEdits] = useState(false);
  const isEmpty = view.rows.length === 0;
  const editor = edits && (
    <StandardsEditor target={target} view={view} change={change} onClose={() => setEdits(false)} />
  );
  if (isEmpty)
    return (
      <Sheet title={view.title}>
        {editor || (
          <EmptyState
            title="The signal has no calibration line"
            actions={
              canEdit ? (
                <Button kind="primary" onClick={() => setEdits(true)}>
                  Enter standards
                </Button>
              ) : undefined
            }
          >
            Five concentrations or more across the range of the runs, each read three times, give a slope with
            its uncertainty, a detection limit, and whether the signal is straight. Until then the factor of
            the set-up stands.
          </EmptyState>
        )}
      </Sheet>
    );
  return (
    <Sheet
      title={<Title view={view} />}
      lead={view.lead === "" ? undefined : view.lead}
      actions={
        canEdit && !edits ? (
          <Button kind="primary" onClick={() => setEdits(true)}>
            Edit or paste standards
          </Button>
        ) : undefined
      }
      margin={<StandardsMargin view={view} />}
    >
      {editor}
      {view.problem !== "" && (
        <Notice severity="weakens" title="No line yet">
          {typeset(view.problem)}
        </Notice>
      )}
      <div className="grid grid-cols-[minmax(0,1.5fr)_minmax(0,1fr)] items-start gap-x-9 gap-y-7 narrow:grid-cols-1">
        {view.figure !== null && <LineFigures view={view} figure={view.figure} />}
        <div className="grid gap-7 [&_section]:mt-0!">
          <FollowLine target={target} follow={view.follow} change={change} canEdit={canEdit} />
          <ReadingForm view={view} />
          <LineSettings key={revision} target={target} view={view} change={change} canEdit={canEdit} />
        </div>
      </div>
      <section className="mt-7">
        <SectionTitle note="± is one standard uncertainty">Standards</SectionTitle>
        <StandardsTable target={target} view={view} change={change} canEdit={canEdit} />
      </section>
      {view.runs.length > 0 && (
        <section>
          <SectionTitle note="whole traces, by what the followed species can reach">
            Runs on the line
          </SectionTitle>
          <RunRangeTable rows={view.runs} />
        </section>
      )}
    </Sheet>
  );
}

function Title({ view }: { view: StandardsView }) {
  if (view.slope === "") return <>{typeset(view.title)}</>;
  return (
    <>
      {typeset(view.title)}{" "}
      <span className={view.follow.status === "follows" ? "marked" : undefined}>{typeset(view.slope)}</span>{" "}
      <Unit text={view.slopeUnit} />
    </>
  );
}

function LineFigures({ view, figure }: { view: StandardsView; figure: CalibrationFigureView }) {
  return (
    <section aria-label="Calibration line">
      <CalibrationFigure
        view={figure}
        label={`${view.quantity} of the standards against their concentration${figure.line === null ? "" : ", with the line"}`}
        number={1}
        caption={
          figure.line === null
            ? "Readings of the standards. Grey: not in the line."
            : "Readings, line and 95 % prediction band of one new reading. Marked: the part in use. Grey: not in the line."
        }
      />
      {view.residuals !== null && (
        <div className="mt-4">
          <PlacedResidualsFigure
            view={view.residuals}
            label="Residuals of the readings from the line against concentration"
            number={2}
            caption="Residuals of the readings in the line."
          />
        </div>
      )}
    </section>
  );
}
