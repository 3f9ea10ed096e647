"use client";

import { useCallback, useEffect, useMemo, useRef } from "react";
import type { ActionResult } from "@/app/_server/action-result";
import type { ChangedLaw } from "@/app/_server/study-change";
import { type ToastMessage, useToast } from "@/app/_ui/toast";
import { undoChange } from "./actions";
import { useShowLaw } from "./latest-law";

/**
 * Says what each change of a study did to the law and offers to take it back: in the toast, and by Ctrl+Z and
 * Ctrl+Shift+Z on the page. Only changes made from this page are taken back by keys, latest first. With `latestOnly`
 * one toast stands at a time: where changes follow each other quickly, more would cover what is being changed.
 */
export function useStudyChange(studyId: string, { latestOnly = false }: { latestOnly?: boolean } = {}) {
  const show = useToast();
  const showLaw = useShowLaw();
  const toast = useCallback(
    (message: ToastMessage) => show(latestOnly ? { ...message, topic: TOPIC } : message),
    [show, latestOnly],
  );
  const made = useRef<number[]>([]);
  const undone = useRef<number[]>([]);

  const refuse = useCallback((message: string) => toast({ text: message, severity: "blocks" }), [toast]);

  /** Undoes one revision; the revision that did it, or null where it was refused. */
  const undo = useCallback(
    async (revision: number): Promise<number | null> => {
      made.current = made.current.filter((other) => other !== revision);
      const result = await undoChange({ studyId, revision });
      if (!result.ok) {
        refuse(result.message);
        return null;
      }
      if (result.value.standing !== null) showLaw(result.value.standing);
      toast({ text: sentence(result.value) });
      return result.value.revision;
    },
    [studyId, toast, showLaw, refuse],
  );

  /** After a change went through. */
  const announce = useCallback(
    (value: ChangedLaw) => {
      const { revision, standing } = value;
      if (standing !== null) showLaw(standing);
      if (revision === null) {
        toast({ text: value.summary });
        return;
      }
      made.current.push(revision);
      undone.current = [];
      toast({
        text: sentence(value),
        undo: async () => {
          const by = await undo(revision);
          if (by !== null) undone.current.push(by);
        },
      });
    },
    [toast, showLaw, undo],
  );

  /** Announces a change, or says why it was refused. True where it went through. */
  const report = useCallback(
    (result: ActionResult<ChangedLaw>): boolean => {
      if (result.ok) announce(result.value);
      else refuse(result.message);
      return result.ok;
    },
    [announce, refuse],
  );

  /** Whether a change made here still stands to be undone: not by a toast or a key already. */
  const isOpen = useCallback((revision: number) => made.current.includes(revision), []);

  const undoLast = useCallback(async () => {
    const revision = made.current.at(-1);
    const by = revision === undefined ? null : await undo(revision);
    if (by !== null) undone.current.push(by);
  }, [undo]);

  /** Does again what was undone, by undoing the revision that undid it. */
  const redo = useCallback(
    async (revision: number): Promise<number | null> => {
      const by = await undo(revision);
      if (by !== null) made.current.push(by);
      return by;
    },
    [undo],
  );

  const redoLast = useCallback(async () => {
    const revision = undone.current.pop();
    if (revision !== undefined) await redo(revision);
  }, [redo]);

  useEffect(() => {
    function onKeyDown(event: KeyboardEvent) {
      if (!(event.ctrlKey || event.metaKey) || event.altKey || event.key.toLowerCase() !== "z") return;
      // A grid has taken it, and undoes its own step.
      if (event.defaultPrevented) return;
      if (
        event.target instanceof HTMLElement &&
        event.target.closest("input, textarea, select, [role=dialog]")
      )
        return;
      event.preventDefault();
      void (event.shiftKey ? redoLast() : undoLast());
    }
    document.addEventListener("keydown", onKeyDown);
    return () => document.removeEventListener("keydown", onKeyDown);
  }, [undoLast, redoLast]);

  return useMemo(
    () => ({ announce, report, refuse, undo, redo, isOpen }),
    [announce, report, refuse, undo, redo, isOpen],
  );
}

const TOPIC = "change of the study";

function sentence({ summary, effect }: ChangedLaw): string {
  return effect === "" ? summary : `${summary} ${effect}`;
}
