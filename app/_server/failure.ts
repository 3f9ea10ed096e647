import "server-only";
import { randomBytes } from "node:crypto";

/** What a caller may be told of an unexpected error: a sentence, never the error itself. */
export interface Failure {
  readonly status: 500 | 507;
  readonly message: string;
}

/**
 * Logs an unexpected error under a reference and says what the caller may know. A full disk is named, since the
 * person who reads it may be the one who can make room.
 */
export function reportFailure(error: unknown, where: string): Failure {
  const reference = randomBytes(4).toString("hex");
  console.error(`[${reference}] ${where}`, error);
  if (isDiskFull(error)) {
    return {
      status: 507,
      message: `The server's disk is full, so nothing was stored. What is there can still be read. Reference ${reference}.`,
    };
  }
  return {
    status: 500,
    message: `The server could not finish this, and nothing was changed. Try again; if it happens again, give your administrator the reference ${reference}.`,
  };
}

function isDiskFull(error: unknown): boolean {
  if (!(error instanceof Error) || !("code" in error)) {
    return false;
  }
  return error.code === "SQLITE_FULL" || error.code === "ENOSPC";
}
