import { readFileSync } from "node:fs";
import path from "node:path";
import { expect, type Page, test } from "@playwright/test";
import { connect } from "@/db/connect";
import { createShareLink } from "@/db/share-link/share-link.commands";
import { browserRun } from "../browser-run";
import { signInToDemoStudy } from "./demo-study";
import { makeNineRunStudy, NINE_RUNS_FILE } from "./nine-runs";

const AXE = readFileSync(path.resolve(import.meta.dirname, "../../node_modules/axe-core/axe.min.js"), "utf8");

const STATIONS = [
  "set-up",
  "standards",
  "runs",
  "runs?edit",
  "runs/import",
  "runs/mixing",
  "runs/bench-sheet",
  "rates",
  "rate-law",
  "share",
];

let sharedPage: string;

test.beforeAll(async () => {
  const study = await makeNineRunStudy("accessibility");
  const db = connect(browserRun().databaseFile);
  const link = await createShareLink(db, study.lead, {
    studyId: study.studyId,
    label: "For axe",
    expiresAt: null,
    frozenRevision: null,
  });
  await db.destroy();
  if (link.status !== "created") throw new Error(`No link was made: ${link.status}.`);
  sharedPage = `/share/${link.token}`;
});

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

async function expectAccessible(page: Page, what: string): Promise<void> {
  // An open dialog hides what lies behind it from the tree, headings too.
  await expect(page.locator("h1")).toBeAttached();
  expect(await violationsOf(page), what).toEqual([]);
  const overflow = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
  expect(overflow, `${what} scrolls sideways`).toBeLessThanOrEqual(0);
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
      for (const address of [
        "/studies",
        "/studies/new",
        ...STATIONS.map((station) => `${study}/${station}`),
      ]) {
        await page.goto(address);
        await expectAccessible(page, address);
      }
      // Where the import page and the run sheet ask something back.
      await page.goto(`${study}/runs/import`);
      await page.getByLabel("File of traces").setInputFiles(NINE_RUNS_FILE);
      await expect(page.getByRole("button", { name: "Store 9 traces" })).toBeVisible();
      await expectAccessible(page, "the preview of a file");
      await page.getByRole("button", { name: "Discard" }).click();
      await page.goto(`${study}/runs`);
      await page.getByRole("checkbox", { name: "Select R03" }).check();
      await page.getByRole("button", { name: "Set aside…" }).click();
      await expect(page.getByRole("dialog").getByText("Then", { exact: true })).toBeVisible();
      await expectAccessible(page, "the question before a run is set aside");
    });

    test("what is seen without an account passes axe and fits the screen", async ({ page }) => {
      for (const address of ["/sign-in", sharedPage, "/share/closed"]) {
        await page.goto(address);
        await expectAccessible(page, address);
      }
    });
  });
}

test("axe would complain: a control without a name is found", async ({ page }) => {
  await page.goto("/sign-in");
  // A page that comes to life meanwhile throws out what it does not know, so the button is put in anew for each look.
  await expect
    .poll(async () => {
      await page.evaluate(() => document.querySelector("main")?.append(document.createElement("button")));
      return violationsOf(page);
    })
    .toEqual(expect.arrayContaining([expect.stringMatching(/^button-name/)]));
});
