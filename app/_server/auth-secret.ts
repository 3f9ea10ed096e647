import "server-only";
import { randomBytes } from "node:crypto";
import { mkdirSync, readFileSync, writeFileSync } from "node:fs";
import path from "node:path";
import { env } from "./env";

let kept: string | undefined;

/**
 * What session cookies are sealed with: AUTH_SECRET, else 32 random bytes made once and kept beside the database,
 * readable by the server's user only. Losing it signs everybody out and loses nothing else.
 */
export function authSecret(): string {
  kept ??= env.authSecret ?? readOrMake(path.join(path.dirname(env.databaseFile), "session-secret"));
  return kept;
}

function readOrMake(file: string): string {
  mkdirSync(path.dirname(file), { recursive: true, mode: 0o700 });
  try {
    // "wx" makes it only where it is missing, so that two starts at once agree on the first one's.
    writeFileSync(file, randomBytes(32).toString("base64url"), { mode: 0o600, flag: "wx" });
  } catch (error) {
    if (!(error instanceof Error && "code" in error && error.code === "EEXIST")) {
      throw error;
    }
  }
  const secret = readFileSync(file, "utf8").trim();
  if (secret.length < 32) {
    throw new Error(`${file} holds no usable session secret. Remove it; everybody then signs in again.`);
  }
  return secret;
}
