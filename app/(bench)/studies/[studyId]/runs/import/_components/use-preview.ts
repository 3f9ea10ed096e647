"use client";

import { useCallback, useEffect, useRef, useState } from "react";
import { applyChange, type Change } from "@/app/_import/change";
import type { Corrections } from "@/app/_import/corrections";
import { type PreviewAnswer, refusalOf } from "../import-session";

export type PreviewState =
  | { readonly status: "none" }
  | { readonly status: "reading"; readonly earlier: PreviewAnswer | null }
  | { readonly status: "shown"; readonly answer: PreviewAnswer }
  | { readonly status: "failed"; readonly message: string; readonly earlier: PreviewAnswer | null };

/** The preview of a waiting file: read on the server, and again after every correction, the latest one winning. */
export function usePreview(studyId: string, uploadId: string | null) {
  const [state, setState] = useState<PreviewState>({ status: "none" });
  const [corrections, setCorrections] = useState<Corrections>({});
  const running = useRef<AbortController | null>(null);

  useEffect(() => {
    if (uploadId === null) {
      setState({ status: "none" });
      return;
    }
    const controller = new AbortController();
    running.current?.abort();
    running.current = controller;
    setState((before) => ({ status: "reading", earlier: earlierOf(before, uploadId) }));
    void read(studyId, uploadId, corrections, controller.signal).then((answer) => {
      if (controller.signal.aborted) return;
      setState((before) =>
        "message" in answer
          ? { status: "failed", message: answer.message, earlier: earlierOf(before, uploadId) }
          : { status: "shown", answer },
      );
    });
    return () => controller.abort();
  }, [studyId, uploadId, corrections]);

  const change = useCallback((made: Change) => setCorrections((before) => applyChange(before, made)), []);
  const readAs = useCallback(
    (layout: Corrections) => setCorrections((before) => ({ ...before, ...layout })),
    [],
  );
  const forget = useCallback(() => setCorrections({}), []);
  return { state, corrections, change, readAs, forget };
}

function earlierOf(state: PreviewState, uploadId: string): PreviewAnswer | null {
  const answer = state.status === "shown" ? state.answer : "earlier" in state ? state.earlier : null;
  return answer?.file.uploadId === uploadId ? answer : null;
}

async function read(
  studyId: string,
  uploadId: string,
  corrections: Corrections,
  signal: AbortSignal,
): Promise<PreviewAnswer | { readonly message: string }> {
  try {
    const response = await fetch(`/api/v1/studies/${studyId}/uploads/${uploadId}/preview`, {
      method: "POST",
      headers: { "Content-Type": "application/json" },
      body: JSON.stringify(corrections),
      signal,
    });
    if (response.ok) return await response.json();
    if (response.status === 404) {
      return { message: "The file is no longer here: it was dropped, or its runs are stored already." };
    }
    return { message: refusalOf(await response.text(), response.status) };
  } catch {
    return { message: "The server could not be reached. The file is kept; try again." };
  }
}
