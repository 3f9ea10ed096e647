import "server-only";
import { runInPool } from "@/app/_workers/pool";
import type { Sheet } from "@/db/sheet/sheet.schema";
import type { UploadedFile } from "@/db/upload/upload.queries";
import type { Corrections } from "./corrections";
import { type ImportPreview, previewOf } from "./preview";
import { readFile } from "./read-file";
import type { Reading } from "./reading";
import { studyContext } from "./study-context";

/** A received file read for its study: small ones at once, large ones in the pool. */

const READ_AT_ONCE_BYTES = 256 * 1024;

export async function readUpload(
  upload: UploadedFile,
  sheet: Sheet,
  corrections: Corrections,
): Promise<Reading> {
  const task = { bytes: await wholeFile(upload), context: studyContext(sheet), corrections };
  return upload.size <= READ_AT_ONCE_BYTES
    ? readFile(task.bytes, task.context, task.corrections)
    : runInPool("readUpload", task, [task.bytes.buffer]);
}

export async function previewUpload(
  upload: UploadedFile,
  sheet: Sheet,
  corrections: Corrections,
): Promise<ImportPreview> {
  const task = { bytes: await wholeFile(upload), context: studyContext(sheet), corrections };
  return upload.size <= READ_AT_ONCE_BYTES
    ? previewOf(await readFile(task.bytes, task.context, task.corrections))
    : runInPool("previewUpload", task, [task.bytes.buffer]);
}

async function wholeFile(upload: UploadedFile): Promise<Uint8Array<ArrayBuffer>> {
  const bytes = new Uint8Array(upload.size);
  let filled = 0;
  for await (const part of upload.bytes()) {
    bytes.set(part, filled);
    filled += part.byteLength;
  }
  if (filled !== upload.size)
    throw new Error(`File ${upload.uploadId} has ${filled} of ${upload.size} bytes.`);
  return bytes;
}
