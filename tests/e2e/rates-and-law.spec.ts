import { expect, type Locator, type Page, test } from "@playwright/test";
import { DEMO_EMAIL } from "@/db/demo/make-demo";
import { browserRun } from "../browser-run";

/**
 * The Rates and Rate law stations on the demo study, by hand and by key. Every test puts back what it changed, since
 * one server stands behind all of them.
 */

async function openDemo(page: Page, station: string): Promise<string> {
  await page.goto("/studies");
  if (page.url().includes("/sign-in")) {
    await page.getByLabel("Email address").fill(DEMO_EMAIL);
    await page.getByLabel("Password").fill(browserRun().demoPassword);
    await page.getByRole("button", { name: "Sign in" }).click();
    await expect(page).toHaveURL(/\/studies/);
  }
  const link = page.getByRole("link", { name: /Alkaline hydrolysis/ }).first();
  const address = (await link.getAttribute("href")) ?? "";
  const study = /\/studies\/[^/]+/.exec(address)?.[0] ?? "";
  await page.goto(`${study}/${station}`);
  return study;
}

const strip = (page: Page): Locator => page.getByRole("region", { name: "Standing law" });
/** Law, constant and conditions, without what is only spoken. */
const lawInStrip = (page: Page): Locator => strip(page).locator(".say");
const checks = (page: Page): Locator =>
  strip(page).locator("dl > div").filter({ hasText: "Checks" }).locator("dd");
const rateOnTrace = (page: Page): Locator => page.getByRole("heading", { level: 1 }).locator("data");

/** The rate that the page shows, at full precision. */
async function exactRate(page: Page): Promise<number> {
  return Number(await rateOnTrace(page).getAttribute("value"));
}

/** Previewed or on record, once it stands still. */
async function settled(page: Page, preview: boolean): Promise<number> {
  await expect(rateOnTrace(page)).toHaveAttribute("data-preview", String(preview));
  let before = Number.NaN;
  await expect
    .poll(async () => {
      const now = await exactRate(page);
      const still = now === before;
      before = now;
      return still;
    })
    .toBe(true);
  return before;
}

test("a handle drags the window: the rate follows at once, the record agrees, the law follows", async ({
  page,
}) => {
  await openDemo(page, "rates?run=R03");
  await expect(page.getByText("Follows the study’s rule.")).toBeVisible();
  const byRule = await exactRate(page);
  const lawBefore = (await lawInStrip(page).textContent()) ?? "";
  const checksBefore = (await checks(page).textContent()) ?? "";

  const end = page.getByRole("slider", { name: "Window end" });
  const box = await end.boundingBox();
  if (box === null) throw new Error("the handle is drawn");
  const x = box.x + box.width / 2;
  const y = box.y + 10;
  await page.mouse.move(x, y);
  await page.mouse.down();
  await page.mouse.move(x - 120, y, { steps: 8 });
  const previewed = await settled(page, true);
  expect(previewed).not.toBe(byRule);
  const windowWhileDragging = await end.getAttribute("aria-valuetext");
  await page.mouse.up();

  await expect(page.getByText("Set by hand for this run.")).toBeVisible();
  const recorded = await settled(page, false);
  expect(Math.abs(recorded / previewed - 1)).toBeLessThan(1e-9);
  expect(await end.getAttribute("aria-valuetext")).toBe(windowWhileDragging);
  // Nine runs carry k, so one window hardly moves it; that this window is a person's is a note at once.
  await expect(checks(page)).not.toHaveText(checksBefore);
  await expect(page.getByText(/R03 window set by hand\. k (stays|moves)/).first()).toBeVisible();

  await page.getByRole("button", { name: "Use the study’s rule" }).click();
  await expect(page.getByText("Follows the study’s rule.")).toBeVisible();
  expect(await settled(page, false)).toBe(byRule);
  await expect(lawInStrip(page)).toHaveText(lawBefore);
  await expect(checks(page)).toHaveText(checksBefore);
});

