import { createHash, randomBytes } from "node:crypto";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { type BrowserContext, expect, type Page, test } from "@playwright/test";
import type { Kysely } from "kysely";
import { connect } from "@/db/connect";
import type { Database } from "@/db/database";
import type { Actor } from "@/db/member/actor";
import { readStudy } from "@/db/study/study.queries";
import { makeGroup, TEST_PASSWORD } from "@/db/testing/make-group";
import { makeStudy } from "@/db/testing/make-study";
import { entries } from "../access/entries";
import { Visitor } from "../access/visitor";
import { browserRun } from "../browser-run";
import { sendRaw } from "./raw-request";

/**
 * Every bad input that a bench produces, in the real server through a real browser: a sentence that names the place
 * and the way out, and a study that is as it was before. Files are those of the reader's corpus.
 */

const corpus = path.resolve(import.meta.dirname, "../../app/_import/corpus");
const MEGABYTE = 1024 ** 2;
const STORE = /^Store \d+ traces?$/;

let db: Kysely<Database>;
let analyst: Actor;
let context: BrowserContext;
let visitor: Visitor;
let folder: string;
let studyId: string;

test.beforeAll(async ({ browser }) => {
  const { databaseFile, origin } = browserRun();
  folder = mkdtempSync(path.join(tmpdir(), "ratewright-bad-input-"));
  db = connect(databaseFile);
  const domain = `bad-input-${randomBytes(3).toString("hex")}.example`;
  ({ analyst } = await makeGroup(db, domain));
  visitor = new Visitor(origin);
  expect((await visitor.signIn(`analyst@${domain}`, TEST_PASSWORD)).status).toBe(200);
  context = await browser.newContext();
  await context.addCookies(
    visitor
      .cookieHeader()
      .split("; ")
      .map((pair) => ({
        name: pair.slice(0, pair.indexOf("=")),
        value: pair.slice(pair.indexOf("=") + 1),
        url: origin,
      })),
  );
});

test.afterAll(async () => {
  await context.close();
  await db.destroy();
  rmSync(folder, { recursive: true, force: true });
});

test.beforeEach(async () => {
  studyId = await makeStudy(db, analyst);
});

/** Revision, runs, files of the study and what is on its way in: equal before and after whatever is refused. */
async function stateOfStudy() {
  const study = await readStudy(db, analyst, studyId);
  const arriving = await db
    .selectFrom("incoming_upload")
    .select(["id", "state"])
    .where("study_id", "=", studyId)
    .execute();
  return {
    revision: study?.revision,
    runs: study?.sheet.runs.length,
    files: study?.sheet.uploads.length,
    arriving: arriving.length,
  };
}
const UNTOUCHED = { revision: 1, runs: 0, files: 0, arriving: 0 };

async function importPage(): Promise<Page> {
  const page = await context.newPage();
  await page.goto(`/studies/${studyId}/runs/import`);
  return page;
}

async function choose(page: Page, file: string): Promise<void> {
  await page
    .getByLabel("File of traces")
    .setInputFiles(path.isAbsolute(file) ? file : path.join(corpus, file));
}

const uploads = () => `/api/v1/studies/${studyId}/uploads`;

test.describe("files that cannot be a table", () => {
  for (const [file, sentence] of [
    ["empty.csv", /The file is empty/],
    ["blank-lines.csv", /nothing but blank lines/],
    ["noise.bin", /binary file.*save it as XLSX or CSV/],
    ["cut-off-workbook.xlsx", /workbook cannot be unpacked.*save it again/],
    ["old-workbook.xls", /old format \(XLS\).*Save it as XLSX/],
    ["spectrum.jdx", /JCAMP-DX.*not along time/],
    ["only-text.csv", /No line of numbers was found/],
  ] as const) {
    test(`${file} is refused by a sentence and nothing is stored`, async () => {
      const page = await importPage();
      await choose(page, file);
      await expect(page.getByRole("alert").filter({ hasText: sentence })).toBeVisible();
      await expect(page.getByText(/\bat .*\.(ts|js|mjs):\d+/)).toHaveCount(0);
      await expect(page.getByRole("button", { name: STORE })).toHaveCount(0);
      await expect.poll(stateOfStudy).toEqual(UNTOUCHED);
      await page.close();
    });
  }
});

