import { expect, type Page, test } from "@playwright/test";
import { signInToDemoStudy } from "./demo-study";

function policyViolations(page: Page): string[] {
  const violations: string[] = [];
  page.on("console", (message) => {
    if (/content security policy/i.test(message.text())) violations.push(message.text());
  });
  return violations;
}

test("the plot zooms, goes back, hovers and downloads inside the content security policy", async ({
  page,
}) => {
  const study = await signInToDemoStudy(page);
  const violations = policyViolations(page);
  await page.goto(`${study}/runs`);
  await page.getByRole("button", { name: "Explore figure" }).first().click();
  const plot = page.locator(".js-plotly-plot").first();
  const ticks = plot.locator(".xtick text");
  await expect(ticks.first()).toBeVisible();
  const before = await ticks.allTextContents();

  const box = await plot.boundingBox();
  if (box === null) throw new Error("the plot is drawn");
  await page.mouse.move(box.x + box.width * 0.3, box.y + box.height * 0.6);
  await page.mouse.down();
  await page.mouse.move(box.x + box.width * 0.5, box.y + box.height * 0.75, { steps: 6 });
  await page.mouse.up();
  await expect.poll(() => ticks.allTextContents()).not.toEqual(before);
  await page.mouse.move(box.x + box.width * 0.5, box.y + box.height * 0.5);
  await plot.locator('[data-title="Reset axes"]').click();
  await expect.poll(() => ticks.allTextContents()).toEqual(before);

  const download = page.waitForEvent("download");
  await plot.locator('[data-title^="Download plot"]').click();
  expect((await download).suggestedFilename()).toBe("figure.svg");

  await page.getByRole("button", { name: "Back to the drawing" }).first().click();
  await expect(page.getByRole("img", { name: /trace/i }).first()).toBeVisible();
  expect(violations).toEqual([]);
});

test("the theme follows the system, then the person, from the first paint on", async ({ page }) => {
  const study = await signInToDemoStudy(page);
  const desk = () => page.evaluate(() => getComputedStyle(document.documentElement).backgroundColor);
  const [light, dark] = ["rgb(237, 240, 234)", "rgb(11, 15, 14)"];
  await page.emulateMedia({ colorScheme: "light" });
  await page.goto(`${study}/runs`);
  expect(await desk()).toBe(light);
  await page.emulateMedia({ colorScheme: "dark" });
  expect(await desk()).toBe(dark);

  await page.getByLabel(/^Signed in as/).click();
  await page.getByLabel("Appearance").selectOption("light");
  expect(await desk()).toBe(light);
  const response = await page.request.get(`${study}/runs`);
  expect(await response.text()).toMatch(/<html[^>]* data-theme="light"/);
  await page.reload();
  expect(await desk()).toBe(light);
  await page.emulateMedia({ media: "print" });
  expect(await desk()).toBe("rgb(255, 255, 255)");
});
