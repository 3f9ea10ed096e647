import path from "node:path";

process.env.NEXT_TELEMETRY_DISABLED ??= "1";

const repository = import.meta.dirname ?? path.dirname(new URL(import.meta.url).pathname);

/** @type {import("next").NextConfig} */
const config = {
  transpilePackages: ["kinetics-core"],
  // Both load files at run time (an addon, worker scripts) that a bundler cannot follow.
  serverExternalPackages: ["better-sqlite3", "piscina", "@node-rs/argon2"],
  turbopack: { root: repository },
  outputFileTracingRoot: repository,
  poweredByHeader: false,
  reactStrictMode: true,
};

export default config;
