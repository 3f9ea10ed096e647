import path from "node:path";
import { build } from "esbuild";

/** Bundles the pool's worker to dist/, since worker threads load plain JavaScript from a file. */
const repository = path.resolve(import.meta.dirname, "../..");

await build({
  absWorkingDir: repository,
  entryPoints: { "pool-worker": "app/_workers/pool.worker.ts" },
  outdir: "dist",
  outExtension: { ".js": ".mjs" },
  bundle: true,
  platform: "node",
  target: "node20",
  format: "esm",
  alias: { "@": repository },
  // CommonJS packages ask for Node's own modules by require, which an ES module does not have. The
  // name is our own, since packages declare the usual one themselves.
  banner: {
    js: 'import { createRequire as makeRequire } from "node:module"; const require = makeRequire(import.meta.url);',
  },
  legalComments: "none",
  logLevel: "warning",
});