test.describe("tables with something to settle", () => {
  for (const [file, place, sentence] of [
    ["comma-for-everything.csv", "line 2", /Export again with semicolons or tabs/],
    ["both-marks.csv", "line 2", /decimal comma and .* a decimal point/],
    ["either-mark.csv", "line 2", /can be 1.000 or 1000/],
    ["repeated-times.csv", "line 4", /A trace has one reading at a time/],
    ["falling-times.csv", "line 5", /Time has to rise/],
    ["too-long-lines.csv", "line 3", /4 cells where 3 are expected/],
    ["typing-slip.csv", "line 3, R15", /“0,2l4” is not a number/],
    ["blanks-cell-missing.txt", "line 3", /which of them is missing cannot be seen/],
    ["two-part-clock.csv", "column 1", /hours and minutes or minutes and seconds/],
    ["flag-cells.csv", "line 3", /carry a mark beside the number/],
  ] as const) {
    test(`${file} names ${place} and cannot be stored as it is`, async () => {
      const page = await importPage();
      await choose(page, file);
      const issue = page.getByRole("listitem").filter({ hasText: sentence });
      await expect(issue).toBeVisible();
      await expect(issue).toContainText("Blocks");
      await expect(issue).toContainText(place);
      await expect(page.getByRole("button", { name: STORE })).toBeDisabled();
      await page.getByRole("button", { name: "Discard" }).click();
      await expect(page.getByRole("button", { name: "Choose a file" })).toBeVisible();
      await expect.poll(stateOfStudy).toEqual(UNTOUCHED);
      await page.close();
    });
  }

  test("a column of text is left out by itself, and blocks when it is asked to be a signal", async () => {
    const page = await importPage();
    await choose(page, "column-of-text.csv");
    await expect(page.getByText("“remark” is left out: text, no numbers")).toBeVisible();
    await expect(page.getByRole("button", { name: "Store 1 trace" })).toBeEnabled();
    await page.getByLabel("Column 3").selectOption("signal");
    await expect(page.getByText(/“dry” is not a number/)).toBeVisible();
    await expect(page.getByRole("button", { name: STORE })).toBeDisabled();
    await page.close();
  });

  test("the server refuses to store what the page would not", async () => {
    const sent = await context.request.post(`${uploads()}?fileName=repeated-times.csv`, {
      headers: { Origin: browserRun().origin },
      data: readFileSync(path.join(corpus, "repeated-times.csv")),
    });
    const { uploadId } = await sent.json();
    const action = entries().find(({ key }) => key.endsWith("runs/import/actions.ts#storeTraces"));
    if (action?.kind !== "action") throw new Error("the build knows the action");
    const answer = await visitor.act(`/studies/${studyId}/runs/import`, action.actionId, [
      { studyId, uploadId, base: 1, corrections: {}, recipes: {} },
    ]);
    expect(answer.body).toContain("A trace has one reading at a time");
    expect(answer.body).toContain("Nothing was stored");
    expect(await stateOfStudy()).toEqual({ ...UNTOUCHED, arriving: 1 });
  });
});

test.describe("what is allowed, since the law says what it is worth", () => {
  for (const [file, stored, note] of [
    ["one-run.csv", 1, null],
    ["equal-runs.csv", 3, /All traces hold the very same readings/],
    ["zero-and-falling-signal.csv", 2, null],
    ["nan-and-inf.csv", 2, /word for 'no reading'/],
  ] as const) {
    test(`${file} is stored and the law says what is missing`, async () => {
      const page = await importPage();
      await choose(page, file);
      if (note !== null) await expect(page.getByText(note).first()).toBeVisible();
      await page.getByRole("button", { name: STORE }).click();
      await expect(page).toHaveURL(new RegExp(`/studies/${studyId}/runs$`));
      await expect(page.getByText(/added\./).first()).toBeVisible();
      await expect(page.getByLabel("Standing law")).toContainText("No law");
      expect(await stateOfStudy()).toMatchObject({ revision: 2, runs: stored, files: 1, arriving: 0 });
      await page.close();
    });
  }
});

