import { spawn } from "node:child_process";
import { randomBytes } from "node:crypto";
import { mkdtempSync, rmSync } from "node:fs";
import { createServer } from "node:net";
import { tmpdir } from "node:os";
import path from "node:path";
import { buildIfChanged } from "../app/_server/build";
import { type BrowserRun, environmentOf } from "./browser-run";
import { findChromium } from "./chromium";

/**
 * `pnpm test:browser`: the tests against a production server of their own, in a real Chromium. Parameters go to
 * Playwright: `pnpm test:browser tests/access`, `pnpm test:browser -g "sign in"`.
 */
const repository = path.resolve(import.meta.dirname, "..");

async function browserTests(parameters: string[]): Promise<number> {
  // The tests read from the build which actions there are.
  buildIfChanged(repository);
  const folder = mkdtempSync(path.join(tmpdir(), "ratewright-browser-"));
  try {
    const port = await freePort();
    const { executable, libraries } = await findChromium();
    const run: BrowserRun = {
      port,
      origin: `http://localhost:${port}`,
      databaseFile: path.join(folder, "browser.sqlite"),
      demoPassword: randomBytes(12).toString("base64url"),
      report: process.env.BROWSER_TEST_REPORT ?? path.join(folder, "report.json"),
      chromium: executable,
      libraries,
    };
    return await playwright(parameters, environmentOf(run));
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

function playwright(parameters: string[], environment: Record<string, string>): Promise<number> {
  const tests = spawn(
    process.execPath,
    ["node_modules/@playwright/test/cli.js", "test", "--config", "tests/playwright.config.ts", ...parameters],
    { cwd: repository, stdio: "inherit", env: { ...process.env, ...environment } },
  );
  for (const signal of ["SIGINT", "SIGTERM"] as const) {
    process.on(signal, () => tests.kill(signal));
  }
  return new Promise((resolve) => tests.once("exit", (code) => resolve(code ?? 1)));
}

/** A port that nobody listens on now; taken again by our server a moment later. */
function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once("error", reject);
    probe.listen(0, "127.0.0.1", () => {
      const address = probe.address();
      probe.close(() =>
        typeof address === "object" && address !== null
          ? resolve(address.port)
          : reject(new Error("The system gave no port.")),
      );
    });
  });
}

process.exit(await browserTests(process.argv.slice(2)));
