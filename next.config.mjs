import { createHash } from "node:crypto";
import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";

process.env.NEXT_TELEMETRY_DISABLED ??= "1";

const repository = import.meta.dirname ?? path.dirname(new URL(import.meta.url).pathname);

/** Names the numerics of this build: kept results of another build are never taken for its own. */
function coreHash() {
  const source = path.join(repository, "packages/kinetics-core/src");
  const files = readdirSync(source, { recursive: true, encoding: "utf8" })
    .filter((file) => file.endsWith(".ts") && !file.endsWith(".test.ts"))
    .sort();
  const hash = createHash("sha256");
  for (const file of files) hash.update(file).update(readFileSync(path.join(source, file)));
  return hash.digest("hex");
}

/** @type {import("next").NextConfig} */
const config = {
  transpilePackages: ["kinetics-core"],
  // Both load files at run time (an addon, worker scripts) that a bundler cannot follow.
  serverExternalPackages: ["better-sqlite3", "piscina", "@node-rs/argon2"],
  turbopack: { root: repository },
  outputFileTracingRoot: repository,
  poweredByHeader: false,
  reactStrictMode: true,
  // Browsers ask for this name wherever no page has told them another: while a page is exchanged, beside a table.
  rewrites: async () => [{ source: "/favicon.ico", destination: "/icon.svg" }],
  env: { KINETICS_CORE_HASH: coreHash() },
};

export default config;
