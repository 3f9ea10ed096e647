/**
 * What one run of the browser tests works with. `tests/browser.ts` decides it once and hands it on by environment,
 * since Playwright reads its configuration anew in every process.
 */
export interface BrowserRun {
  readonly port: number;
  readonly origin: string;
  readonly databaseFile: string;
  readonly demoPassword: string;
  /** Where Playwright writes its JSON report. */
  readonly report: string;
  readonly chromium: string;
  readonly libraries: string | null;
}

const VARIABLE = "RATEWRIGHT_BROWSER_RUN";

export function environmentOf(run: BrowserRun): Record<string, string> {
  return { [VARIABLE]: JSON.stringify(run) };
}

/** @throws outside such a run. */
export function browserRun(): BrowserRun {
  const text = process.env[VARIABLE];
  if (text === undefined) {
    throw new Error(
      "Start the browser tests with `pnpm test:browser`, which finds a browser and a free port.",
    );
  }
  return JSON.parse(text);
}
