"use client";

import { useRef, useState } from "react";
import { timeOfKey, timeStep } from "./time-step";
import type { GripHandlers } from "./use-window-choice";

/**
 * The time of mixing while a hand is on its line: steps of a tenth of the distance between readings, since mixing happens
 * between them. Committed once, on release; the moved line stays until the page brings another.
 */
export function useTimeZero(
  time: readonly number[],
  saved: number,
  limits: readonly [number, number],
  timeAt: (clientX: number) => number,
  onCommit: ((time: number) => void) | undefined,
): { readonly at: number; readonly handlers: GripHandlers } {
  const [moved, setMoved] = useState<{ readonly at: number; readonly basis: number } | null>(null);
  const held = useRef(false);
  const unsaved = useRef<number | null>(null);
  const step = timeStep(time);
  const at = moved !== null && moved.basis === saved ? moved.at : saved;

  function moveTo(wanted: number) {
    // A power of ten divides more exactly than it multiplies.
    const stepped = Number((Math.round(wanted / step) * step).toPrecision(12));
    const next = Math.min(limits[1], Math.max(limits[0], stepped));
    if (next === (unsaved.current ?? at)) return;
    unsaved.current = next;
    setMoved({ at: next, basis: saved });
  }

  function commit() {
    held.current = false;
    if (unsaved.current === null) return;
    const chosen = unsaved.current;
    unsaved.current = null;
    onCommit?.(chosen);
  }

  function giveUp() {
    held.current = false;
    unsaved.current = null;
    setMoved(null);
  }

  return {
    at,
    handlers: {
      onPointerDown: (event) => {
        if (event.button !== 0) return;
        event.currentTarget.setPointerCapture(event.pointerId);
        event.currentTarget.focus({ preventScroll: true });
        held.current = true;
      },
      onPointerMove: (event) => {
        if (held.current) moveTo(timeAt(event.clientX));
      },
      onPointerUp: commit,
      onPointerCancel: giveUp,
      onKeyDown: (event) => {
        if (event.key === "Escape") return giveUp();
        const wanted = timeOfKey(event.key, event.shiftKey, unsaved.current ?? at, step);
        if (wanted === null) return;
        event.preventDefault();
        moveTo(wanted);
      },
      onKeyUp: () => {
        if (!held.current) commit();
      },
      onBlur: commit,
    },
  };
}
