"use client";

import type { ProposedSpikes } from "kinetics-core/initial-rate";
import { useState, useTransition } from "react";
import type { WindowChoice } from "@/app/_figures/figure-view";
import type { useStudyChange } from "../../../_change/use-study-change";
import { saveWindow } from "../actions";
import { type EstimateView, estimateView } from "../estimate-view";
import type { RunRateView } from "../view";
import { useWindowPreview, type WindowSeconds } from "./use-window-preview";

/** Says what a change did and takes it back; one for the whole page, since it listens for Ctrl+Z. */
export type StudyChange = ReturnType<typeof useStudyChange>;

export interface RunTarget {
  readonly studyId: string;
  readonly base: number;
  readonly runId: string;
}

/** The window of one run: what is on record, what a handle shows for now, and how it is saved. */
export interface SavedWindow {
  /** The preview while there is one, else the record; null without a trace. */
  readonly shown: EstimateView | null;
  readonly isPreview: boolean;
  readonly saving: boolean;
  readonly problem: string | null;
  preview(choice: WindowChoice): void;
  commit(choice: WindowChoice): void;
  /** Gives the run back to the study's rule. */
  reset(): void;
  lookForSpikes(): Promise<ProposedSpikes | null>;
}

export function useSavedWindow(target: RunTarget, run: RunRateView, change: StudyChange): SavedWindow {
  const { trace } = run;
  const [saving, startSaving] = useTransition();
  const [refusal, setRefusal] = useState<string | null>(null);
  const live = useWindowPreview(
    `/studies/${target.studyId}/rates/trace/${encodeURIComponent(target.runId)}`,
    trace,
  );

  const record = trace === null ? null : estimateView(trace.shown, trace.scale, trace.estimate);
  const tried =
    trace === null || live.estimate === null ? null : estimateView(trace.shown, trace.scale, live.estimate);
  // The figure keeps the saved window while a handle moves: the handle itself knows where it is.
  const shown =
    tried === null || record === null
      ? record
      : { ...tried, figure: { ...tried.figure, window: record.figure.window } };

  function save(window: WindowSeconds | null) {
    startSaving(async () => {
      const result = await saveWindow({ ...target, window });
      startSaving(() => {
        live.clear();
        setRefusal(result.ok ? null : result.message);
      });
      if (result.ok) change.announce(result.value);
    });
  }

  const seconds = ({ fromIndex, toIndex }: WindowChoice): WindowSeconds => ({
    fromSeconds: trace?.shown.seconds[fromIndex] ?? 0,
    toSeconds: trace?.shown.seconds[toIndex] ?? 0,
  });

  return {
    shown,
    isPreview: tried !== null,
    saving,
    problem: refusal ?? live.problem,
    preview: (choice) => void live.preview(seconds(choice)),
    commit: (choice) => save(seconds(choice)),
    reset: () => save(null),
    lookForSpikes: live.lookForSpikes,
  };
}
