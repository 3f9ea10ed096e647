import { expect, type Page, test } from "@playwright/test";
import { makeEmptyBench, pasteText, sheetOf, signIn, toast } from "./run-bench";

async function addStock(page: Page, boxes: Readonly<Record<string, string>>) {
  await page.getByRole("button", { name: "Add a stock" }).click();
  const dialog = page.getByRole("dialog", { name: "Add a stock" });
  for (const [label, text] of Object.entries(boxes)) {
    await dialog.getByLabel(label, { exact: true }).fill(text);
  }
  await dialog.getByRole("button", { name: "Add this stock" }).click();
  await expect(dialog).toHaveCount(0);
}

/** The cell of a run under a heading of the mixing table. */
async function cellOf(page: Page, run: string, heading: RegExp) {
  const heads = await page.getByRole("grid").locator("thead tr:last-child th").allInnerTexts();
  const column = heads.findIndex((head) => heading.test(head.replaceAll("\n", " ")));
  expect(column, `${heading} among ${heads.join(" | ")}`).toBeGreaterThanOrEqual(0);
  const row = page
    .getByRole("row")
    .filter({ has: page.locator('[data-column="0"]').filter({ hasText: run }) });
  return row.locator(`[data-column="${column}"]`);
}

test("stocks, a pasted block of volumes, halved concentrations, a row that is too full, and undo", async ({
  page,
}) => {
  const bench = await makeEmptyBench();
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/runs/mixing`);
  await expect(page.getByRole("heading", { level: 1, name: "No stocks yet" })).toBeVisible();

  // 25 µmol/L and 0.2 mol/L in equal volumes are halved: common practice.
  await addStock(page, { Symbol: "A", Name: "substrate in water", "A, a": "0,025 ± 0,00025" });
  await expect(toast(page, "Stock A added.")).toBeVisible();
  await addStock(page, { Symbol: "C", Name: "catalyst", "C, c": "200 ± 1" });
  await addStock(page, { Name: "water" });
  const stocks = page.getByRole("region", { name: "Stocks" });
  await expect(stocks.getByRole("row", { name: /substrate/ })).toContainText("25.00 ± 0.25 µmol");
  await expect(stocks.getByRole("row", { name: /catalyst/ })).toContainText("200.0 ± 1.0 mmol");

  // Headings name the columns, in an order of the spreadsheet's own; rows become planned runs.
  const label = page.locator('[data-row="0"][data-column="0"]');
  await label.click();
  await pasteText(
    page,
    "Run\twater\tC\tstock A (µL)\tTemp\r\nR01\t0\t1500,0\t1500,0\t25\r\nR02\t1500\t1000\t500\t25\r\n",
  );
  await expect(toast(page, "R01 and R02 added.")).toBeVisible();
  await expect(page.getByText("“Temp” not among the columns and skipped")).toBeVisible();
  await expect(await cellOf(page, "R01", /^\[A\]/)).toHaveText(/^0\.0125/);
  await expect(await cellOf(page, "R01", /^\[C\]/)).toHaveText(/^100\.0/);
  await expect(await cellOf(page, "R02", /Total/)).toHaveText("3000");
  const halved = (await sheetOf(bench)).sheet.runs.find((run) => run.label === "R01");
  expect(halved?.concentrations.a?.molar).toBeCloseTo(12.5e-6, 15);
  expect(halved?.concentrations.c?.molar).toBeCloseTo(0.1, 12);

  // The line under the grid works a volume out while it is typed.
  await page.getByRole("button", { name: "Change mark and deliveries" }).click();
  const dispensing = page.getByRole("dialog", { name: "Mark and deliveries" });
  await dispensing.getByLabel(/^Made up to/).fill("3000");
  await dispensing.getByLabel(/^Small deliveries, to/).fill("50");
  await dispensing.getByLabel(/^Each of them/).fill("0,08");
  await dispensing.getByLabel(/^Other deliveries/).fill("0,5");
  await dispensing.getByRole("button", { name: "Keep these" }).click();
  await expect(dispensing).toHaveCount(0);
  await expect(page.getByText("3000 µL, made up with water")).toBeVisible();
  await (await cellOf(page, "R02", /Stock A/)).click();
  await page.keyboard.type("250");
  await expect(page.getByText(/250 µL gives \[A\]₀ 0\.00208\d* ± /)).toBeVisible();
  await page.keyboard.press("Escape");

  // Above the mark the row is refused by name; what it held stays until it is repaired.
  await (await cellOf(page, "R02", /water/)).click();
  await page.keyboard.type("1750");
  await page.keyboard.press("Enter");
  await expect(page.getByText("R02 adds to 3250 µL, 250 over the mark of 3000")).toBeVisible();
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("One mixture adds up, R02 does not");
  const refused = (await sheetOf(bench)).sheet.runs.find((run) => run.label === "R02");
  expect(refused?.concentrations.c?.molar).toBeCloseTo(0.2 / 3, 10);
  await page.getByRole("button", { name: "Set water to 1500" }).click();
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("Two mixtures, all add up");

  // Undo takes the repair back, and then the volume before it.
  await (await cellOf(page, "R02", /water/)).click();
  await page.keyboard.press("Control+z");
  await expect(await cellOf(page, "R02", /water/)).toHaveText("1750");
  await page.keyboard.press("Control+z");
  await expect(await cellOf(page, "R02", /water/)).toHaveText("1500");
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("Two mixtures, all add up");

  // A stock that is in use stays; the run grid shows what follows from volumes and takes nothing over it.
  await page.getByRole("button", { name: "Remove stock C" }).click();
  await expect(toast(page, "R01 and R02 take a volume of stock C.")).toBeVisible();
  await page.getByRole("link", { name: "Traces" }).click();
  await page.waitForURL(/\/runs(\?edit)?$/);
  await page.goto(`/studies/${bench.studyId}/runs?edit`);
  const followed = page.locator('[data-row="0"][data-column="1"]');
  await expect(followed).toHaveAttribute("aria-readonly", "true");
  await followed.click();
  await page.keyboard.type("7");
  await expect(page.getByRole("grid").getByRole("textbox")).toHaveCount(0);
});

test("the bench sheet orders what is planned, and says the same again at its address", async ({ page }) => {
  const bench = await makeEmptyBench();
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/runs/mixing`);
  await addStock(page, { Symbol: "A", Name: "substrate", "A, a": "10 ± 0,05" });
  await addStock(page, { Name: "water" });
  await page.locator('[data-row="0"][data-column="0"]').click();
  await pasteText(page, "Run\tA\twater\nR01\t300\t2700\nR02\t75\t2925\nR03\t150\t2850\n");
  await expect(toast(page, "R01, R02 and R03 added.")).toBeVisible();
  await page.getByRole("link", { name: "Bench sheet" }).click();
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("The bench sheet for the next three runs");
  const mixtures = page
    .getByRole("region", { name: "Mixtures in the order of measuring" })
    .getByRole("rowheader");
  await expect(mixtures).toHaveText(["Blank", "R02", "R03", "R01"]);
  await page.getByRole("checkbox", { name: "A blank first" }).click();
  await expect(mixtures).toHaveText(["R02", "R03", "R01"]);
  await page.getByRole("radio", { name: /^As on the mixing table/ }).click();
  await expect(mixtures).toHaveText(["R01", "R02", "R03"]);
  await page.getByRole("radio", { name: /^Randomised/ }).click();
  await expect(page.getByRole("heading", { name: "Three runs in random order, seed 1" })).toBeVisible();
  const drawn = await mixtures.allInnerTexts();
  await page.reload();
  await expect(mixtures).toHaveText(drawn);
  await expect(page.getByText("Read the safety data sheet of each reagent")).toBeVisible();
});
