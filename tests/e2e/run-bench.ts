import { randomBytes } from "node:crypto";
import type { Locator, Page } from "@playwright/test";
import { connect } from "@/db/connect";
import { addRuns } from "@/db/run/run.commands";
import { readStudy } from "@/db/study/study.queries";
import { makeGroup, TEST_PASSWORD, type TestGroup } from "@/db/testing/make-group";
import { exampleSetUp, makeStudy } from "@/db/testing/make-study";
import { browserRun } from "../browser-run";

/**
 * The run sheet and its grid on a study of rates that were entered by hand: v = k[A][C] with k = 2 L mol⁻¹ s⁻¹ and a
 * percent or so of scatter, and one run that is 40 % off.
 */
export interface Bench {
  readonly group: TestGroup;
  readonly domain: string;
  readonly studyId: string;
}

const runs: readonly (readonly [label: string, millimolarA: number, millimolarC: number, ratio: number])[] = [
  ["R01", 1, 10, 1.006],
  ["R02", 1, 20, 0.992],
  ["R03", 1, 40, 1.011],
  ["R04", 2, 10, 0.995],
  ["R05", 4, 10, 1.004],
  ["R06", 2, 20, 0.99],
  ["R07", 4, 40, 1.4],
];

export async function makeBench(): Promise<Bench> {
  const db = connect(browserRun().databaseFile);
  try {
    const domain = `runs-${randomBytes(4).toString("hex")}.example`;
    const group = await makeGroup(db, domain);
    const studyId = await makeStudy(db, group.lead, exampleSetUp("Rates typed by hand"));
    const added = await addRuns(
      db,
      group.lead,
      { studyId, base: 1 },
      runs.map(([label, a, c, ratio]) => ({
        id: `${domain}-${label}`,
        label,
        concentrations: {
          a: { molar: a / 1000, relativeUncertainty: 0 },
          c: { molar: c / 1000, relativeUncertainty: 0 },
        },
        enteredRate: { molarPerSecond: (2 * a * c * ratio) / 1e6, standardError: null },
      })),
    );
    if (added.status !== "changed") throw new Error(added.status);
    return { group, domain, studyId };
  } finally {
    await db.destroy();
  }
}

/** The same set-up without a run, so that the sheet opens on its grid. */
export async function makeEmptyBench(): Promise<Bench> {
  const db = connect(browserRun().databaseFile);
  try {
    const domain = `empty-${randomBytes(4).toString("hex")}.example`;
    const group = await makeGroup(db, domain);
    return { group, domain, studyId: await makeStudy(db, group.lead, exampleSetUp("Nothing measured yet")) };
  } finally {
    await db.destroy();
  }
}

export async function sheetOf({ group, studyId }: Bench) {
  const db = connect(browserRun().databaseFile);
  const study = await readStudy(db, group.lead, studyId);
  await db.destroy();
  if (study === undefined) throw new Error("the study is there");
  return study;
}

export async function signIn(page: Page, who: string, to: string) {
  await page.goto(`/sign-in?to=${encodeURIComponent(to)}`);
  await page.getByLabel("Email address").fill(who);
  await page.getByLabel("Password").fill(TEST_PASSWORD);
  await page.getByRole("button", { name: "Sign in" }).click();
  await page.waitForURL((url) => url.pathname === to.split("?")[0]);
}

export function standing(page: Page): Locator {
  return page.getByRole("region", { name: "Standing law" });
}

export function toast(page: Page, text: string): Locator {
  return page
    .getByRole("region", { name: /^Messages/ })
    .getByText(text)
    .first();
}

/** The cell of a run in a column, by what the column is called. */
export function cell(page: Page, run: string, column: RegExp): Locator {
  const grid = page.getByRole("grid");
  const row = grid.getByRole("row").filter({ has: page.getByRole("gridcell", { name: run }) });
  return row.locator(`[data-column="${column.source}"]`);
}

export const LABEL = /0/;
export const A = /1/;
export const C = /2/;
export const RATE = /5/;

export async function pasteText(page: Page, text: string) {
  await page.evaluate((block) => {
    const data = new DataTransfer();
    data.setData("text/plain", block);
    document.activeElement?.dispatchEvent(
      new ClipboardEvent("paste", { clipboardData: data, bubbles: true, cancelable: true }),
    );
  }, text);
}
