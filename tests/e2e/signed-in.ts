import { expect, type Page } from "@playwright/test";
import { TEST_PASSWORD } from "@/db/testing/make-group";

/** Through the sign-in page, as a person does. Ends on the list of studies. */
export async function signIn(page: Page, email: string, password = TEST_PASSWORD): Promise<void> {
  await page.goto("/sign-in");
  await page.getByLabel("Email address").fill(email);
  await page.getByLabel("Password").fill(password);
  await page.getByRole("button", { name: "Sign in" }).click();
  await expect(page).toHaveURL(/\/studies$/);
}
