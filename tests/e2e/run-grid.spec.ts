import { expect, test } from "@playwright/test";
import { connect } from "@/db/connect";
import { changeStudy } from "@/db/study/change-study";
import { browserRun } from "../browser-run";
import {
  A,
  C,
  cell,
  LABEL,
  makeBench,
  makeEmptyBench,
  pasteText,
  RATE,
  sheetOf,
  signIn,
  toast,
} from "./run-bench";

test("the grid is one tab stop, walks by arrows, and edits as its keys say", async ({ page }) => {
  const bench = await makeBench();
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/runs?edit`);
  const grid = page.getByRole("grid", { name: "Runs of this study" });
  await expect(grid.locator('[tabindex="0"]')).toHaveCount(1);

  await cell(page, "R01", LABEL).click();
  await page.keyboard.press("ArrowRight");
  await expect(cell(page, "R01", A)).toBeFocused();
  await page.keyboard.press("Control+ArrowDown");
  await expect(cell(page, "New run", A)).toBeFocused();
  await page.keyboard.press("Control+ArrowUp");
  await page.keyboard.press("End");
  await expect(cell(page, "R01", /6/)).toBeFocused();
  await page.keyboard.press("Home");
  await expect(cell(page, "R01", LABEL)).toBeFocused();
  await page.keyboard.press("Tab");
  await expect(cell(page, "R01", A)).toBeFocused();

  // Typing replaces; Esc returns the old value and nothing is kept.
  await page.keyboard.type("7,5");
  await expect(page.getByRole("textbox", { name: "[A]₀ of R01" })).toHaveValue("7,5");
  await page.keyboard.press("Escape");
  await expect(cell(page, "R01", A)).toHaveText("1");
  expect((await sheetOf(bench)).revision).toBe(2);

  // F2 edits in place and arrows move the caret; Enter keeps and goes down.
  await page.keyboard.press("F2");
  await page.keyboard.press("ArrowLeft");
  await page.keyboard.type("1");
  await page.keyboard.press("Enter");
  await expect(cell(page, "R02", A)).toBeFocused();
  await expect(cell(page, "R01", A)).toHaveText("11");
  await expect(toast(page, "R01 edited.")).toBeVisible();
  const kept = (await sheetOf(bench)).sheet.runs.find((run) => run.label === "R01");
  expect(kept?.concentrations.a?.molar).toBeCloseTo(0.011, 12);

  // Ctrl+Z in the grid undoes the step in the sheet, Ctrl+Shift+Z does it again.
  await page.keyboard.press("Control+z");
  await expect(cell(page, "R01", A)).toHaveText("1");
  await page.keyboard.press("Control+Shift+z");
  await expect(cell(page, "R01", A)).toHaveText("11");
  await page.keyboard.press("Control+z");
  await expect(cell(page, "R01", A)).toHaveText("1");

  // Shift extends, Ctrl+D fills down, Delete empties.
  await cell(page, "R01", C).click();
  await page.keyboard.press("Shift+ArrowDown");
  await page.keyboard.press("Shift+ArrowDown");
  await expect(grid.locator('[aria-selected="true"]')).toHaveCount(3);
  await page.keyboard.press("Control+d");
  await expect(cell(page, "R03", C)).toHaveText("10");
  await expect(toast(page, "R02 and R03 edited.")).toBeVisible();
  await cell(page, "R05", RATE).click();
  await page.keyboard.press("Delete");
  await expect(cell(page, "R05", RATE)).toHaveText("");
  await expect(toast(page, "R05 edited.")).toBeVisible();
  const emptied = (await sheetOf(bench)).sheet.runs.find((run) => run.label === "R05");
  expect(emptied?.enteredRate).toBeNull();
});

test("a bad cell keeps its text and says so, and the row keeps its last good values", async ({ page }) => {
  const bench = await makeBench();
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/runs?edit`);
  await cell(page, "R04", A).click();
  await pasteText(page, "two");
  await expect(cell(page, "R04", A)).toHaveText("two");
  await expect(cell(page, "R04", A)).toHaveAttribute("aria-invalid", "true");
  await expect(page.getByText("R04 keeps its last good values in the law")).toBeVisible();
  const { revision, sheet } = await sheetOf(bench);
  expect(revision).toBe(2);
  expect(sheet.runs.find((run) => run.label === "R04")?.concentrations.a?.molar).toBe(0.002);
  await page.getByRole("button", { name: "Return to the kept values" }).click();
  await expect(cell(page, "R04", A)).toHaveText("2");
});

