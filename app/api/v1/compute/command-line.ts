import { readFileSync } from "node:fs";
import { COMPUTATION_NAMES, computeByName } from "./registry";

/**
 * `pnpm --silent compute <name> < request.json > response.json`: the compute API without a server, for people who
 * keep their data in folders. Bad input goes to standard error with exit status 2.
 */
const name = process.argv[2];
const STANDARD_INPUT = 0;

function refuse(lines: readonly string[]): never {
  process.stderr.write(`${lines.join("\n")}\n`);
  process.exit(2);
}

if (name === undefined || !COMPUTATION_NAMES.includes(name)) {
  refuse([`Usage: pnpm --silent compute <${COMPUTATION_NAMES.join("|")}> < request.json > response.json`]);
}

let body: unknown;
try {
  body = JSON.parse(readFileSync(STANDARD_INPUT, "utf8"));
} catch (error) {
  refuse([`The request is not JSON: ${error instanceof Error ? error.message : String(error)}`]);
}

const computed = computeByName(name, body);
if (computed === undefined) refuse([`No computation is called ${name}.`]);
if (!computed.ok)
  refuse(computed.errors.map((one) => `${one.path === "" ? "request" : one.path}: ${one.message}`));
process.stdout.write(`${JSON.stringify(computed.answer, null, 2)}\n`);
