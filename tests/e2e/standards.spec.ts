import { expect, type Page, test } from "@playwright/test";
import { complaintsOf } from "./complaints";
import { makeEmptyBench, sheetOf, signIn, standing, toast } from "./run-bench";

/** Fluorescein, 0 to 12 pg/mL (Miller and Miller, Statistics for Analytical Chemistry); its unit is taken as mmol/L here. */
const LINES = "S0\t0\t2.1\nS1\t2\t5.0\nS2\t4\t9.0\nS3\t6\t12.6\nS4\t8\t17.3\nS5\t10\t21.0\nS6\t12\t24.7";

const box = (page: Page) => page.getByRole("textbox", { name: /^Standards, one a line/ });
const heading = (page: Page) => page.getByRole("heading", { level: 1 });

test("standards are pasted, corrected, drawn, followed by the signal, and undone", async ({ page }) => {
  const bench = await makeEmptyBench();
  const complaints = complaintsOf(page);
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/standards`);
  await expect(heading(page)).toHaveText("No standards yet");

  await page.getByRole("button", { name: "Enter standards" }).click();
  await box(page).fill(LINES.replace("9.0", "9.0x"));
  await page.getByRole("button", { name: "Keep the standards" }).click();
  // What cannot be read is named by its line and stays as it was typed.
  await expect(page.getByText(/^Line 3: S2: reading 1, “9.0x”, is no number/)).toBeVisible();
  await expect(box(page)).toHaveValue(/9\.0x/);
  await box(page).fill(LINES);
  await page.getByRole("button", { name: "Keep the standards" }).click();
  await expect(toast(page, "7 standards on the sheet.")).toBeVisible();
  // Published: slope 1.93 ± 0.04 per unit of concentration, here 10³ times as much per mol/L.
  await expect(heading(page)).toContainText(/1930\s±\s41/);
  await expect(page.getByRole("row", { name: /^S6/ })).toContainText("24.7");

  const station = page
    .getByRole("navigation", { name: "Stations of this study" })
    .getByRole("link", { name: /Standards/ });
  await expect(station).toContainText("7 standards");

  await expect(page.getByText(/would be 1930\s±\s41 instead of 10.?000\s±\s50/)).toBeVisible();
  await page.getByRole("button", { name: "Let the signal follow this line" }).click();
  await expect(page.getByText("The signal follows this line", { exact: false })).toBeVisible();
  const followed = (await sheetOf(bench)).sheet.signal;
  expect(followed).toMatchObject({ source: "standards", perMolar: { value: expect.closeTo(1930.357, 2) } });

  await page.getByRole("button", { name: "Set aside S6" }).click();
  const dialog = page.getByRole("dialog", { name: "Set S6 aside" });
  await dialog.getByRole("button", { name: "Set S6 aside" }).click();
  await expect(dialog.getByText("Say in a few words what was wrong.")).toBeVisible();
  await dialog.getByLabel("Reason").fill("bends away");
  await dialog.getByRole("button", { name: "Set S6 aside" }).click();
  await expect(page.getByRole("row", { name: /^S6/ })).toContainText("Set aside: bends away");
  await expect(toast(page, "S6 set aside: bends away")).toBeVisible();
  expect((await sheetOf(bench)).sheet.signal).toMatchObject({
    perMolar: { value: expect.closeTo(1928.571, 2) },
  });
  await heading(page).click();
  await page.keyboard.press("Control+z");
  await expect(page.getByRole("row", { name: /^S6/ })).not.toContainText("Set aside: bends away");
  expect((await sheetOf(bench)).sheet.signal).toEqual(followed);

  // The set-up says where its factor comes from.
  await page.goto(`/studies/${bench.studyId}/set-up`);
  await expect(
    page.getByText("Follows the standards and changes with them.", { exact: false }),
  ).toBeVisible();
  await expect(standing(page)).toBeVisible();
  expect(complaints).toEqual([]);
});

test("how the line is drawn is kept, and boxes that cannot be meant are named", async ({ page }) => {
  const bench = await makeEmptyBench();
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/standards`);
  await page.getByRole("button", { name: "Enter standards" }).click();
  await box(page).fill(LINES);
  await page.getByRole("button", { name: "Keep the standards" }).click();
  await page.locator("summary", { hasText: "How the line is drawn" }).click();
  await page.getByLabel(/^Range from/).fill("9");
  await page.getByLabel(/^Range to/).fill("3");
  await page.getByRole("button", { name: "Draw the line so" }).click();
  await expect(page.getByText("The range ends before it begins.", { exact: false })).toBeVisible();
  await page.getByLabel(/^Range from/).fill("0");
  await page.getByLabel(/^Range to/).fill("10");
  await page.getByLabel(/^Uncertainty of the stock/).fill("0.5");
  await page.getByRole("button", { name: "Draw the line so" }).click();
  await expect(page.getByRole("row", { name: /^S6/ })).toContainText("Outside the range");
  await expect(page.getByText("Standard stock, 0.50 %")).toBeVisible();
  expect((await sheetOf(bench)).sheet.calibration).toMatchObject({
    stockRelative: expect.closeTo(0.005, 12),
    rangeMolar: { low: 0, high: expect.closeTo(0.01, 12) },
  });
});

test("a reading becomes a concentration without script", async ({ page, browser }) => {
  const bench = await makeEmptyBench();
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/standards`);
  await page.getByRole("button", { name: "Enter standards" }).click();
  await box(page).fill(LINES);
  await page.getByRole("button", { name: "Keep the standards" }).click();
  await expect(heading(page)).toContainText(/1930/);

  const context = await browser.newContext({
    javaScriptEnabled: false,
    storageState: await page.context().storageState(),
  });
  const still = await context.newPage();
  await still.goto(`/studies/${bench.studyId}/standards`);
  await still.getByLabel("Readings of one solution").fill("13.5");
  await still.getByRole("button", { name: "Read", exact: true }).click();
  await expect(still).toHaveURL(/reading=13\.5/);
  // Published: 6.21; u 0.24 of one reading by the formula there.
  await expect(still.locator("#reading")).toContainText(/6\.21\s±\s0\.24/);
  await context.close();
});
