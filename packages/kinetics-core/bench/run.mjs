import path from "node:path";
import { pathToFileURL } from "node:url";
import { build } from "esbuild";

/**
 * Bundles the benchmark as the server's pool is bundled and runs that: what is measured is the code as it ships. A loader
 * that compiles while it runs gives every inner function its name anew at each call, which costs a tenth of a fit.
 */
const folder = import.meta.dirname;
const repository = path.resolve(folder, "../../..");
const bundle = path.join(repository, "dist/bench.mjs");

await build({
  absWorkingDir: repository,
  entryPoints: [path.join(folder, "index.ts")],
  outfile: bundle,
  bundle: true,
  platform: "node",
  target: "node20",
  format: "esm",
  // The scripts of the peers lie beside the sources.
  define: { "import.meta.url": JSON.stringify(pathToFileURL(path.join(folder, "index.ts")).href) },
  logLevel: "warning",
});
await import(pathToFileURL(bundle).href);
