"use client";

import { useState } from "react";
import { type HandsOn, WindowFigure } from "@/app/_figures/window-figure";
import { Button } from "@/app/_ui/button";
import { Notice } from "@/app/_ui/notice";
import { typeset } from "@/app/_ui/prose";
import { fitInWords } from "../estimate-view";
import type { RunRateView, TraceOfRun } from "../view";
import type { SavedWindow } from "./use-saved-window";
import type { TraceMarks } from "./use-trace-marks";

const HANDS_ON: readonly { readonly on: HandsOn; readonly name: string; readonly hint: string }[] = [
  {
    on: "window",
    name: "Window",
    hint: "Drag a handle, or focus it and use the arrow keys: one point a step, ten with Shift.",
  },
  {
    on: "clock",
    name: "Clock and trim",
    hint: "Drag the line of time zero and the ends of the part that counts, or focus them and use the arrow keys.",
  },
  {
    on: "spikes",
    name: "Spikes",
    hint: "Click a reading to mark it as a spike, and once more to take the mark away; or give its time beside.",
  },
];

/** The run's trace with its window; readers see the same drawing without handles. */
export function TraceWindow({
  run,
  trace,
  window,
  marks,
  canEdit,
}: {
  run: RunRateView;
  trace: TraceOfRun;
  window: SavedWindow;
  marks: TraceMarks;
  canEdit: boolean;
}) {
  const [handsOn, setHandsOn] = useState<HandsOn>("window");
  const { shown } = window;
  if (shown === null) return null;
  const hint = HANDS_ON.find((one) => one.on === handsOn)?.hint ?? "";
  const secondsOf = (time: number) => time * trace.scale.secondsPerTime;
  return (
    <>
      {shown.refusal !== null && <Notice severity="blocks" title={shown.refusal} />}
      {canEdit && (
        <fieldset className="mb-2 flex flex-wrap gap-2">
          <legend className="sr-only">What is moved on the trace</legend>
          {HANDS_ON.map(({ on, name }) => (
            <Button key={on} size="small" aria-pressed={handsOn === on} onClick={() => setHandsOn(on)}>
              {name}
            </Button>
          ))}
        </fieldset>
      )}
      <WindowFigure
        view={shown.figure}
        label={`Trace of ${run.label} with its window and the slope at mixing`}
        number={1}
        caption={typeset(
          [caption(trace), notFitted(trace), canEdit ? hint : ""].filter((part) => part !== "").join(" "),
        )}
        {...(canEdit
          ? {
              handsOn,
              onPreview: window.preview,
              onCommit: window.commit,
              onTimeZero: (time: number) => marks.setTimeZero(secondsOf(time)),
              onTrim: ({ fromIndex, toIndex }) =>
                marks.setTrim(trace.shown.seconds[fromIndex] ?? 0, trace.shown.seconds[toIndex] ?? 0),
              onReading: marks.toggleSpike,
            }
          : {})}
      />
    </>
  );
}

function caption({ estimate }: TraceOfRun): string {
  const fit = estimate.status === "found" ? fitInWords(estimate).replace(", slope at mixing", "") : "no fit";
  return `The window, its fit (full line: ${fit}) and the slope at mixing (dashes), residuals below.`;
}

/** The legend of what is drawn and not fitted, in words. */
function notFitted({ shown }: TraceOfRun): string {
  const parts = [
    ...(shown.outside.length === 0
      ? []
      : ["small dots lie in the dead time or outside the part that counts"]),
    ...(shown.spikes.length === 0 ? [] : ["crosses are marked as spikes"]),
  ];
  return parts.length === 0 ? "" : `Drawn and not fitted: ${parts.join("; ")}.`;
}