test("a slip is repaired and stored; the raw file stays as it came; the same bytes are noticed", async () => {
  const page = await importPage();
  await choose(page, "typing-slip.csv");
  await page.getByRole("button", { name: "Read as 0.214" }).click();
  await expect(page.getByText("Read as 0.214, by hand")).toBeVisible();
  // A block from a spreadsheet, pasted into the first concentration.
  await page.getByRole("gridcell").nth(1).click();
  await page.evaluate(() => {
    const data = new DataTransfer();
    data.setData("text/plain", "0,5\t10\r\n1,0\t10\r\n");
    document.activeElement?.dispatchEvent(
      new ClipboardEvent("paste", { clipboardData: data, bubbles: true, cancelable: true }),
    );
  });
  await page.getByRole("button", { name: "Store 2 traces" }).click();
  await expect(page).toHaveURL(new RegExp(`/studies/${studyId}/runs$`));

  const study = await readStudy(db, analyst, studyId);
  const [first, second] = study?.sheet.runs ?? [];
  expect(first).toMatchObject({ label: "R13", concentrations: { a: { molar: 0.0005 }, c: { molar: 0.01 } } });
  expect(second).toMatchObject({
    label: "R15",
    trace: { points: 4 },
    concentrations: { a: { molar: 0.001 } },
  });
  const file = study?.sheet.uploads[0];
  const bytes = readFileSync(path.join(corpus, "typing-slip.csv"));
  expect(file?.sha256).toBe(createHash("sha256").update(bytes).digest("hex"));
  const back = await context.request.get(`${uploads()}/${file?.id}`);
  expect(Buffer.compare(await back.body(), bytes)).toBe(0);

  await page.goto(`/studies/${studyId}/runs/import`);
  await choose(page, "typing-slip.csv");
  await expect(page.getByText("already stored as R13, R15")).toBeVisible();
  await page.getByRole("button", { name: "Discard" }).click();
  await expect.poll(stateOfStudy).toMatchObject({ revision: 2, runs: 2, files: 1, arriving: 0 });
  await page.close();
});

test("a paste is read and kept as the clipboard gave it, line ends and all", async () => {
  const page = await importPage();
  const clipboard = "t / s\tR1\r\n0\t0,010\r\n1\t0,015\r\n2\t0,019\r\n";
  await page.getByLabel("Or paste cells").focus();
  await page.evaluate((text) => {
    const data = new DataTransfer();
    data.setData("text/plain", text);
    const box = document.activeElement;
    if (!(box instanceof HTMLTextAreaElement)) throw new Error("the box has the focus");
    // What the browser does with a paste: the event first, then the text with its line ends made one kind.
    box.dispatchEvent(new ClipboardEvent("paste", { clipboardData: data, bubbles: true, cancelable: true }));
    document.execCommand("insertText", false, text);
  }, clipboard);
  await page.getByRole("button", { name: "Read the pasted cells" }).click();
  await page.getByRole("button", { name: "Store 1 trace" }).click();
  await expect(page).toHaveURL(new RegExp(`/studies/${studyId}/runs$`));
  const study = await readStudy(db, analyst, studyId);
  expect(study?.sheet.uploads[0]?.sha256).toBe(createHash("sha256").update(clipboard).digest("hex"));
  await page.close();
});

test("a file over 50 MB is refused in the page before it is sent", async () => {
  const page = await importPage();
  const file = path.join(folder, "large.csv");
  writeFileSync(file, Buffer.alloc(60 * MEGABYTE, "1"));
  await choose(page, file);
  await expect(page.getByRole("alert").filter({ hasText: /60.MB; at most 50.MB can be read/ })).toBeVisible();
  expect(await stateOfStudy()).toEqual(UNTOUCHED);
  await page.close();
});

