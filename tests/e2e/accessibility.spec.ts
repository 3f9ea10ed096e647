import { readFileSync } from "node:fs";
import path from "node:path";
import { expect, type Page, test } from "@playwright/test";
import { signInToDemoStudy } from "./demo-study";

const AXE = readFileSync(path.resolve(import.meta.dirname, "../../node_modules/axe-core/axe.min.js"), "utf8");

const STATIONS = ["set-up", "runs", "runs/import", "rates", "rate-law", "share"];

/** Rules of axe-core that the page breaks, with the elements; contrast among them. */
async function violationsOf(page: Page): Promise<readonly string[]> {
  // Through the developer tools: the content security policy refuses a foreign script, as it should.
  const cdp = await page.context().newCDPSession(page);
  await cdp.send("Runtime.evaluate", { expression: AXE });
  const { result } = await cdp.send("Runtime.evaluate", {
    awaitPromise: true,
    returnByValue: true,
    expression: `axe.run(document, { resultTypes: ["violations"] }).then((run) =>
      run.violations.flatMap((rule) => rule.nodes.map((node) => rule.id + ": " + node.target)))`,
  });
  await cdp.detach();
  if (!Array.isArray(result.value)) throw new Error(`axe did not answer: ${result.description}`);
  return result.value;
}

for (const { colorScheme, width } of [
  { colorScheme: "light", width: 1440 },
  { colorScheme: "dark", width: 1440 },
  { colorScheme: "light", width: 390 },
  { colorScheme: "dark", width: 390 },
] as const) {
  test.describe(`${colorScheme}, ${width} px wide`, () => {
    test.use({ colorScheme, viewport: { width, height: 900 } });

    test("every station passes axe and fits the screen", async ({ page }) => {
      test.setTimeout(240_000);
      const study = await signInToDemoStudy(page);
      const addresses = ["/studies", "/studies/new", ...STATIONS.map((station) => `${study}/${station}`)];
      for (const address of addresses) {
        await page.goto(address);
        await expect(page.getByRole("heading", { level: 1 })).toBeAttached();
        expect(await violationsOf(page), address).toEqual([]);
        const overflow = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
        expect(overflow, `${address} scrolls sideways`).toBeLessThanOrEqual(0);
      }
    });
  });
}

test("axe would complain: a control without a name is found", async ({ page }) => {
  await page.goto("/sign-in");
  await page.evaluate(() => document.querySelector("main")?.append(document.createElement("button")));
  expect(await violationsOf(page)).toEqual(expect.arrayContaining([expect.stringMatching(/^button-name/)]));
});
