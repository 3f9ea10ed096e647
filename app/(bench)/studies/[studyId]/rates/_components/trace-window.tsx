"use client";

import { WindowFigure } from "@/app/_figures/window-figure";
import { Notice } from "@/app/_ui/notice";
import { typeset } from "@/app/_ui/prose";
import { fitInWords } from "../estimate-view";
import type { RunRateView, TraceOfRun } from "../view";
import type { SavedWindow } from "./use-saved-window";

/** The run's trace with its window; readers see the same drawing without handles. */
export function TraceWindow({
  run,
  trace,
  window,
  canEdit,
}: {
  run: RunRateView;
  trace: TraceOfRun;
  window: SavedWindow;
  canEdit: boolean;
}) {
  const { shown } = window;
  if (shown === null) return null;
  const fit =
    trace.estimate.status === "found"
      ? fitInWords(trace.estimate).replace(", slope at mixing", "")
      : "no fit";
  return (
    <>
      {shown.refusal !== null && <Notice severity="blocks" title={shown.refusal} />}
      <WindowFigure
        view={shown.figure}
        label={`Trace of ${run.label} with its window and the slope at mixing`}
        number={1}
        caption={typeset(
          `The window, its fit (full line: ${fit}) and the slope at mixing (dashes), residuals below.${
            canEdit
              ? " Drag a handle, or focus it and use the arrow keys: one point a step, ten with Shift."
              : ""
          }`,
        )}
        {...(canEdit ? { onPreview: window.preview, onCommit: window.commit } : {})}
      />
    </>
  );
}
