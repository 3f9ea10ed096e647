"use client";

import { Button } from "@/app/_ui/button";
import { CheckNote } from "@/app/_ui/check";
import { MarginSection } from "@/app/_ui/margin";
import { typeset } from "@/app/_ui/prose";
import type { RuleView, RunRateView } from "../view";
import { SpikeList } from "./spike-list";
import { TimeZeroForm } from "./time-zero-form";
import { TraceMarksForm } from "./trace-marks-form";
import type { RunTarget, SavedWindow, StudyChange } from "./use-saved-window";
import type { TraceMarks } from "./use-trace-marks";

/** Where the window lies and what the fit on it says, following the handles. */
export function WindowSection({
  run,
  window,
  canEdit,
}: {
  run: RunRateView;
  window: SavedWindow;
  canEdit: boolean;
}) {
  const { shown } = window;
  if (shown === null) return null;
  return (
    <MarginSection title={`Window of ${run.label}`}>
      <dl className="fact-list">
        {shown.facts.map((fact) => (
          <div key={fact.name} className="contents">
            <dt>{fact.name}</dt>
            <dd>{typeset(fact.text)}</dd>
          </div>
        ))}
      </dl>
      <p className="mt-2 text-caption text-ink-2" role="status">
        {statusOf(run, window)}
      </p>
      {window.problem !== null && <p className="field-error mt-1">{window.problem}</p>}
      {canEdit && (run.byHand || window.isPreview) && (
        <p className="mt-2">
          <Button size="small" onClick={window.reset} disabled={window.saving}>
            Use the study’s rule
          </Button>
        </p>
      )}
    </MarginSection>
  );
}

/**
 * Clock, dead time, what counts and spikes. Where they leave nothing to fit there is no window, and they are still there to
 * be mended.
 */
export function TraceMarksSection({
  target,
  run,
  window,
  marks,
  change,
}: {
  target: RunTarget;
  run: RunRateView;
  window: SavedWindow;
  marks: TraceMarks;
  change: StudyChange;
}) {
  const said = run.marks;
  if (said === null) return null;
  return (
    <MarginSection title={`What counts of ${run.label}`}>
      <TimeZeroForm change={change} target={target} saved={said.timeZero} scale={run.timeScale} />
      <TraceMarksForm change={change} target={target} marks={said} scale={run.timeScale} />
      {run.trace !== null && (
        <SpikeList run={run} trace={run.trace} said={said} window={window} marks={marks} />
      )}
      {marks.problem !== null && <p className="field-error mt-1">{marks.problem}</p>}
    </MarginSection>
  );
}

function statusOf(run: RunRateView, { saving, isPreview }: SavedWindow): string {
  if (saving) return "Saving. The law follows.";
  if (isPreview) return "A preview, not saved yet.";
  return run.byHand ? "Set by hand for this run." : "Follows the study’s rule.";
}

export function RuleSection({ rule }: { rule: RuleView }) {
  return (
    <MarginSection title="The study’s rule">
      <p>{typeset(rule.sentence)}</p>
      <p className="mt-1.5 text-caption text-ink-2">{typeset(rule.reason)}</p>
    </MarginSection>
  );
}

export function RateChecks({ run }: { run: RunRateView }) {
  return (
    <MarginSection title="Checks on this rate">
      {run.setAside !== null && <p className="mb-2">Set aside: {run.setAside}</p>}
      {run.checks.length === 0 ? (
        <CheckNote severity="holds" message="Nothing speaks against this rate." />
      ) : (
        run.checks.map((check) => (
          <CheckNote
            key={`${check.code} ${check.message}`}
            severity={check.severity}
            message={check.message}
            settled={check.settled}
          />
        ))
      )}
    </MarginSection>
  );
}
