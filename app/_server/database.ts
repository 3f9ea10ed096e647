import "server-only";
import { connect } from "@/db/connect";
import type { Handle } from "@/db/database";
import { env } from "./env";

declare global {
  // Next evaluates a module once for each bundle that holds it; the file must still have one handle.
  var ratewrightDatabase: Handle | undefined;
}

/** The server's one database handle, opened at first use. */
export function database(): Handle {
  const opened = globalThis.ratewrightDatabase ?? connect(env.databaseFile);
  globalThis.ratewrightDatabase = opened;
  return opened;
}
