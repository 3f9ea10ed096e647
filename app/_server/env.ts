import path from "node:path";
import { z } from "zod";
import { databaseFile } from "@/db/database-file";

/**
 * Everything that may be set from outside, read in one place. `.env.example` describes the same names. Not marked
 * server-only because the start script, which runs outside Next, reads it too; it holds no secret.
 */
const settings = z.object({
  /** Where members reach the server; sets the accepted Origin and every link. Unset: this machine only. */
  PUBLIC_URL: z
    .url({
      protocol: /^https?$/,
      error: "PUBLIC_URL must be an address such as https://kinetics.example.org",
    })
    .optional(),
  PORT: z.coerce.number().int().min(1).max(65_535).default(3000),
  /** Seals session cookies; kept in a file beside the database where it is not given. */
  AUTH_SECRET: z.string().min(32, "AUTH_SECRET must have at least 32 characters").optional(),
  /** Of the demo accounts, if they are made at this start. */
  DEMO_PASSWORD: z.string().min(12, "DEMO_PASSWORD must have at least 12 characters").optional(),
});

const LOOPBACK_NAMES = new Set(["localhost", "127.0.0.1", "[::1]"]);

export interface Environment {
  /** Origin of PUBLIC_URL, or null while the server answers to this machine only. */
  readonly publicOrigin: string | null;
  /** Nobody but this machine is meant to reach the server, so that the demo's accounts may exist. */
  readonly isLoopback: boolean;
  /** What the server listens on: this machine alone, unless PUBLIC_URL names another. */
  readonly host: "127.0.0.1" | "0.0.0.0";
  readonly port: number;
  /** Absolute path of the SQLite file; uploads and the session secret live beside it. */
  readonly databaseFile: string;
  readonly authSecret: string | null;
  readonly demoPassword: string | undefined;
}

/** @throws where a variable is set to something that cannot be meant; the message names it. */
export function readEnvironment(variables: Record<string, string | undefined>): Environment {
  const given = Object.fromEntries(Object.entries(variables).filter(([, value]) => value !== ""));
  const parsed = settings.safeParse(given);
  if (!parsed.success) {
    const sentences = parsed.error.issues.map((issue) => `${issue.path.join(".")}: ${issue.message}`);
    throw new Error(`The environment cannot be used. ${sentences.join("; ")}`);
  }
  const { PUBLIC_URL, PORT, AUTH_SECRET, DEMO_PASSWORD } = parsed.data;
  const publicUrl = PUBLIC_URL === undefined ? null : new URL(PUBLIC_URL);
  const isLoopback = publicUrl === null || LOOPBACK_NAMES.has(publicUrl.hostname);
  return {
    publicOrigin: publicUrl?.origin ?? null,
    isLoopback,
    host: isLoopback ? "127.0.0.1" : "0.0.0.0",
    port: PORT,
    databaseFile: path.resolve(/* turbopackIgnore: true */ databaseFile()),
    authSecret: AUTH_SECRET ?? null,
    demoPassword: DEMO_PASSWORD,
  };
}

export const env: Environment = readEnvironment(process.env);
