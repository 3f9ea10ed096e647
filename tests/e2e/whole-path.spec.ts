import { readFileSync } from "node:fs";
import { type Browser, expect, type Locator, type Page, test } from "@playwright/test";
import Papa from "papaparse";
import { connect } from "@/db/connect";
import { makeGroup } from "@/db/testing/make-group";
import { browserRun } from "../browser-run";
import { complaintsOf } from "./complaints";
import { NINE_RUNS_FILE, nineRuns, TRUTH } from "./nine-runs";
import { molarFactorInHead, numbersIn } from "./printed-numbers";
import { signIn } from "./signed-in";

/**
 * The whole way of a file, from the bench to a reader without an account, by hand. What the pages print is held
 * against what is true of the file.
 */

const DOMAIN = "whole-path.example";
const REACTION = "CH3CO2C6H4NO2 [A] + 2 OH- [B] -> CH3CO2- + NO2C6H4O- [P] + H2O";
const RUNS = nineRuns();

/** Four standard deviations of the scatter that the file was made with, and 4 % for reading a rate from 200 points. */
const RATE_TOLERANCE = 4 * TRUTH.scatter + 0.04;

const strip = (page: Page): Locator => page.getByRole("region", { name: "Standing law" });
const heading = (page: Page): Locator => page.getByRole("heading", { level: 1 });

async function station(page: Page, name: string): Promise<void> {
  await page.getByRole("navigation", { name: "Stations of this study" }).getByRole("link", { name }).click();
}

test("a file becomes a rate law that a collaborator opens", async ({ page, browser }) => {
  test.setTimeout(240_000);
  const db = connect(browserRun().databaseFile);
  await makeGroup(db, DOMAIN);
  await db.destroy();
  const complaints = complaintsOf(page);
  await page.setViewportSize({ width: 1440, height: 900 });

  await test.step("sign in", () => signIn(page, `lead@${DOMAIN}`));
  const studyAddress = await test.step("new study", () => makeStudy(page));
  await test.step("upload, look, store", () => importFile(page));
  await test.step("every run has its rate", () => expectRates(page));
  await test.step("orders, k, interval and unit", () => expectLaw(page));
  const law = await test.step("set aside and undo", () => setAsideAndUndo(page));
  const address = await test.step("make a link", () => makeLink(page));
  for (const width of [1440, 390]) {
    await test.step(`open it signed out at ${width} px`, () => openSignedOut(browser, address, width, law));
  }
  await test.step("revoke it", () => revoke(page, studyAddress));
  await test.step("it is dead", () => expectDead(browser, address));
  expect(complaints).toEqual([]);
});

async function makeStudy(page: Page): Promise<string> {
  await page.getByRole("link", { name: "New study" }).first().click();
  await page.getByLabel("Name", { exact: true }).fill("Nine runs by hand");
  await page.getByLabel(/^Reaction/).fill(REACTION);
  await expect(page.getByText("A, B stand in the law")).toBeVisible();
  await page.getByLabel("Followed species").selectOption({ label: "P, NO2C6H4O-" });
  await page.getByLabel(/^ε·l/).fill(`${TRUTH.perMolar} ± ${TRUTH.perMolarUncertainty}`);
  await expect(page.getByText("Read as 17900 with a standard uncertainty of 70.")).toBeVisible();
  await page.getByRole("button", { name: "Make the study" }).click();
  await expect(page).toHaveURL(/\/studies\/[^/]+\/runs/);
  return new URL(page.url()).pathname.replace(/\/runs.*/, "");
}

