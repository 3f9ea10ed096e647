import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { expect, type Page, test } from "@playwright/test";
import { connect } from "@/db/connect";
import { createShareLink } from "@/db/share-link/share-link.commands";
import { entries } from "../access/entries";
import { browserRun } from "../browser-run";
import { makeNineRunStudy } from "./nine-runs";
import { signIn } from "./signed-in";

/** The plot library is larger than everything else together: who does not explore a figure never fetches it. */

const CHUNKS = path.resolve(import.meta.dirname, "../../.next/static/chunks");

/** Files of the build that hold the plot library, by a name that only it uses: the chunk may be called anything. */
const PLOT_CHUNKS = new Set(
  readdirSync(CHUNKS, { recursive: true, encoding: "utf8" }).filter(
    (file) => file.endsWith(".js") && readFileSync(path.join(CHUNKS, file), "utf8").includes("scatterlayer"),
  ),
);

/** Pages with a figure that can be explored. Every other page there is a file for has none. */
const EXPLORED = ["/studies/[studyId]/runs", "/studies/[studyId]/rate-law", "/share/[token]"];

let addressOf: (route: string) => string;
let email: string;

test.beforeAll(async () => {
  const study = await makeNineRunStudy("plot-chunk");
  email = study.email;
  const db = connect(browserRun().databaseFile);
  const link = await createShareLink(db, study.lead, {
    studyId: study.studyId,
    label: "Explored",
    expiresAt: null,
    frozenRevision: null,
  });
  await db.destroy();
  if (link.status !== "created") throw new Error(`No link was made: ${link.status}.`);
  addressOf = (route) => route.replace("[studyId]", study.studyId).replace("[token]", link.token);
});

/** Addresses of the plot's chunk that the page asked for, in whatever way, each time that it did. */
function plotRequestsOf(page: Page): string[] {
  const requests: string[] = [];
  page.on("request", (request) => {
    const file = request.url().split("/_next/static/chunks/")[1]?.split("?")[0];
    if (file !== undefined && PLOT_CHUNKS.has(file)) requests.push(file);
  });
  return requests;
}

/** Once the page is alive and has fetched ahead what it wants. Pages keep asking for the revision: no idle network. */
async function settle(page: Page): Promise<void> {
  await expect(page.getByRole("heading", { level: 1 })).toBeAttached();
  await page.waitForLoadState("load");
  await page.evaluate(
    () =>
      new Promise<void>((resolve) => {
        requestIdleCallback(() => requestIdleCallback(() => resolve()));
      }),
  );
}

const explore = (page: Page) => page.getByRole("button", { name: "Explore figure" });
const plots = (page: Page) => page.locator(".js-plotly-plot .main-svg");

test("the build keeps the plot in one chunk of its own", () => {
  expect(PLOT_CHUNKS.size).toBe(1);
});

test("no page asks for the plot by itself", async ({ page }) => {
  test.setTimeout(120_000);
  const requests = plotRequestsOf(page);
  const pages = entries().flatMap((entry) => (entry.kind === "page" ? [entry.route] : []));
  expect(pages).toEqual(expect.arrayContaining(EXPLORED));
  await page.goto("/sign-in");
  await settle(page);
  await signIn(page, email);
  for (const route of pages) {
    await page.goto(addressOf(route));
    await settle(page);
    const figures = await explore(page).count();
    // Addresses that lead on show what they lead to.
    const shown = new URL(page.url()).pathname;
    const explored = EXPLORED.some((one) => addressOf(one) === shown);
    expect(figures > 0, `${route} has ${figures} figures to explore`).toBe(explored);
    expect(requests, route).toEqual([]);
  }
});

test("stations ask for it once, at the first figure that is explored", async ({ page }) => {
  await signIn(page, email);
  const requests = plotRequestsOf(page);
  await page.goto(addressOf("/studies/[studyId]/rate-law"));
  await settle(page);
  expect(requests).toEqual([]);
  await explore(page).first().click();
  await expect(plots(page).first()).toBeVisible();
  expect(requests).toHaveLength(1);

  await explore(page).first().click();
  await expect(page.locator(".js-plotly-plot")).toHaveCount(2);
  await page.getByRole("button", { name: "Back to the drawing" }).first().click();
  await explore(page).first().click();
  await expect(page.locator(".js-plotly-plot")).toHaveCount(2);
  await page
    .getByRole("navigation", { name: "Stations of this study" })
    .getByRole("link", { name: /Runs/ })
    .click();
  await expect(page).toHaveURL(/\/runs$/);
  await explore(page).first().click();
  await expect(plots(page).first()).toBeVisible();
  expect(requests).toHaveLength(1);
});

test("the shared page asks for it only once a reader explores a figure", async ({ page }) => {
  const requests = plotRequestsOf(page);
  await page.goto(addressOf("/share/[token]"));
  await settle(page);
  for (const figure of await explore(page).all()) await figure.scrollIntoViewIfNeeded();
  await explore(page).first().hover();
  await settle(page);
  expect(requests).toEqual([]);
  const figures = await explore(page).count();
  for (let left = figures; left > 0; left -= 1) await explore(page).first().click();
  await expect(page.locator(".js-plotly-plot")).toHaveCount(figures);
  await expect(plots(page).first()).toBeVisible();
  expect(requests).toHaveLength(1);
});
