import { parseArgs } from "node:util";
import { benchmarkStudy } from "./benchmark-study";
import { measureBootstrap } from "./measure-bootstrap";
import { measureExpression } from "./measure-expression";
import { measureGrowth } from "./measure-growth";
import { measureMemory } from "./measure-memory";
import { measureRatios } from "./measure-ratios";
import { peerVersions } from "./peer";
import { type Benchmark, failuresOf, jsonOf, tableOf } from "./report";

/**
 * `pnpm bench [--json]`: speed of the global fit against three implementations in SciPy and NumPy, measured in the same
 * run, against a bare loop, and in its growth; a user's expression, a bootstrap, memory. Figures on standard output,
 * progress on standard error; exit status 1 where a peer is not at the same answer.
 */
const { values } = parseArgs({ options: { json: { type: "boolean", default: false } } });
const progress = (message: string) => process.stderr.write(`${message}\n`);

const peers = peerVersions();
if (peers.absent !== null) progress(peers.absent);
const study = benchmarkStudy(12, 1000, 1);
const benchmark: Benchmark = {
  ratios: await measureRatios(study, peers.versions !== null, progress),
  expression: measureExpression(study, progress),
  growth: measureGrowth(progress),
  bootstrap: measureBootstrap(study, progress),
  memory: [measureMemory(12, 1000), measureMemory(12, 10_000)],
  versions: { node: process.version, ...(peers.versions ?? { python: null, numpy: null, scipy: null }) },
  absent: peers.absent,
};
const failures = failuresOf(benchmark);
process.stdout.write(values.json ? `${JSON.stringify(jsonOf(benchmark))}\n` : `${tableOf(benchmark)}\n`);
for (const failure of failures) progress(failure);
if (failures.length > 0) process.exitCode = 1;
