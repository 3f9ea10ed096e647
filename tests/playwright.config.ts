import path from "node:path";
import { defineConfig } from "@playwright/test";
import { browserRun } from "./browser-run";
import { CHROMIUM_ARGUMENTS } from "./chromium";

const repository = path.resolve(import.meta.dirname, "..");
const run = browserRun();

export default defineConfig({
  testDir: repository,
  testMatch: ["tests/e2e/**/*.spec.ts", "tests/access/**/*.spec.ts"],
  outputDir: path.join(repository, "test-results"),
  // One server and one database stand behind all tests, and the machine may have two cores.
  workers: 1,
  fullyParallel: false,
  forbidOnly: true,
  timeout: 60_000,
  expect: { timeout: 10_000 },
  reporter: [["list"], ["json", { outputFile: run.report }]],
  use: {
    baseURL: run.origin,
    screenshot: "only-on-failure",
    trace: "retain-on-failure",
    launchOptions: {
      executablePath: run.chromium,
      args: CHROMIUM_ARGUMENTS,
      ...(run.libraries === null ? {} : { env: { ...definedEnvironment(), LD_LIBRARY_PATH: run.libraries } }),
    },
  },
  webServer: {
    // The same script that `pnpm start` runs: production build, migrations, demo, server.
    command: "node node_modules/tsx/dist/cli.mjs app/_server/serve.ts",
    cwd: repository,
    url: `${run.origin}/api/health`,
    timeout: 300_000,
    stdout: "pipe",
    gracefulShutdown: { signal: "SIGTERM", timeout: 10_000 },
    env: {
      PORT: String(run.port),
      DATABASE_FILE: run.databaseFile,
      DEMO_PASSWORD: run.demoPassword,
      PUBLIC_URL: "",
      AUTH_SECRET: "",
    },
  },
});

function definedEnvironment(): Record<string, string> {
  return Object.fromEntries(
    Object.entries(process.env).filter((entry): entry is [string, string] => entry[1] !== undefined),
  );
}
