"use client";

import { type KeyboardEvent, type PointerEvent, useRef, useState } from "react";
import type { WindowChoice, WindowFigureView } from "./figure-view";
import {
  choiceBetween,
  type Grip,
  gripLimits,
  moveGrip,
  nearestReading,
  readingAfterKey,
} from "./window-choice";

/** What a grip listens to. */
export interface GripHandlers {
  readonly onPointerDown: (event: PointerEvent<SVGGElement>) => void;
  readonly onPointerMove: (event: PointerEvent<SVGGElement>) => void;
  readonly onPointerUp: () => void;
  readonly onPointerCancel: () => void;
  readonly onKeyDown: (event: KeyboardEvent<SVGGElement>) => void;
  readonly onKeyUp: () => void;
  readonly onBlur: () => void;
}

/**
 * The window as it stands while a hand is on it. A step is previewed at once; the release is committed, once. The
 * moved window stays until the page brings another one, so that nothing jumps back while a save is on its way.
 */
export function useWindowChoice(
  view: WindowFigureView,
  timeAt: (clientX: number) => number,
  onPreview: ((choice: WindowChoice) => void) | undefined,
  onCommit: ((choice: WindowChoice) => void) | undefined,
): { choice: WindowChoice; handlers: (grip: Grip) => GripHandlers } {
  const saved = choiceBetween(
    view.time,
    nearestReading(view.time, view.window[0]),
    nearestReading(view.time, view.window[1]),
  );
  const basis = `${view.run.label} ${view.window[0]} ${view.window[1]}`;
  const [moved, setMoved] = useState<{ choice: WindowChoice; basis: string } | null>(null);
  const held = useRef<Grip | null>(null);
  const unsaved = useRef<WindowChoice | null>(null);
  const choice = moved !== null && moved.basis === basis ? moved.choice : saved;

  function moveTo(grip: Grip, index: number) {
    const next = moveGrip(view.time, unsaved.current ?? choice, grip, index, view.leastPoints);
    const before = unsaved.current ?? choice;
    if (next.fromIndex === before.fromIndex && next.toIndex === before.toIndex) return;
    unsaved.current = next;
    setMoved({ choice: next, basis });
    onPreview?.(next);
  }

  function commit() {
    held.current = null;
    if (unsaved.current === null) return;
    const chosen = unsaved.current;
    unsaved.current = null;
    onCommit?.(chosen);
  }

  function giveUp() {
    held.current = null;
    if (unsaved.current === null) return;
    unsaved.current = null;
    setMoved(null);
    onPreview?.(saved);
  }

  const handlers = (grip: Grip): GripHandlers => ({
    onPointerDown: (event) => {
      if (event.button !== 0) return;
      event.currentTarget.setPointerCapture(event.pointerId);
      event.currentTarget.focus({ preventScroll: true });
      held.current = grip;
    },
    onPointerMove: (event) => {
      if (held.current === grip) moveTo(grip, nearestReading(view.time, timeAt(event.clientX)));
    },
    onPointerUp: commit,
    onPointerCancel: giveUp,
    onKeyDown: (event) => {
      if (event.key === "Escape") return giveUp();
      const now = unsaved.current ?? choice;
      const limits = gripLimits(grip, now, view.time.length, view.leastPoints);
      const index = readingAfterKey(
        event.key,
        event.shiftKey,
        grip === "from" ? now.fromIndex : now.toIndex,
        limits,
      );
      if (index === null) return;
      event.preventDefault();
      moveTo(grip, index);
    },
    onKeyUp: () => {
      if (held.current === null) commit();
    },
    onBlur: commit,
  });
  return { choice, handlers };
}