test("a block from a spreadsheet becomes runs in one step, with decimal commas and headers skipped", async ({
  page,
}) => {
  const bench = await makeBench();
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/runs?edit`);
  await cell(page, "New run", LABEL).click();
  await pasteText(
    page,
    "Run\t[A]\t[C]\tT\tblock\trate\r\n\tmmol/L\tmmol/L\t°C\t\t\r\nR08\t2,5\t10,0\t25,1\tday 2\t0,0503\r\nR09\t5,0\t10,0\t25,0\tday 2\t0,0997\r\n",
  );
  await expect(toast(page, "R08 and R09 added.")).toBeVisible();
  await expect(cell(page, "R09", A)).toHaveText("5");
  await expect(page.getByText("2 lines of headings skipped")).toBeVisible();
  const { sheet, revision } = await sheetOf(bench);
  expect(revision).toBe(3);
  const added = sheet.runs.find((run) => run.label === "R08");
  expect(added).toMatchObject({ temperatureKelvin: 298.25, block: "day 2" });
  expect(added?.concentrations.a?.molar).toBeCloseTo(0.0025, 12);
  expect(added?.enteredRate?.molarPerSecond).toBeCloseTo(5.03e-5, 12);

  // Copying gives the block back, tab-separated.
  await cell(page, "R08", LABEL).click();
  await page.keyboard.press("Shift+ArrowRight");
  await page.keyboard.press("Shift+ArrowDown");
  const copied = await page.evaluate(() => {
    const data = new DataTransfer();
    document.activeElement?.dispatchEvent(
      new ClipboardEvent("copy", { clipboardData: data, bubbles: true, cancelable: true }),
    );
    return data.getData("text/plain");
  });
  expect(copied).toBe("R08\t2.5\nR09\t5");

  // One paste is one step.
  await page.keyboard.press("Control+z");
  await expect(page.getByRole("gridcell", { name: "R08" })).toHaveCount(0);
  expect((await sheetOf(bench)).sheet.runs.filter((run) => run.removedIn !== null)).toHaveLength(2);

  // Too wide a block is refused whole.
  await cell(page, "R01", RATE).click();
  await pasteText(page, "1\t2\t3");
  await expect(page.getByText("3 columns wide and 2 columns are left from Entered rate on")).toBeVisible();
});

test("runs are typed by hand into an empty study, from cell to cell and on into the next row", async ({
  page,
}) => {
  const bench = await makeEmptyBench();
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/runs`);
  await page.waitForURL(/\?edit$/);
  await cell(page, "New run", LABEL).click();
  // Without a pause between the keys: a row is kept while the next cell is being typed.
  for (const text of ["R01", "1,5", "10", "25,1", "day 1", "0.031", "first"]) {
    await page.keyboard.type(text);
    await page.keyboard.press("Tab");
  }
  await expect(cell(page, "New run", LABEL)).toBeFocused();
  for (const text of ["R02", "3", "10"]) {
    await page.keyboard.type(text);
    await page.keyboard.press("Tab");
  }
  await expect(cell(page, "R01", /6/)).toHaveText("first");
  await expect(page.getByText("Refitting.")).toHaveCount(0);
  await expect(page.getByRole("heading", { level: 1 })).toContainText("Two runs");
  await expect(page.getByRole("grid").locator('[aria-invalid="true"]')).toHaveCount(0);
  const { sheet } = await sheetOf(bench);
  expect(sheet.runs.map((run) => run.label)).toEqual(["R01", "R02"]);
  const [first, second] = sheet.runs;
  expect(first).toMatchObject({ temperatureKelvin: 298.25, block: "day 1", remark: "first" });
  expect(first?.concentrations.a?.molar).toBeCloseTo(0.0015, 12);
  expect(first?.concentrations.c?.molar).toBeCloseTo(0.01, 12);
  // Rates are shown in mmol/L a second.
  expect(first?.enteredRate?.molarPerSecond).toBeCloseTo(3.1e-5, 12);
  expect(second?.concentrations.a?.molar).toBeCloseTo(0.003, 12);
  expect(second?.concentrations.c?.molar).toBeCloseTo(0.01, 12);
});

