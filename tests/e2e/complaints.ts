import type { Page } from "@playwright/test";

/** What the page complained about since it was watched: errors on its console, exceptions, refusals of the policy. */
export function complaintsOf(page: Page): string[] {
  const complaints: string[] = [];
  page.on("console", (message) => {
    if (message.type() === "error" || /content security policy/i.test(message.text())) {
      complaints.push(`${message.text()} (${message.location().url})`);
    }
  });
  page.on("pageerror", (error) => complaints.push(`uncaught: ${error.message}`));
  return complaints;
}
