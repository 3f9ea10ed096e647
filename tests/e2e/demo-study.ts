import { expect, type Page } from "@playwright/test";
import { DEMO_EMAIL } from "@/db/demo/make-demo";
import { browserRun } from "../browser-run";

/** Signs in with the demo account and gives the address of its invented study, "/studies/…". */
export async function signInToDemoStudy(page: Page): Promise<string> {
  await page.goto("/sign-in");
  await page.getByLabel("Email address").fill(DEMO_EMAIL);
  await page.getByLabel("Password").fill(browserRun().demoPassword);
  await page.getByRole("button", { name: "Sign in" }).click();
  await expect(page).toHaveURL(/\/studies$/);
  const link = page.getByRole("link", { name: /Alkaline hydrolysis/ }).first();
  const study = /\/studies\/[^/]+/.exec((await link.getAttribute("href")) ?? "")?.[0];
  if (study === undefined) throw new Error("The list of studies does not link to the demo study.");
  return study;
}
