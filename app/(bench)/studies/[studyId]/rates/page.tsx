import { slopeAgainstWindowEnd } from "kinetics-core/initial-rate";
import type { Metadata } from "next";
import { database } from "@/app/_server/database";
import { openStudy } from "@/app/_server/study";
import { ButtonLink } from "@/app/_ui/button";
import { EmptyState } from "@/app/_ui/empty-state";
import { Sheet as Paper } from "@/app/_ui/sheet";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import type { RunAnalysis } from "@/app/_worksheet/analysis";
import { readTrace } from "@/db/trace/read-trace";
import { RatesBench } from "./_components/rates-bench";
import { ratesView, runRateView, type StoredTrace, selectRun } from "./view";

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
  const selected = selectRun(analysis, typeof asked === "string" ? asked : undefined);
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
  const sha256 = sheet.runs.find((run) => run.id === selected.runId)?.trace?.sha256;
  const stored = sha256 === undefined ? null : await readTrace(db, sha256);
  return (
    <RatesBench
      key={selected.runId}
      studyId={studyId}
      revision={revision}
      canEdit={canEdit}
      rates={ratesView(sheet, analysis)}
      run={runRateView(sheet, analysis, selected, stored, stored === null ? [] : sweep(selected, stored))}
    />
  );
}

/** The same estimator on windows that end elsewhere; a fit of a whole trace is not swept. */
function sweep({ rate }: RunAnalysis, { timeSeconds, signal }: StoredTrace) {
  if (rate.kind !== "estimated") return [];
  const { estimator, degree, window } = rate.initialRate;
  const trace = { time: timeSeconds, signal };
  if (estimator === "straight") return slopeAgainstWindowEnd(trace, { estimator, from: window[0] });
  if (estimator !== "tangent" || (degree !== 2 && degree !== 3 && degree !== 4)) return [];
  return slopeAgainstWindowEnd(trace, { estimator, degree, from: window[0] });
}
