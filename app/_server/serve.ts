import { type ChildProcess, spawn } from "node:child_process";
import path from "node:path";
import { setTimeout as pause } from "node:timers/promises";
import { demoInWords, type Prepared, prepareDatabase } from "@/db/prepare";
import { buildIfChanged } from "./build";
import { env } from "./env";

/**
 * `pnpm start`: builds where the sources changed, brings the database up to date, fills it with the demo study on
 * the first start, and serves until it is told to stop.
 */
const repository = path.resolve(import.meta.dirname, "../..");
const ADDRESS = env.publicOrigin ?? `http://localhost:${env.port}`;
const FIRST_GROUP = 'A first group is made by: pnpm seed --group "Name of the group" --lead name@example.org';
const READY_WITHIN_MS = 60_000;

async function serve(): Promise<number> {
  buildIfChanged(repository);
  const prepared = await prepareDatabase(env.databaseFile, {
    demo: env.isLoopback,
    demoPassword: env.demoPassword,
  });
  if (prepared.demo !== null && !env.isLoopback) {
    throw new Error(
      `${env.databaseFile} holds the demo group, whose accounts are for one machine only. With PUBLIC_URL set, name another file in DATABASE_FILE.`,
    );
  }
  const server = spawn(
    process.execPath,
    ["node_modules/next/dist/bin/next", "start", "--hostname", env.host, "--port", String(env.port)],
    {
      cwd: repository,
      stdio: ["ignore", "inherit", "inherit"],
      env: {
        ...process.env,
        NODE_ENV: "production",
        PORT: String(env.port),
        DATABASE_FILE: env.databaseFile,
      },
    },
  );
  const ended = new Promise<number>((resolve) => {
    server.once("exit", (code, signal) =>
      resolve(code ?? (signal === "SIGTERM" || signal === "SIGINT" ? 0 : 1)),
    );
  });
  forwardSignals(server);
  const ready = await Promise.race([
    answers(`http://127.0.0.1:${env.port}/api/health`),
    ended.then(() => false),
  ]);
  if (ready) {
    console.log(greeting(prepared));
  }
  return ended;
}

function greeting(prepared: Prepared): string {
  return [
    "",
    `Ratewright answers at ${ADDRESS}`,
    prepared.demo === null ? FIRST_GROUP : demoInWords(prepared),
    `Database:     ${env.databaseFile}`,
    "Stop with Ctrl+C.",
    "",
  ].join("\n");
}

function forwardSignals(server: ChildProcess): void {
  for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"] as const) {
    process.on(signal, () => server.kill(signal));
  }
}

async function answers(address: string): Promise<boolean> {
  const until = Date.now() + READY_WITHIN_MS;
  while (Date.now() < until) {
    const ok = await fetch(address).then(
      (response) => response.ok,
      // Nobody listens yet.
      () => false,
    );
    if (ok) {
      return true;
    }
    await pause(200);
  }
  return false;
}

serve().then(
  (code) => process.exit(code),
  (error: unknown) => {
    console.error(error instanceof Error ? error.message : error);
    process.exit(1);
  },
);
