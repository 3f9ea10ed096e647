import type { Metadata } from "next";
import { redirect } from "next/navigation";
import type { ReactNode } from "react";
import { RunMapFigure } from "@/app/_figures/run-map-figure";
import { SparkLine } from "@/app/_figures/spark-line";
import { TraceFigure } from "@/app/_figures/trace-figure";
import { recipeLines, runMapView, traceFigureView } from "@/app/_findings/figures.view";
import { database } from "@/app/_server/database";
import { drawnTraces } from "@/app/_server/drawn-traces";
import { openStudy } from "@/app/_server/study";
import { ButtonLink } from "@/app/_ui/button";
import { EmptyState } from "@/app/_ui/empty-state";
import { Prose } from "@/app/_ui/prose";
import { Sheet } from "@/app/_ui/sheet";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { gatherNotes } from "@/app/_worksheet/checks/gather-notes";
import { presentRuns } from "@/app/_worksheet/present-runs";
import { listMembers } from "@/db/member/member.queries";
import { isMixed } from "@/db/sheet/mixed-run";
import { RunGrid } from "./_components/run-grid";
import { RunMargin } from "./_components/run-margin";
import { RunTable } from "./_components/run-table";
import { runGridView } from "./run-grid.view";
import { sparkView } from "./sparks.view";
import { runSheetView } from "./view";

interface Props {
  params: Promise<{ studyId: string }>;
  searchParams: Promise<{ edit?: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { sheet } = await openStudy((await params).studyId);
  return { title: `Runs · ${sheet.study.name} · Ratewright` };
}

export default async function RunsPage({ params, searchParams }: Props) {
  const { studyId } = await params;
  const { actor, sheet, revision, canEdit } = await openStudy(studyId);
  const db = database();
  const hashes = presentRuns(sheet).flatMap((run) => (run.trace === null ? [] : [run.trace.sha256]));
  const [analysis, traces, members] = await Promise.all([
    analyseStudy(db, sheet),
    drawnTraces(db, hashes),
    listMembers(db, actor),
  ]);
  const initials = new Map([...members].map(([id, member]) => [id, member.initials]));
  const here = `/studies/${studyId}/runs`;
  const view = runSheetView(sheet, analysis, initials);
  const empty = view.groups.length === 0;
  const edits = (await searchParams).edit !== undefined;
  // The first row that is kept must not close the grid over the rows that are still being typed.
  if (empty && canEdit && !edits) redirect(`${here}?edit`);
  const margin = (
    <RunMargin
      checks={gatherNotes(analysis.checks, analysis.runs).filter((check) => check.station === "runs")}
      recipe={recipeLines(sheet, traces)}
      measured={analysis.runs.some((run) => run.rate.kind !== "none")}
      showsKeys={edits && canEdit}
    />
  );
  const actions = canEdit ? (
    <>
      {edits ? (
        !empty && <ButtonLink href={here}>Back to the run sheet</ButtonLink>
      ) : (
        <ButtonLink href={`${here}?edit`}>Edit values</ButtonLink>
      )}
      <ButtonLink href={`${here}/mixing`}>Mixing table</ButtonLink>
      <ButtonLink href={`${here}/import#paste`}>Paste columns</ButtonLink>
      <ButtonLink kind="primary" href={`${here}/import`}>
        Add traces
      </ButtonLink>
    </>
  ) : (
    <ButtonLink href={`${here}/mixing`}>Mixing table</ButtonLink>
  );
  if (edits) {
    return (
      <Sheet
        title={view.title}
        lead={
          empty
            ? "Bring four runs with two levels of each reactant. That is enough for a first law."
            : `Each change here refits the law and can be undone. ${sheet.runs.some(isMixed) ? "Shaded concentrations follow from volumes: change those on the mixing table." : "Values with their standard uncertainty: 50.0 ± 0.4."}`
        }
        actions={actions}
        margin={margin}
      >
        {empty && (
          <div className="mb-5">
            <EmptyState
              title="Add traces, or type the runs below"
              actions={
                <>
                  <ButtonLink kind="primary" href={`${here}/import`}>
                    Choose a file
                  </ButtonLink>
                  <ButtonLink href={`${here}/import#paste`}>Paste columns</ButtonLink>
                </>
              }
            >
              One time column and one column a run, or time and signal in pairs. You see how it was read
              before anything is stored. Rates that you already have go into the grid.
            </EmptyState>
          </div>
        )}
        <RunGrid
          studyId={studyId}
          revision={revision}
          view={runGridView(sheet, analysis)}
          canEdit={canEdit}
        />
      </Sheet>
    );
  }
  const sparks = sparkView(sheet, view, traces);
  const figure = traceFigureView(sheet, analysis, traces);
  const map = runMapView(sheet, analysis);
  const drawn: Record<string, ReactNode> = {};
  for (const spark of sparks.lines) drawn[spark.runId] = <SparkLine {...spark} domain={sparks.domain} />;
  return (
    <Sheet title={view.title} lead={<Prose text={view.lead} />} actions={actions} margin={margin}>
      {empty ? (
        <EmptyState title="No runs yet">An analyst or lead of the group adds them.</EmptyState>
      ) : (
        <div className="grid grid-cols-[minmax(0,1.42fr)_minmax(0,1fr)] gap-8 narrow:grid-cols-1">
          <RunTable
            studyId={studyId}
            revision={revision}
            view={{ ...view, sparkNote: sparks.note }}
            sparks={drawn}
            canEdit={canEdit}
          />
          <div className="min-w-0 narrow:grid narrow:grid-cols-2 narrow:gap-6 phone:grid-cols-1">
            {figure.traces.length > 0 && (
              <TraceFigure
                view={figure}
                number={1}
                label={`${figure.y.quantity} against time for ${figure.traces.length} runs`}
                caption="Traces through the calibration. Dashes: a repeat. Dots: set aside."
              />
            )}
            {map !== null && (
              <div className="mt-5 narrow:mt-0">
                <RunMapFigure
                  view={map}
                  number={figure.traces.length > 0 ? 2 : 1}
                  label={`Where the runs lie in the plane of ${map.x.quantity} and ${map.y.quantity}`}
                  caption="Where the runs lie."
                />
              </div>
            )}
          </div>
        </div>
      )}
    </Sheet>
  );
}
