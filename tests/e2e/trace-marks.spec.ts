import { expect, type Locator, type Page, test } from "@playwright/test";
import { DEMO_EMAIL } from "@/db/demo/make-demo";
import { browserRun } from "../browser-run";

/**
 * What a run says of its trace, by hand and by number: time zero, the part that counts, spikes. Every test takes back what it
 * did, since one server stands behind all of them.
 */

async function openRun(page: Page, label: string): Promise<void> {
  await page.goto("/studies");
  if (page.url().includes("/sign-in")) {
    await page.getByLabel("Email address").fill(DEMO_EMAIL);
    await page.getByLabel("Password").fill(browserRun().demoPassword);
    await page.getByRole("button", { name: "Sign in" }).click();
    await expect(page).toHaveURL(/\/studies/);
  }
  const link = page.getByRole("link", { name: /Alkaline hydrolysis/ }).first();
  const study = /\/studies\/[^/]+/.exec((await link.getAttribute("href")) ?? "")?.[0] ?? "";
  await page.goto(`${study}/rates?run=${label}`);
  await expect(page.getByRole("heading", { level: 1 })).toContainText(`${label}: initial rate`);
}

async function rate(page: Page): Promise<number> {
  return Number(await page.getByRole("heading", { level: 1 }).locator("data").getAttribute("value"));
}

const hands = (page: Page, name: string): Locator =>
  page.getByRole("group", { name: "What is moved on the trace" }).getByRole("button", { name });
const toast = (page: Page, text: RegExp): Locator => page.getByText(text).first();

/** Takes back the latest change of this page by the keys for it, which no toast that has gone can hinder. */
async function undo(page: Page): Promise<void> {
  await hands(page, "Window").focus();
  await page.keyboard.press("Control+z");
}

async function drag(page: Page, grip: Locator, by: number, from: "head" | "foot"): Promise<void> {
  const box = await grip.boundingBox();
  if (box === null) throw new Error("the handle is drawn");
  const x = box.x + box.width / 2;
  const y = from === "head" ? box.y + 12 : box.y + box.height - 12;
  await page.mouse.move(x, y);
  await page.mouse.down();
  await page.mouse.move(x + by, y, { steps: 8 });
  await page.mouse.up();
}

test("time zero is dragged, moved by key and typed; the rate follows and undo takes it back", async ({
  page,
}) => {
  await openRun(page, "R04");
  const before = await rate(page);
  await hands(page, "Clock and trim").click();
  const line = page.getByRole("slider", { name: "Time zero" });
  await expect(line).toHaveAttribute("aria-valuenow", "0");

  await drag(page, line, 30, "head");
  await expect(toast(page, /R04 time zero at [1-9]/)).toBeVisible();
  const dragged = Number(await line.getAttribute("aria-valuenow"));
  expect(dragged).toBeGreaterThan(0);
  const box = page.getByLabel("Mixed at");
  await expect(box).toHaveValue(String(dragged));
  await expect.poll(() => rate(page)).not.toBe(before);

  await line.focus();
  await page.keyboard.press("Shift+ArrowRight");
  await expect.poll(async () => Number(await box.inputValue())).toBeGreaterThan(dragged);

  await box.fill("0,8");
  await page.getByRole("button", { name: "Set time zero" }).click();
  await expect(toast(page, /R04 time zero at 0\.8/)).toBeVisible();
  await expect(line).toHaveAttribute("aria-valuenow", "0.8");

  await undo(page);
  await expect(box).not.toHaveValue("0.8");
  await undo(page);
  await expect(box).toHaveValue(String(dragged));
  await undo(page);
  await expect(box).toHaveValue("0");
  await expect.poll(() => rate(page)).toBe(before);
});

test("the ends of the part that counts are dragged and typed, and nothing is deleted", async ({ page }) => {
  await openRun(page, "R05");
  const before = await rate(page);
  await hands(page, "Clock and trim").click();
  await drag(page, page.getByRole("slider", { name: "Counts to" }), -200, "foot");
  await expect(toast(page, /R05 its trace counts from/)).toBeVisible();
  await expect(
    page.getByText("small dots lie in the dead time or outside the part that counts"),
  ).toBeVisible();
  await expect(page.getByRole("textbox", { name: /^Counts to/ })).not.toHaveValue("");

  await page.getByLabel("Dead time").fill("2");
  await page.getByRole("button", { name: "Keep what counts" }).click();
  await expect(toast(page, /R05 dead time 2/)).toBeVisible();
  await expect.poll(() => rate(page)).not.toBe(before);

  await undo(page);
  await expect(page.getByLabel("Dead time")).toHaveValue("0");
  await undo(page);
  await expect(page.getByText("small dots lie in the dead time")).toBeHidden();
  await expect.poll(() => rate(page)).toBe(before);
});

test("a reading is marked by a click and by its time, drawn as a cross, and unmarked from the list", async ({
  page,
}) => {
  await openRun(page, "R06");
  const before = await rate(page);
  await expect(page.getByText("No reading is marked as a spike.")).toBeVisible();

  await page.getByLabel("Reading at").fill("6");
  await page.getByRole("button", { name: "Mark as a spike" }).click();
  await expect(toast(page, /R06 has 1 reading marked as spikes\./)).toBeVisible();
  const list = page.getByRole("list", { name: "Readings marked as spikes" });
  await expect(list.getByRole("listitem")).toHaveCount(1);
  await expect(page.getByText("crosses are marked as spikes")).toBeVisible();
  await expect.poll(() => rate(page)).not.toBe(before);

  // The trace starts at the foot of the plot on the left: somewhere along its left edge there is a reading.
  await hands(page, "Spikes").click();
  const plot = await page.locator(".readings-to-mark").boundingBox();
  if (plot === null) throw new Error("the plot is drawn");
  // One click marks one reading. Its answer is waited for, since a second click before it would mark another.
  for (let up = 6; up < plot.height; up += 18) {
    await page.mouse.click(plot.x + plot.width / 4, plot.y + plot.height - up);
    if (await comesTo(2, list.getByRole("listitem"))) break;
  }
  await expect(list.getByRole("listitem")).toHaveCount(2);

  await list.getByRole("button").last().click();
  await expect(list.getByRole("listitem")).toHaveCount(1);
  await list.getByRole("button").last().click();
  await expect(page.getByText("No reading is marked as a spike.")).toBeVisible();
  await expect.poll(() => rate(page)).toBe(before);
});

test("spikes are looked for, proposed with what they stand off by, and marked as proposed", async ({
  page,
}) => {
  await openRun(page, "R03");
  const before = await rate(page);
  await page.getByRole("button", { name: "Look for spikes" }).click();
  // One of its readings lies four standard deviations off: a person decides.
  await expect(page.getByText(/One reading stands more than 0\.00\d+ off its neighbours\./)).toBeVisible();
  await page.getByRole("button", { name: "Mark this reading" }).click();
  const list = page.getByRole("list", { name: "Readings marked as spikes" });
  await expect(list.getByRole("listitem")).toHaveCount(1);
  await expect.poll(() => rate(page)).not.toBe(before);
  await list.getByRole("button").click();
  await expect(page.getByText("No reading is marked as a spike.")).toBeVisible();
  await expect.poll(() => rate(page)).toBe(before);
});

/** Whether a list has so many entries within two seconds. */
async function comesTo(count: number, entries: Locator): Promise<boolean> {
  for (let waited = 0; waited < 2000; waited += 100) {
    if ((await entries.count()) === count) return true;
    await entries.page().waitForTimeout(100);
  }
  return false;
}
