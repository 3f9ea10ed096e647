import { expect, test } from "@playwright/test";
import { A, cell, makeBench, makeEmptyBench, sheetOf, signIn, standing, toast } from "./run-bench";

test("a run is set aside with its effect seen first, taken back, and undone and done again by keys", async ({
  page,
}) => {
  const bench = await makeBench();
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/runs`);
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("Seven runs, all standing");
  // The law alone: what is spoken of a change stands in the strip too.
  const law = standing(page).locator(".say");
  const before = (await law.textContent()) ?? "";

  await page.getByLabel("Select R07").check();
  await page.getByRole("button", { name: "Set aside…" }).click();
  const dialog = page.getByRole("dialog", { name: "Set R07 aside" });
  await expect(dialog.getByText("Now")).toBeVisible();
  await expect(dialog.getByText("Then")).toBeVisible();

  // Without a reason nothing happens.
  await dialog.getByRole("button", { name: "Set R07 aside" }).click();
  await expect(dialog.getByText("Say in a few words what was wrong.")).toBeVisible();
  await dialog.getByLabel("Reason").fill("stirrer stopped");
  await dialog.getByRole("button", { name: "Set R07 aside" }).click();

  await expect(page.getByRole("heading", { level: 1 })).toHaveText("Seven runs, six standing");
  await expect(toast(page, "R07 set aside: stirrer stopped.")).toBeVisible();
  await expect(page.getByRole("row", { name: /R07/ })).toContainText("Set aside: stirrer stopped");
  await expect(law).not.toHaveText(before);
  // Six runs within 1.1 % of k = 2 give 2.00 to the second decimal.
  await expect(standing(page)).toContainText(/2\.0\d/);

  await page.getByLabel("Select R07").check();
  await page.getByRole("button", { name: "Take back" }).click();
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("Seven runs, all standing");
  await expect(law).toHaveText(before);

  // Ctrl+Z takes back the taking back, and Ctrl+Shift+Z does it again.
  await page.getByRole("heading", { level: 1 }).click();
  await page.keyboard.press("Control+z");
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("Seven runs, six standing");
  await page.keyboard.press("Control+Shift+z");
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("Seven runs, all standing");
  expect((await sheetOf(bench)).revision).toBe(6);
});

test("runs go to the bin and come back, and a recipe is repeated", async ({ page }) => {
  const bench = await makeBench();
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/runs`);
  await page.getByLabel("Select R07").check();
  await page.getByRole("button", { name: "Put into the bin" }).click();
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("Six runs, all standing");
  await page.getByText("In the bin (1)").click();
  await page.getByRole("button", { name: "Restore R07" }).click();
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("Seven runs, all standing");

  await page.getByLabel("Select R03").check();
  await page.getByRole("button", { name: "New run from this recipe" }).click();
  await expect(page.getByRole("row", { name: /R08/ })).toContainText("Repeats R03");
  await expect(page.getByText("Planned")).toBeVisible();
});

test("a reader sees the sheet and cannot change it", async ({ page }) => {
  const bench = await makeBench();
  await signIn(page, `reader@${bench.domain}`, `/studies/${bench.studyId}/runs`);
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("Seven runs, all standing");
  await expect(page.getByRole("checkbox")).toHaveCount(0);
  await expect(page.getByRole("link", { name: "Add traces" })).toHaveCount(0);
  await page.goto(`/studies/${bench.studyId}/runs?edit`);
  await cell(page, "R01", A).click();
  await page.keyboard.type("5");
  await expect(page.getByRole("textbox")).toHaveCount(0);
  await page.goto(`/studies/${bench.studyId}/set-up`);
  await expect(page.getByRole("textbox", { name: "Reaction" })).toHaveAttribute("readonly", "");
  await expect(page.getByRole("button", { name: "Add a species" })).toHaveCount(0);
});

test("a study is made from a name and a reaction, and its set-up changes with the effect seen first", async ({
  page,
}) => {
  const bench = await makeBench();
  await signIn(page, `analyst@${bench.domain}`, "/studies/new");
  await page.getByLabel("Name", { exact: true }).fill("Ester and hydroxide");
  await page
    .getByRole("textbox", { name: "Reaction" })
    .fill("CH3CO2C6H4NO2 [A] + 2 OH- [B] -> CH3CO2- + NO2C6H4O- [P] + H2O");
  await expect(page.getByText("Atoms balance: C 8, H 9, N 1, O 6")).toBeVisible();
  await expect(page.getByText("Charge balances: −2 on each side")).toBeVisible();
  await expect(page.getByText("Strong alkali, corrosive")).toBeVisible();
  await page.getByLabel(/^ε·l/).fill("17930 ± 55");
  await page.getByRole("button", { name: "Make the study" }).click();
  await page.waitForURL(/\/studies\/[\w-]+\/runs$/);
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("No runs yet");

  await page
    .getByRole("navigation", { name: "Stations of this study" })
    .getByRole("link", { name: /Set-up/ })
    .click();
  await page.getByLabel(/^Temperature/).fill("warm");
  await page.getByRole("button", { name: "See the effect and keep" }).click();
  await expect(page.getByText("“warm” is not read.")).toBeVisible();
  await page.getByLabel(/^Temperature/).fill("30,0 +- 0,2");
  await page.getByRole("button", { name: "See the effect and keep" }).click();
  await page.getByRole("button", { name: "Keep the set-up" }).click();
  await expect(toast(page, "Changed the temperature.")).toBeVisible();
  await expect(page.getByLabel(/^Temperature/)).toHaveValue("30.0 ± 0.2");
  await expect(standing(page)).toContainText("30.0 °C");
  await page.goto("/studies?find=hydroxide");
  await expect(page.getByRole("link", { name: "Ester and hydroxide" })).toBeVisible();
  await expect(page.getByRole("link", { name: "Rates typed by hand" })).toHaveCount(0);
});

test("changed boxes of the set-up are not left without a question", async ({ page }) => {
  const bench = await makeEmptyBench();
  await signIn(page, `analyst@${bench.domain}`, `/studies/${bench.studyId}/set-up`);
  const runs = page
    .getByRole("navigation", { name: "Stations of this study" })
    .getByRole("link", { name: /Runs/ });
  await page.getByLabel(/^Temperature/).fill("31.0");
  await runs.click();
  const dialog = page.getByRole("dialog", { name: "Leave without keeping the changes?" });
  await dialog.getByRole("button", { name: "Go on editing" }).click();
  await expect(page.getByLabel(/^Temperature/)).toHaveValue("31.0");
  await runs.click();
  await dialog.getByRole("button", { name: "See the effect and keep" }).click();
  await page.getByRole("button", { name: "Keep the set-up" }).click();
  await expect(toast(page, "Changed the temperature.")).toBeVisible();

  // Kept boxes are left without a question; changed ones only when that is said.
  await page.getByLabel("Name", { exact: true }).fill("Another name");
  await runs.click();
  await dialog.getByRole("button", { name: "Leave without keeping" }).click();
  await page.waitForURL(/\/runs\?edit$/);
  const { sheet } = await sheetOf(bench);
  expect(sheet.study.name).toBe("Nothing measured yet");
  expect(sheet.conditions.temperatureKelvin?.value).toBeCloseTo(304.15, 9);
});
