import { spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import { existsSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import path from "node:path";

/** What a build is made of. Tests and documents are not: changing them needs no new build. */
const SOURCES = [
  "app",
  "db",
  "migrations",
  "packages",
  "public",
  "instrumentation.ts",
  "instrumentation-node.ts",
  "next.config.mjs",
  "package.json",
  "pnpm-lock.yaml",
  "postcss.config.mjs",
  "proxy.ts",
  "tailwind.config.ts",
  "tsconfig.json",
];
const IGNORED = new Set(["node_modules", "dist", "bench"]);
const TEST_FILE = /\.test\.tsx?$/;

/**
 * Makes the production build unless the one in `.next` was made of exactly these sources by this Node.
 *
 * @throws where a step of the build fails; its own output stands above.
 */
export function buildIfChanged(repository: string): void {
  const stamp = path.join(repository, ".next/sources.sha256");
  const hash = hashOfSources(repository);
  const workers = path.join(repository, "dist");
  if (existsSync(stamp) && existsSync(workers) && readFileSync(stamp, "utf8") === hash) {
    return;
  }
  console.log("Building, which takes about half a minute.");
  runNode(repository, ["app/_workers/build.mjs"]);
  runNode(repository, ["node_modules/next/dist/bin/next", "build"]);
  writeFileSync(stamp, hash);
}

/** SHA-256 over the names and contents of all sources and the version of Node. */
export function hashOfSources(repository: string): string {
  const hash = createHash("sha256").update(process.version);
  for (const source of SOURCES) {
    for (const file of filesUnder(repository, source)) {
      const content = readFileSync(path.join(repository, file));
      hash.update(`${file}\0${content.byteLength}\0`).update(content);
    }
  }
  return hash.digest("hex");
}

/** Paths below the repository in a stable order. */
function filesUnder(repository: string, entry: string): string[] {
  const absolute = path.join(repository, entry);
  if (!existsSync(absolute)) {
    return [];
  }
  const children = readChildren(absolute);
  if (children === null) {
    return TEST_FILE.test(entry) ? [] : [entry];
  }
  return children
    .filter((name) => !IGNORED.has(name))
    .flatMap((name) => filesUnder(repository, path.join(entry, name)));
}

function readChildren(absolute: string): string[] | null {
  try {
    return readdirSync(absolute).sort();
  } catch (error) {
    if (error instanceof Error && "code" in error && error.code === "ENOTDIR") {
      return null;
    }
    throw error;
  }
}

function runNode(repository: string, parameters: string[]): void {
  const ended = spawnSync(process.execPath, parameters, { cwd: repository, stdio: "inherit" });
  if (ended.status !== 0) {
    throw new Error(`${parameters.join(" ")} ended with ${ended.status ?? ended.signal}.`);
  }
}
