import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { z } from "zod";
import { buildIfChanged } from "../app/_server/build";

/**
 * `pnpm test`: everything. Library, database and page logic under Vitest, then a production build, then the browser
 * and access tests against it. Ends with one line that counts them all; the exit status is 0 only if none failed.
 */
const repository = path.resolve(import.meta.dirname, "..");
const folder = mkdtempSync(path.join(tmpdir(), "ratewright-tests-"));

interface Count {
  readonly kind: string;
  readonly passed: number;
  readonly failed: number;
}

const vitestReport = z.object({
  numPassedTests: z.number(),
  numFailedTests: z.number(),
  success: z.boolean(),
});
const playwrightReport = z.object({
  stats: z.object({ expected: z.number(), unexpected: z.number(), flaky: z.number() }),
  errors: z.array(z.unknown()),
});

function unitAndIntegration(): Count {
  const report = path.join(folder, "vitest.json");
  const status = runNode(
    "node_modules/vitest/vitest.mjs",
    [
      "run",
      "--config",
      "tests/vitest.config.ts",
      "--reporter=default",
      "--reporter=json",
      `--outputFile=${report}`,
    ],
    {},
  );
  return counted("unit and integration", status, report, (json) => {
    const { numPassedTests, numFailedTests, success } = vitestReport.parse(json);
    // A file that cannot even be loaded has no failed test of its own.
    return { passed: numPassedTests, failed: numFailedTests === 0 && !success ? 1 : numFailedTests };
  });
}

function build(): Count {
  try {
    buildIfChanged(repository);
    return { kind: "build", passed: 1, failed: 0 };
  } catch (error) {
    console.error(error instanceof Error ? error.message : error);
    return { kind: "build", passed: 0, failed: 1 };
  }
}

function browserAndAccess(): Count {
  const report = path.join(folder, "playwright.json");
  const status = runNode("node_modules/tsx/dist/cli.mjs", ["tests/browser.ts"], {
    BROWSER_TEST_REPORT: report,
  });
  return counted("browser and access", status, report, (json) => {
    const { stats, errors } = playwrightReport.parse(json);
    return { passed: stats.expected, failed: stats.unexpected + stats.flaky + errors.length };
  });
}

/** What a runner reported. One that wrote no report, or failed without a failed test, counts as one failure. */
function counted(
  kind: string,
  status: number,
  report: string,
  read: (json: unknown) => { passed: number; failed: number },
): Count {
  try {
    const { passed, failed } = read(JSON.parse(readFileSync(report, "utf8")));
    return { kind, passed, failed: failed === 0 && status !== 0 ? 1 : failed };
  } catch (error) {
    console.error(`The ${kind} tests left no report that can be read.`, error);
    return { kind, passed: 0, failed: 1 };
  }
}

function runNode(script: string, parameters: string[], environment: Record<string, string>): number {
  const ended = spawnSync(process.execPath, [script, ...parameters], {
    cwd: repository,
    stdio: "inherit",
    env: { ...process.env, ...environment },
  });
  return ended.status ?? 1;
}

const unit = unitAndIntegration();
const built = build();
const counts = built.failed === 0 ? [unit, built, browserAndAccess()] : [unit, built];
rmSync(folder, { recursive: true, force: true });

const passed = counts.reduce((sum, count) => sum + count.passed, 0);
const failed = counts.reduce((sum, count) => sum + count.failed, 0);
const kinds = counts.map((count) => `${count.kind} ${count.passed} of ${count.passed + count.failed}`);
console.log(`\nTests: ${passed} passed, ${failed} failed (${kinds.join("; ")})`);
process.exit(failed === 0 ? 0 : 1);