test("an upload is stopped half-way and leaves nothing", async () => {
  const page = await importPage();
  const file = path.join(folder, "slow.csv");
  writeFileSync(file, Buffer.alloc(20 * MEGABYTE, "1,2\n"));
  const devtools = await context.newCDPSession(page);
  await devtools.send("Network.emulateNetworkConditions", {
    offline: false,
    latency: 0,
    downloadThroughput: -1,
    uploadThroughput: 2 * MEGABYTE,
  });
  await choose(page, file);
  await expect(page.getByText(/MB of 21\.0.MB sent/)).toBeVisible();
  await page.getByRole("button", { name: "Stop" }).click();
  await expect(page.getByRole("button", { name: "Choose a file" })).toBeVisible();
  await expect.poll(stateOfStudy).toEqual(UNTOUCHED);
  await page.close();
});

test("60 MB get a 413 with a sentence, with and without a declared length, and leave nothing", async () => {
  const pieces = function* () {
    for (let sent = 0; sent < 60; sent++) yield Buffer.alloc(MEGABYTE, "1");
  };
  for (const length of ["declared", "not declared"] as const) {
    const answer = await sendRaw({
      origin: browserRun().origin,
      path: `${uploads()}?fileName=large.csv`,
      headers: {
        Cookie: visitor.cookieHeader(),
        ...(length === "declared"
          ? { "Content-Length": String(60 * MEGABYTE) }
          : { "Transfer-Encoding": "chunked" }),
      },
      pieces: pieces(),
    });
    expect(answer.status, length).toBe(413);
    expect(answer.body, length).toMatch(/at most 50.MB can be read. Split it/);
    expect(await stateOfStudy(), length).toEqual(UNTOUCHED);
  }
});

test("a file that breaks off is not kept", async () => {
  await sendRaw({
    origin: browserRun().origin,
    path: `${uploads()}?fileName=half.csv`,
    headers: { Cookie: visitor.cookieHeader(), "Content-Length": "1000" },
    pieces: [Buffer.alloc(500, "1")],
    hangUp: true,
  });
  await expect.poll(stateOfStudy).toEqual(UNTOUCHED);
});

test("30 MB are taken and come back with equal SHA-256", async () => {
  const bytes = randomBytes(15_000_000).toString("hex");
  const sha256 = createHash("sha256").update(bytes).digest("hex");
  const { origin } = browserRun();
  const sent = await context.request.post(`${uploads()}?fileName=thirty.csv`, {
    headers: { Origin: origin, "Content-Type": "application/octet-stream" },
    data: Buffer.from(bytes),
  });
  expect(sent.status()).toBe(201);
  const { uploadId, size, ...rest } = await sent.json();
  expect({ size, sha256: rest.sha256 }).toEqual({ size: 30_000_000, sha256 });
  const back = await context.request.get(`${uploads()}/${uploadId}`);
  expect(
    createHash("sha256")
      .update(await back.body())
      .digest("hex"),
  ).toBe(sha256);
  expect(back.headers()["repr-digest"]).toBe(`sha-256=:${Buffer.from(sha256, "hex").toString("base64")}:`);
  expect(
    (await context.request.delete(`${uploads()}/${uploadId}`, { headers: { Origin: origin } })).status(),
  ).toBe(204);
  expect(await stateOfStudy()).toEqual(UNTOUCHED);
});

test("on a phone nothing runs off the page, and a reload finds the waiting file", async () => {
  const page = await importPage();
  await page.setViewportSize({ width: 390, height: 844 });
  await choose(page, "recipes.csv");
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("Three traces read, nothing to settle");
  expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
  await page.reload();
  await expect(page.getByRole("heading", { level: 1 })).toHaveText("Three traces read, nothing to settle");
  await page.getByRole("button", { name: "Choose another file" }).click();
  await expect(page.getByRole("button", { name: "Choose a file" })).toBeVisible();
  await expect.poll(stateOfStudy).toEqual(UNTOUCHED);
  await page.close();
});
