import { randomBytes } from "node:crypto";
import { expect, test } from "@playwright/test";
import { strToU8 } from "fflate";
import { testRows, testWorkbook } from "@/app/_import/workbook/testing-workbook";
import { connect } from "@/db/connect";
import { readStudy } from "@/db/study/study.queries";
import { makeGroup } from "@/db/testing/make-group";
import { makeStudy } from "@/db/testing/make-study";
import { browserRun } from "../browser-run";
import { complaintsOf } from "./complaints";
import { signIn } from "./signed-in";

/** Files that are no plain text, and a layout that is remembered, from the file dialog to the stored runs. */

const WORKBOOK = testWorkbook([
  { name: "Notes", rows: testRows([["pilot batch"]]) },
  {
    name: "Morning",
    rows: testRows([
      ["t / s", "R1", "R2"],
      [0, 0.01, 0.02],
      [1, 0.015, 0.031],
      [2, 0.019, 0.04],
      [3, 0.022, 0.048],
    ]),
  },
  {
    name: "Afternoon",
    rows: testRows([
      ["t / s", "R7"],
      [0, 0.1],
      [1, 0.15],
      [2, 0.19],
      [3, 0.22],
    ]),
  },
]);

const TWO_PARTS = "clock,R1\n00:00,0.010\n00:30,0.015\n01:15,0.019\n02:00,0.022\n";

const file = (name: string, bytes: Uint8Array) => ({
  name,
  mimeType: "application/octet-stream",
  buffer: Buffer.from(bytes),
});

test("a workbook's sheet is chosen and stored, and a heading that was explained once is offered again", async ({
  page,
}) => {
  const db = connect(browserRun().databaseFile);
  try {
    const domain = `formats-${randomBytes(3).toString("hex")}.example`;
    const { analyst } = await makeGroup(db, domain);
    const studyId = await makeStudy(db, analyst);
    const complaints = complaintsOf(page);
    await signIn(page, `analyst@${domain}`);

    await page.goto(`/studies/${studyId}/runs/import`);
    await page.getByLabel("File of traces").setInputFiles(file("batch.xlsx", WORKBOOK));
    await expect(page.getByLabel("Sheet")).toHaveValue("Morning");
    await expect(page.getByRole("button", { name: "Store 2 traces" })).toBeEnabled();
    await expect(page.getByLabel("Separator")).toHaveCount(0);
    await page.getByLabel("Sheet").selectOption("Afternoon");
    await page.getByRole("button", { name: "Store 1 trace" }).click();
    await expect(page).toHaveURL(/\/runs$/);
    const stored = await readStudy(db, analyst, studyId);
    expect(stored?.sheet.runs.map(({ label, trace }) => [label, trace?.points])).toEqual([["R7", 4]]);
    expect(stored?.sheet.uploads.map(({ fileName, size }) => [fileName, size])).toEqual([
      ["batch.xlsx", WORKBOOK.length],
    ]);

    await page.goto(`/studies/${studyId}/runs/import`);
    await page.getByLabel("File of traces").setInputFiles(file("first.csv", strToU8(TWO_PARTS)));
    await page.getByRole("button", { name: "Read as minutes and seconds" }).click();
    await page.getByRole("button", { name: "Store 1 trace" }).click();
    await expect(page).toHaveURL(/\/runs$/);

    await page.goto(`/studies/${studyId}/runs/import`);
    // The heading is the same, the readings are others.
    const second = TWO_PARTS.replace("02:00", "03:00").replace("0.022", "0.024");
    await page.getByLabel("File of traces").setInputFiles(file("second.csv", strToU8(second)));
    await expect(page.getByText("This heading was read before")).toBeVisible();
    await expect(page.getByRole("button", { name: "Read as minutes and seconds" })).toBeVisible();
    await page.getByRole("button", { name: "Read it the same way" }).click();
    await expect(page.getByText("This heading was read before")).toBeHidden();
    await expect(page.getByRole("button", { name: "Read as minutes and seconds" })).toBeHidden();
    expect(complaints).toEqual([]);
  } finally {
    await db.destroy();
  }
});
