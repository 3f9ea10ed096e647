import { expect, test } from "@playwright/test";
import { DEMO_EMAIL } from "@/db/demo/make-demo";
import { browserRun } from "../browser-run";

test("signs in with the demo account, lands where it wanted to go, and signs out", async ({ page }) => {
  await page.goto("/studies/new");
  await expect(page).toHaveURL(/\/sign-in\?to=%2Fstudies%2Fnew$/);
  await page.getByLabel("Email address").fill(DEMO_EMAIL);
  await page.getByLabel("Password").fill(browserRun().demoPassword);
  await page.getByRole("button", { name: "Sign in" }).click();
  await expect(page).toHaveURL(/\/studies\/new$/);

  await page.getByLabel(/^Signed in as/).click();
  await page.getByRole("button", { name: "Sign out", exact: true }).click();
  await expect(page).toHaveURL(/\/sign-in/);
  await page.goto("/studies/new");
  await expect(page).toHaveURL(/\/sign-in/);
});

test("says what was wrong in the form, and keeps the address that was typed", async ({ page }) => {
  await page.goto("/sign-in");
  await page.getByLabel("Email address").fill("nobody@demo.example");
  await page.getByLabel("Password").fill("not the password");
  await page.getByRole("button", { name: "Sign in" }).click();
  await expect(page.getByText("do not belong together")).toBeVisible();
  await expect(page.getByLabel("Email address")).toHaveValue("nobody@demo.example");
  await expect(page).toHaveURL(/\/sign-in$/);
});

test("draws the sign-in page and the page for nothing without breaking the policy", async ({ page }) => {
  const violations: string[] = [];
  page.on("console", (message) => {
    if (/content security policy/i.test(message.text())) {
      violations.push(message.text());
    }
  });
  for (const path of ["/sign-in", "/no-such-page"]) {
    await page.goto(path);
    await expect(page.getByRole("heading", { level: 1 })).toBeVisible();
  }
  expect(violations).toEqual([]);
});
