"use client";

import { Toast as Radix } from "radix-ui";
import { createContext, type ReactNode, useCallback, useContext, useMemo, useState } from "react";
import { SeverityShape } from "./check";
import { typeset } from "./prose";

export interface ToastMessage {
  /** Prose: the act, then its effect on k. "R07 set aside. *k* moves from 11 ± 2 to 11.8 ± 0.3." */
  readonly text: string;
  /** Takes the act back; the toast closes once it has resolved. */
  readonly undo?: (() => Promise<void> | void) | undefined;
  readonly severity?: "holds" | "blocks";
  /** A later message on the same topic takes the place of this one, so that a row of changes leaves one toast. */
  readonly topic?: string;
}

const ToastContext = createContext<((message: ToastMessage) => void) | null>(null);

/** Says what an act did. Only under a ToastRegion. */
export function useToast(): (message: ToastMessage) => void {
  const show = useContext(ToastContext);
  if (show === null) throw new Error("useToast needs a ToastRegion above it");
  return show;
}

const KEPT = 3;

/** Holds the toasts of the pages under it. They stay until dismissed; of more than three the oldest goes. */
export function ToastRegion({ children }: { children: ReactNode }) {
  const [toasts, setToasts] = useState<readonly (ToastMessage & { readonly number: number })[]>([]);
  const show = useCallback((message: ToastMessage) => {
    setToasts((earlier) => [
      ...earlier
        .filter((toast) => toast.topic === undefined || toast.topic !== message.topic)
        .slice(1 - KEPT),
      { ...message, number: (earlier.at(-1)?.number ?? 0) + 1 },
    ]);
  }, []);
  const dismiss = useCallback((number: number) => {
    setToasts((earlier) => earlier.filter((toast) => toast.number !== number));
  }, []);
  const list = useMemo(
    () =>
      toasts.map((toast) => (
        <OneToast key={toast.number} toast={toast} dismiss={() => dismiss(toast.number)} />
      )),
    [toasts, dismiss],
  );
  return (
    <ToastContext value={show}>
      <Radix.Provider duration={Number.POSITIVE_INFINITY} swipeDirection="left" label="Message">
        {children}
        {list}
        <Radix.Viewport className="toast-list" label="Messages ({hotkey})" />
      </Radix.Provider>
    </ToastContext>
  );
}

function OneToast({ toast, dismiss }: { toast: ToastMessage; dismiss: () => void }) {
  const [undoing, setUndoing] = useState(false);
  async function undo(act: () => Promise<void> | void) {
    setUndoing(true);
    try {
      await act();
      dismiss();
    } finally {
      setUndoing(false);
    }
  }
  const { undo: act } = toast;
  return (
    <Radix.Root className="toast" onOpenChange={(open) => !open && dismiss()}>
      <SeverityShape severity={toast.severity ?? "holds"} />
      <Radix.Title asChild>
        <span>{typeset(toast.text)}</span>
      </Radix.Title>
      {act !== undefined && (
        <button type="button" disabled={undoing} onClick={() => void undo(act)}>
          {undoing ? "Undoing" : "Undo"}
        </button>
      )}
      <Radix.Close>Dismiss</Radix.Close>
    </Radix.Root>
  );
}