async function importFile(page: Page): Promise<void> {
  await page.getByRole("link", { name: "Add traces" }).click();
  const chooser = page.waitForEvent("filechooser");
  await page.getByRole("button", { name: "Choose a file" }).click();
  await (await chooser).setFiles(NINE_RUNS_FILE);
  await expect(heading(page)).toHaveText(/^Nine traces read/);
  await expect(page.getByText("200 each, 1800 in all")).toBeVisible();
  await expect(page.getByText("9, for R01 to R09")).toBeVisible();

  // The concentrations of the file stand in the grid before anything is stored.
  const grid = page.getByRole("grid", { name: "Labels and starting concentrations" });
  for (const run of RUNS) {
    const row = grid.getByRole("row").filter({ hasText: run.label });
    await expect(row).toHaveCount(1);
    const [a = 0, b = 0] = numbersIn(
      (await row.getByRole("gridcell").allTextContents()).filter((text) => /^[\d.]+$/.test(text)).join(" "),
    );
    expect(a, `[A] of ${run.label} in mmol/L`).toBeCloseTo(run.molarA * 1e3, 9);
    expect(b, `[B] of ${run.label} in mmol/L`).toBeCloseTo(run.molarB * 1e3, 9);
  }

  await page.getByRole("button", { name: "Store 9 traces" }).click();
  await expect(page).toHaveURL(/\/runs$/);
  await expect(page.getByRole("region", { name: "Runs of this study" }).getByRole("checkbox")).toHaveCount(9);
  const traces = page.getByRole("img", { name: "[P] against time for 9 runs" });
  await expect(traces.locator("polyline")).toHaveCount(9);
  await expect(strip(page)).toContainText("9 runs");
}

async function expectRates(page: Page): Promise<void> {
  await station(page, "Rates");
  await expect(heading(page)).toContainText("R01: initial rate");
  await expectRatesIn(page.getByRole("region", { name: "Initial rates of all runs" }), 1);
}

/** Each run's rate against the truth of the file, the scatter that it was made with allowed for. */
async function expectRatesIn(table: Locator, column: number): Promise<void> {
  const factor = molarFactorInHead(
    (await table.getByRole("columnheader", { name: /Initial rate/ }).textContent()) ?? "",
  );
  for (const run of RUNS) {
    const row = table.getByRole("row").filter({ hasText: run.label });
    const [rate = Number.NaN, uncertainty = Number.NaN] = numbersIn(
      (await row.locator("td").nth(column).textContent()) ?? "",
    );
    const relative = (rate * factor) / run.molarPerSecond - 1;
    expect(Math.abs(relative), `rate of ${run.label}, ${rate} × ${factor} mol/L/s`).toBeLessThan(
      RATE_TOLERANCE,
    );
    expect(uncertainty, `its uncertainty`).toBeGreaterThan(0);
    expect(uncertainty / rate, `its uncertainty`).toBeLessThan(0.1);
  }
}

async function expectLaw(page: Page): Promise<void> {
  await station(page, "Rate law");
  for (const symbol of ["A", "B"]) {
    const spoken = page.getByRole("img", { name: new RegExp(`^order in ${symbol}:`) });
    const [, interval = ""] = ((await spoken.getAttribute("aria-label")) ?? "").split("95 % interval");
    const [low = Number.NaN, high = Number.NaN] = numbersIn(interval);
    expect(low, `order in ${symbol}, from`).toBeLessThan(1);
    expect(high, `order in ${symbol}, to`).toBeGreaterThan(1);
    expect(high - low, `order in ${symbol}, width`).toBeLessThan(0.3);
  }
  await expectConstantTable(page);
  expectConstant(await constantIn(strip(page)));
}

/** The line of the table of constants that stands: k with its unit, value ± half width, and its interval. */
function standingRow(page: Page): Locator {
  return page
    .getByRole("region", { name: "Rate constants with their intervals" })
    .getByRole("row")
    .filter({ hasText: "stands" });
}

/** The standing k: its interval holds the truth, is no wider than the data allow, and has the unit of a second order. */
async function expectConstantTable(page: Page): Promise<void> {
  await expect(standingRow(page)).toHaveCount(1);
  const cells = await standingRow(page).getByRole("cell").allTextContents();
  expect(unspaced(cells[0] ?? "")).toContain("Lmol−1s−1");
  const [value = Number.NaN] = numbersIn(cells[1] ?? "");
  const [low = Number.NaN, high = Number.NaN] = numbersIn(cells[2] ?? "");
  expect(low).toBeLessThan(TRUTH.rateConstant);
  expect(high).toBeGreaterThan(TRUTH.rateConstant);
  expect(low).toBeLessThan(value);
  expect(high).toBeGreaterThan(value);
  expect((high - low) / value).toBeLessThan(0.12);
}

