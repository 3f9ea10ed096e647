import type { Corrections } from "@/app/_import/corrections";
import type { ImportPreview } from "@/app/_import/preview";

/** What the routes of uploads answer, as the page holds it. */

export interface WaitingFile {
  readonly uploadId: string;
  readonly fileName: string;
  readonly size: number;
  readonly sha256: string;
  /** Labels of the runs that were read from the same bytes before. */
  readonly storedAs: readonly string[];
}

export interface PreviewAnswer {
  readonly file: WaitingFile;
  readonly revision: number;
  readonly reading: ImportPreview;
  /** How the group read files of the same heading before; null where it says nothing new. */
  readonly remembered: RememberedReading | null;
}

export interface RememberedReading {
  readonly corrections: Corrections;
  readonly fileName: string;
  readonly at: string;
}

export type Answer<Value> =
  | { readonly ok: true; readonly value: Value }
  | { readonly ok: false; readonly message: string };

/** The sentence of a refusal (problem details), or one of our own where there is none. */
export function refusalOf(text: string, status: number): string {
  try {
    const body: unknown = JSON.parse(text);
    if (typeof body === "object" && body !== null && "detail" in body && typeof body.detail === "string") {
      return body.detail;
    }
  } catch {
    // Not our answer: a proxy on the way, or a server that just went away.
  }
  return `The server answered ${status} without saying why. Try again.`;
}

export const LARGEST_FILE_BYTES = 50 * 1024 * 1024;
