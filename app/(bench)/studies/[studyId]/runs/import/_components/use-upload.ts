"use client";

import { useCallback, useRef, useState } from "react";
import { type Answer, LARGEST_FILE_BYTES, refusalOf, type WaitingFile } from "../import-session";

export interface Sending {
  readonly fileName: string;
  readonly sentBytes: number;
  readonly totalBytes: number;
}

/** Sends a file once, with progress and a way to stop. The request is the file itself, byte for byte. */
export function useUpload(studyId: string) {
  const [sending, setSending] = useState<Sending | null>(null);
  const request = useRef<XMLHttpRequest | null>(null);

  const send = useCallback(
    (content: Blob, fileName: string) =>
      new Promise<Answer<WaitingFile> | null>((resolve) => {
        if (content.size > LARGEST_FILE_BYTES) {
          const megabytes = Math.ceil(content.size / 1024 ** 2);
          resolve({
            ok: false,
            message: `“${fileName}” has ${megabytes}\u202fMB; at most 50\u202fMB can be read. Split it, or leave out readings that are not needed.`,
          });
          return;
        }
        const call = new XMLHttpRequest();
        request.current = call;
        setSending({ fileName, sentBytes: 0, totalBytes: content.size });
        call.upload.addEventListener("progress", (event) =>
          setSending({ fileName, sentBytes: event.loaded, totalBytes: content.size }),
        );
        const settle = (answer: Answer<WaitingFile> | null) => {
          request.current = null;
          setSending(null);
          resolve(answer);
        };
        call.addEventListener("load", () =>
          settle(
            call.status === 201
              ? { ok: true, value: JSON.parse(call.responseText) }
              : { ok: false, message: refusalOf(call.responseText, call.status) },
          ),
        );
        call.addEventListener("error", () =>
          settle({
            ok: false,
            message: "The connection broke before the file had arrived. Nothing was kept; send it again.",
          }),
        );
        call.addEventListener("abort", () => settle(null));
        call.open("POST", `/api/v1/studies/${studyId}/uploads?fileName=${encodeURIComponent(fileName)}`);
        call.setRequestHeader("Content-Type", "application/octet-stream");
        call.send(content);
      }),
    [studyId],
  );

  const stop = useCallback(() => request.current?.abort(), []);
  return { sending, send, stop };
}