interface PrintedConstant {
  readonly text: string;
  readonly value: number;
  readonly half: number;
}

/** "k = 11.8 ± 0.3 L mol⁻¹ s⁻¹" where a law stands. */
async function constantIn(place: Locator): Promise<PrintedConstant> {
  const text = (await place.locator(".law.marked").textContent()) ?? "";
  const [value = Number.NaN, half = Number.NaN] = numbersIn(text);
  return { text, value, half };
}

function expectConstant({ text, value, half }: PrintedConstant): void {
  expect(unspaced(text)).toMatch(/^k=[\d.]+±[\d.]+Lmol−1s−1$/);
  expect(Math.abs(value - TRUTH.rateConstant), text).toBeLessThanOrEqual(half);
  expect(half / value, text).toBeLessThan(0.06);
}

function unspaced(text: string): string {
  return text.replaceAll(/\s/g, "");
}

/** Law, conditions and facts of the strip; not the line for screen readers, which speaks of changes only. */
async function said(place: Locator): Promise<string[]> {
  return place.locator(".say, .facts").allTextContents();
}

interface ShownLaw {
  readonly constant: PrintedConstant;
  readonly expression: string;
}

async function setAsideAndUndo(page: Page): Promise<ShownLaw> {
  const rowBefore = await standingRow(page).textContent();
  await station(page, "Runs");
  await expect(heading(page)).toHaveText("Nine runs, all standing");
  const before = await said(strip(page));
  const constant = await constantIn(strip(page));
  const expression = unspaced((await strip(page).locator(".law .law").first().textContent()) ?? "");
  expect(expression).toBe("rate=k[A]1[B]1");

  await page.getByRole("checkbox", { name: "Select R01" }).check();
  await page.getByRole("button", { name: "Set aside…" }).click();
  const dialog = page.getByRole("dialog");
  await expect(dialog.getByText("Then", { exact: true })).toBeVisible();
  const asked = await constantIn(dialog);
  await dialog.getByRole("button", { name: "Set R01 aside" }).click();
  await expect(dialog.getByText("A run is set aside with a reason.")).toBeVisible();
  await dialog.getByLabel("Reason").fill("stopper left open");
  await dialog.getByRole("button", { name: "Set R01 aside" }).click();

  await expect(strip(page)).toContainText("8 runs");
  await expect(strip(page)).toContainText("1 set aside");
  const without = await constantIn(strip(page));
  expect(without.text, "the law is what the question said it would be").toBe(asked.text);
  expectConstant(without);
  await expect(page.getByRole("row").filter({ hasText: "stopper left open" })).toContainText("R01");
  await station(page, "Rate law");
  await expect(standingRow(page)).not.toHaveText(rowBefore ?? "");
  await expectConstantTable(page);

  // The message goes along from station to station.
  const message = page.locator(".toast").filter({ hasText: "R01 set aside" });
  await message.getByRole("button", { name: "Undo" }).click();
  await expect(strip(page)).toContainText("9 runs");
  await expect(standingRow(page)).toHaveText(rowBefore ?? "");
  expect(await said(strip(page))).toEqual(before);
  await station(page, "Runs");
  await expect(heading(page)).toHaveText("Nine runs, all standing");
  return { constant, expression };
}

async function makeLink(page: Page): Promise<string> {
  await page.getByRole("link", { name: "Share" }).click();
  await page.getByLabel("For whom").fill("A colleague in another laboratory");
  await page.getByRole("button", { name: "Make a link" }).click();
  const address = await page.getByLabel("Address").inputValue();
  expect(address).toMatch(new RegExp(`^${browserRun().origin}/share/[A-Za-z0-9_-]{43}$`));
  await expect(heading(page)).toHaveText("One link reads this study");
  return address;
}

