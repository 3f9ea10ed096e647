import type { Metadata } from "next";
import { database } from "@/app/_server/database";
import { openStudy } from "@/app/_server/study";
import { ButtonLink } from "@/app/_ui/button";
import { EmptyState } from "@/app/_ui/empty-state";
import { Sheet as Paper } from "@/app/_ui/sheet";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { sweepWindowEnd } from "@/app/_worksheet/sweep-window-end";
import { readTrace } from "@/db/trace/read-trace";
import { RatesBench } from "./_components/rates-bench";
import { ratesView, runRateView, selectRun } from "./view";

export const metadata: Metadata = { title: "Rates" };

/** The initial rate of every run, and one run's trace with how its rate came about. */
export default async function RatesPage({
  params,
  searchParams,
}: {
  params: Promise<{ studyId: string }>;
  searchParams: Promise<{ run?: string | string[] }>;
}) {
  const { studyId } = await params;
  const { sheet, revision, canEdit } = await openStudy(studyId);
  const db = database();
  const analysis = await analyseStudy(db, sheet);
  const { run: asked } = await searchParams;
  const label = typeof asked === "string" ? asked : undefined;
  const selected = selectRun(analysis, label);
  if (selected === null && label !== undefined && analysis.runs.length > 0)
    return (
      <Paper title={`No run is called ${label}`}>
        <EmptyState
          title="It is not on the run sheet"
          actions={
            <>
              <ButtonLink kind="primary" href={`/studies/${studyId}/rates`}>
                See all rates
              </ButtonLink>
              <ButtonLink href={`/studies/${studyId}/runs`}>Open the run sheet</ButtonLink>
            </>
          }
        >
          It may have another label by now, or lie in the bin below the run sheet.
        </EmptyState>
      </Paper>
    );
  if (selected === null)
    return (
      <Paper title="No run has a rate yet">
        <EmptyState
          title="No traces yet"
          actions={
            <ButtonLink kind="primary" href={`/studies/${studyId}/runs/import`}>
              Import traces
            </ButtonLink>
          }
        >
          A rate is read from the start of a trace: eight readings or more while the first tenth of the
          reaction runs are enough to begin with.
        </EmptyState>
      </Paper>
    );
  const row = sheet.runs.find((run) => run.id === selected.runId);
  const stored = row === undefined || row.trace === null ? null : await readTrace(db, row.trace.sha256);
  const sweep =
    row !== undefined && selected.rate.kind === "estimated"
      ? await sweepWindowEnd(db, row, selected.rate.initialRate)
      : [];
  return (
    <RatesBench
      key={selected.runId}
      studyId={studyId}
      revision={revision}
      canEdit={canEdit}
      rates={ratesView(sheet, analysis)}
      run={runRateView(sheet, analysis, selected, stored, sweep)}
    />
  );
}