test("arrow keys move a handle a reading, Shift ten, and undo takes it back", async ({ page }) => {
  await openDemo(page, "rates?run=R04");
  await expect(page.getByText("Follows the study’s rule.")).toBeVisible();
  const byRule = await exactRate(page);
  const end = page.getByRole("slider", { name: "Window end" });
  const at = async () => Number(await end.getAttribute("aria-valuenow"));
  const start = await at();
  await end.focus();
  await page.keyboard.press("Shift+ArrowLeft");
  await expect.poll(at).toBe(start - 10);
  await expect(page.getByText("Set by hand for this run.")).toBeVisible();
  await page.keyboard.press("ArrowRight");
  await expect.poll(at).toBe(start - 9);
  await expect(page.getByText("Saving. The law follows.")).toBeHidden();

  for (let left = 2; left > 0; left--) {
    // The latest stands last; an older one could not be undone under it.
    await page.getByRole("button", { name: "Undo" }).last().click();
    await expect(page.getByRole("button", { name: "Undo" })).toHaveCount(left - 1);
  }
  await expect(page.getByText("Follows the study’s rule.")).toBeVisible();
  expect(await settled(page, false)).toBe(byRule);
});

test("previous and next walk through the runs", async ({ page }) => {
  await openDemo(page, "rates?run=R02");
  await page.getByRole("link", { name: "Next run" }).click();
  await expect(page.getByRole("heading", { level: 1 })).toContainText("R03: initial rate");
  await page.getByRole("link", { name: "Previous run" }).click();
  await expect(page.getByRole("heading", { level: 1 })).toContainText("R02: initial rate");
  await page.getByRole("link", { name: /R07/ }).click();
  await expect(page.getByText("Set aside: bubble at 6 s").first()).toBeVisible();
});

test("orders are held and set free, and the law follows", async ({ page }) => {
  await openDemo(page, "rate-law");
  const before = (await lawInStrip(page).textContent()) ?? "";
  await page.getByLabel("Hold order in A at").fill("½");
  await page.getByLabel("Hold order in B at").fill("1");
  await page.getByRole("button", { name: "Set orders" }).click();
  await expect(strip(page)).toContainText("[A]½");
  await expect(page.getByText("held by hand")).toHaveCount(2);
  await expect(page.getByText(/order in A held at ½ and the order in B held at 1/)).toBeVisible();

  await page.getByLabel("Hold order in A at").fill("first");
  await page.getByRole("button", { name: "Set orders" }).click();
  await expect(page.getByText("“first” is no order in A.", { exact: false })).toBeVisible();
  await expect(strip(page)).toContainText("[A]½");

  await page.getByLabel("Hold order in A at").fill("");
  await page.getByLabel("Hold order in B at").fill("free");
  await page.getByRole("button", { name: "Set orders" }).click();
  await expect(lawInStrip(page)).toHaveText(before);
  await expect(page.getByText("held by hand")).toHaveCount(0);
});

test("what somebody else changes shows on an open page", async ({ page, context }) => {
  await openDemo(page, "rate-law");
  await expect(strip(page)).not.toContainText("[A]½");
  const other = await context.newPage();
  await openDemo(other, "rate-law");
  await other.getByLabel("Hold order in A at").fill("½");
  await other.getByRole("button", { name: "Set orders" }).click();
  await expect(strip(other)).toContainText("[A]½");
  await page.bringToFront();
  await expect(strip(page)).toContainText("[A]½", { timeout: 15_000 });
  await page.getByLabel("Hold order in A at").fill("");
  await page.getByRole("button", { name: "Set orders" }).click();
  await expect(strip(page)).not.toContainText("[A]½");
});

test("no page of these stations is wider than a phone", async ({ page }) => {
  await page.setViewportSize({ width: 390, height: 844 });
  for (const station of ["rates", "rate-law"]) {
    await openDemo(page, station);
    await expect(page.getByRole("heading", { level: 1 })).toBeAttached();
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
  }
});