async function openSignedOut(browser: Browser, address: string, width: number, law: ShownLaw): Promise<void> {
  const context = await browser.newContext({ viewport: { width, height: 844 } });
  const page = await context.newPage();
  const complaints = complaintsOf(page);
  await page.goto(address);
  await expect(heading(page)).toHaveText("Nine runs by hand");
  const standing = page.getByRole("region", { name: "Standing law" });
  expect(unspaced((await standing.textContent()) ?? "")).toContain(law.expression);
  expect((await constantIn(standing)).text).toBe(law.constant.text);

  const traces = page.getByRole("img", { name: "[P] against time for 9 runs" });
  await traces.scrollIntoViewIfNeeded();
  await expect(traces.locator("polyline")).toHaveCount(RUNS.length);
  for (const { label } of RUNS) await expect(traces.getByText(label, { exact: true })).toBeVisible();
  await expectRatesIn(page.getByRole("region", { name: "Runs and initial rates" }), 3);
  await expectConstantTable(page);
  expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(width);
  expect(await context.cookies()).toEqual([]);

  expectRunTable(await download(page, "Runs and rates, CSV"));
  expectTraceTable(await download(page, "All traces, CSV"));
  expect(complaints).toEqual([]);
  await context.close();
}

async function download(page: Page, name: string): Promise<string[][]> {
  const arriving = page.waitForEvent("download");
  await page.getByRole("link", { name }).click();
  const text = readFileSync(await (await arriving).path(), "utf8");
  return Papa.parse<string[]>(text, { skipEmptyLines: true }).data;
}

function expectRunTable([heads = [], ...rows]: string[][]): void {
  expect(rows).toHaveLength(RUNS.length);
  const at = (start: string) => heads.findIndex((head) => head.startsWith(start));
  const factor = molarFactorInHead(heads[at("rate")] ?? "");
  for (const [index, run] of RUNS.entries()) {
    const row = rows[index] ?? [];
    expect(row[at("run")]).toBe(run.label);
    expect(row[at("state")]).toBe("standing");
    expect(Number(row[at("[A]0 / mmol L^-1")])).toBeCloseTo(run.molarA * 1e3, 9);
    expect(Number(row[at("[B]0 / mmol L^-1")])).toBeCloseTo(run.molarB * 1e3, 9);
    expect(
      Math.abs((Number(row[at("rate")]) * factor) / run.molarPerSecond - 1),
      `rate of ${run.label}`,
    ).toBeLessThan(RATE_TOLERANCE);
    expect(row[at("readings")]).toBe("200");
  }
}

/** Reading for reading what was uploaded. */
function expectTraceTable([heads = [], ...rows]: string[][]): void {
  expect(heads).toEqual(["run", "time / s", "Absorbance"]);
  const wanted = RUNS.flatMap(({ label, timeSeconds, absorbance }) =>
    timeSeconds.map((time, index) => [label, time, absorbance[index]]),
  );
  expect(rows.map(([label, time, signal]) => [label, Number(time), Number(signal)])).toEqual(wanted);
}

async function revoke(page: Page, studyAddress: string): Promise<void> {
  await page.goto(`${studyAddress}/share`);
  await page.getByRole("button", { name: "Revoke link" }).click();
  await page.getByRole("dialog").getByRole("button", { name: "Revoke link" }).click();
  await expect(heading(page)).toHaveText("Nobody outside the group can read this study");
  await expect(page.getByRole("row").filter({ hasText: "A colleague" })).toContainText("revoked");
}

async function expectDead(browser: Browser, address: string): Promise<void> {
  const context = await browser.newContext();
  const page = await context.newPage();
  const answer = await page.goto(address);
  expect(answer?.status()).toBe(404);
  await expect(heading(page)).toHaveText("There is nothing at this address for you");
  for (const table of ["runs.csv", "traces.csv"]) {
    expect((await context.request.get(`${address}/${table}`)).status()).toBe(404);
  }
  await context.close();
}
