"use client";

import { ButtonLink } from "@/app/_ui/button";
import { Margin } from "@/app/_ui/margin";
import { typeset } from "@/app/_ui/prose";
import { Sheet } from "@/app/_ui/sheet";
import { Value } from "@/app/_ui/value";
import { useStudyChange } from "../../../_change/use-study-change";
import type { RatesView, RunRateView } from "../view";
import { DependencePart, EstimatorTable, SourceTable } from "./how-it-came-about";
import { RateList } from "./rate-list";
import { RateChecks, RuleSection, TraceMarksSection, WindowSection } from "./rate-margin";
import { TraceWindow } from "./trace-window";
import { useSavedWindow } from "./use-saved-window";
import { useTraceMarks } from "./use-trace-marks";

/** One run at a time: its trace with the window in the middle, all runs' rates beside it, what speaks in the margin. */
export function RatesBench({
  studyId,
  revision,
  canEdit,
  rates,
  run,
}: {
  studyId: string;
  revision: number;
  canEdit: boolean;
  rates: RatesView;
  run: RunRateView;
}) {
  const target = { studyId, base: revision, runId: run.runId };
  const change = useStudyChange(studyId);
  const window = useSavedWindow(target, run, change);
  const marks = useTraceMarks(target, run, change);
  const shown = window.shown?.rate ?? run.entered;
  const address = (label: string) => `/studies/${studyId}/rates?run=${encodeURIComponent(label)}`;
  return (
    <Sheet
      title={
        shown === null ? (
          `${run.label}: no rate`
        ) : (
          <>
            {run.label}: initial rate{" "}
            <data
              className="phone:[&_span]:whitespace-normal"
              value={window.shown?.exactRate ?? undefined}
              data-preview={window.isPreview}
            >
              <Value number={shown} unit={rates.rateUnit} />
            </data>
          </>
        )
      }
      lead={typeset(
        [run.recipe, run.dependenceInWords ?? run.reason ?? ""].filter((part) => part !== "").join(". "),
      )}
      actions={
        <>
          {run.previous !== null && <ButtonLink href={address(run.previous)}>Previous run</ButtonLink>}
          {run.next !== null && <ButtonLink href={address(run.next)}>Next run</ButtonLink>}
        </>
      }
      margin={
        <Margin label={`Window and checks of ${run.label}`}>
          <WindowSection run={run} window={window} canEdit={canEdit} />
          {canEdit && (
            <TraceMarksSection target={target} run={run} window={window} marks={marks} change={change} />
          )}
          {rates.rule !== null && <RuleSection rule={rates.rule} />}
          <RateChecks run={run} />
        </Margin>
      }
    >
      <div className="grid grid-cols-[226px_minmax(0,1fr)] items-start gap-[30px] narrow:grid-cols-[204px_minmax(0,1fr)] narrow:gap-5 phone:grid-cols-1">
        <div className="phone:order-2">
          <RateList rates={rates} current={run.runId} address={address} />
        </div>
        <div className="min-w-0">
          {run.trace !== null && window.shown !== null && (
            <TraceWindow run={run} trace={run.trace} window={window} marks={marks} canEdit={canEdit} />
          )}
          {run.trace === null && run.entered !== null && (
            <p>
              This rate was entered by hand, <Value number={run.entered} unit={rates.rateUnit} />, and has no
              trace to look at.
            </p>
          )}
          {run.trace === null && run.entered === null && <p>{run.reason}</p>}
          <div className="mt-4.5 grid grid-cols-2 gap-x-7 gap-y-5 phone:grid-cols-1">
            <DependencePart run={run} />
            {window.shown !== null && <SourceTable estimate={window.shown} />}
          </div>
          <EstimatorTable
            rows={run.estimators}
            rateUnit={rates.rateUnit}
            timeUnit={run.trace?.scale.timeUnit ?? ""}
          />
        </div>
      </div>
    </Sheet>
  );
}