test("a block with one bad cell pasted into an empty study keeps the good rows and marks the cell", async ({
  page,
}) => {
  const bench = await makeEmptyBench();
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/runs`);
  await page.waitForURL(/\?edit$/);
  await cell(page, "New run", LABEL).click();
  await pasteText(page, "R01\t1\t10\nR02\ttwo\t10\nR03\t4\t10\n");
  await expect(page.getByRole("heading", { level: 1 })).toContainText("Two runs");
  await expect(cell(page, "R02", A)).toHaveText("two");
  await expect(cell(page, "R02", A)).toHaveAttribute("aria-invalid", "true");
  await expect(page.getByText("R02 is not kept yet")).toBeVisible();
  expect((await sheetOf(bench)).sheet.runs.map((run) => run.label)).toEqual(["R01", "R03"]);

  // The repaired cell is enough: the row is kept with what else was pasted.
  await cell(page, "R02", A).click();
  await page.keyboard.type("2");
  await page.keyboard.press("Enter");
  await expect(page.getByRole("heading", { level: 1 })).toContainText("Three runs");
  const repaired = (await sheetOf(bench)).sheet.runs.find((run) => run.label === "R02");
  expect(repaired?.concentrations.a?.molar).toBeCloseTo(0.002, 12);
  expect(repaired?.concentrations.c?.molar).toBeCloseTo(0.01, 12);
});

test("two people change one run: both values are shown, and mine can be put over theirs", async ({
  page,
}) => {
  const bench = await makeBench();
  // The page must not hear of their change before mine is made, however slowly the hand types.
  await page.route("**/revision", (route) => route.abort());
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/runs?edit`);
  await expect(cell(page, "R02", A)).toHaveText("1");
  const db = connect(browserRun().databaseFile);
  const theirs = await changeStudy(
    db,
    bench.group.lead,
    { studyId: bench.studyId, base: 2 },
    { verb: "run edited", summary: "R02 edited." },
    (sheet) => ({
      ...sheet,
      runs: sheet.runs.map((run) =>
        run.id === `${bench.domain}-R02`
          ? {
              ...run,
              concentrations: {
                a: { molar: 0.003, relativeUncertainty: 0 },
                c: { molar: 0.02, relativeUncertainty: 0 },
              },
            }
          : run,
      ),
    }),
  );
  await db.destroy();
  expect(theirs.status).toBe("changed");

  await cell(page, "R02", A).click();
  await page.keyboard.type("1.5");
  await page.keyboard.press("Enter");
  const dialog = page.getByRole("dialog", { name: "Somebody else changed the same run" });
  await expect(dialog.getByRole("row", { name: /R02/ })).toContainText("3");
  await expect(dialog.getByRole("row", { name: /R02/ })).toContainText("1.5");
  await dialog.getByRole("button", { name: "Put mine over theirs" }).click();
  await expect(dialog).toHaveCount(0);
  await expect
    .poll(
      async () =>
        (await sheetOf(bench)).sheet.runs.find((run) => run.label === "R02")?.concentrations.a?.molar,
    )
    .toBeCloseTo(0.0015, 12);
});
