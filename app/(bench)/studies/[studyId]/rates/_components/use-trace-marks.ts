"use client";

import { useState, useTransition } from "react";
import type { ActionResult } from "@/app/_server/action-result";
import type { ChangedLaw } from "@/app/_server/study-change";
import { saveSpikes, saveTimeZero, saveTraceMarks } from "../actions";
import type { RunRateView } from "../view";
import type { RunTarget, StudyChange } from "./use-saved-window";

/** What the run says of its trace, kept as it is said; one change at a time. */
export interface TraceMarks {
  readonly saving: boolean;
  /** Why the last change was refused. */
  readonly problem: string | null;
  setTimeZero(seconds: number): void;
  setTrim(fromSeconds: number, toSeconds: number): void;
  /** Marks a reading of the drawing as a spike, or takes the mark away. */
  toggleSpike(shownIndex: number): void;
  setSpikes(places: readonly number[]): void;
}

export function useTraceMarks(target: RunTarget, run: RunRateView, change: StudyChange): TraceMarks {
  const [saving, startSaving] = useTransition();
  const [problem, setProblem] = useState<string | null>(null);
  const marked = run.marks?.spikes.map((spike) => spike.place) ?? [];

  function keep(action: () => Promise<ActionResult<ChangedLaw>>) {
    startSaving(async () => {
      const result = await action();
      startSaving(() => setProblem(result.ok ? null : result.message));
      if (result.ok) change.announce(result.value);
    });
  }

  const setSpikes = (places: readonly number[]) => keep(() => saveSpikes({ ...target, places: [...places] }));
  return {
    saving,
    problem,
    setTimeZero: (timeZeroSeconds) => keep(() => saveTimeZero({ ...target, timeZeroSeconds })),
    setTrim: (fromSeconds, toSeconds) =>
      keep(() => saveTraceMarks({ ...target, trim: { fromSeconds, toSeconds } })),
    toggleSpike: (shownIndex) => {
      const place = run.trace?.shown.places[shownIndex];
      if (place === undefined || saving) return;
      setSpikes(marked.includes(place) ? marked.filter((one) => one !== place) : [...marked, place]);
    },
    setSpikes,
  };
}
