import { afterAll, beforeAll, expect, test } from "vitest";
import { makeGroup } from "../testing/make-group";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { recallLayout, rememberLayout } from "./import-layout";

let temporary: TemporaryDatabase;

beforeAll(async () => {
  temporary = await temporaryDatabase();
});
afterAll(() => temporary.close());

const headingHash = "a".repeat(64);

test("a group remembers its latest reading of a heading, and no other group hears of it", async () => {
  const { db } = temporary;
  const { analyst, reader } = await makeGroup(db);
  const { lead: outsider } = await makeGroup(db, "elsewhere.example");
  await rememberLayout(db, analyst, { headingHash, corrections: { timeUnit: "min" }, fileName: "one.csv" });
  await rememberLayout(db, analyst, { headingHash, corrections: { timeUnit: "h" }, fileName: "two.csv" });
  expect(await recallLayout(db, reader, headingHash)).toMatchObject({
    corrections: { timeUnit: "h" },
    fileName: "two.csv",
  });
  expect(await recallLayout(db, outsider, headingHash)).toBeUndefined();
  expect(await recallLayout(db, analyst, "b".repeat(64))).toBeUndefined();
});

test("a reader's wish to remember changes nothing", async () => {
  const { db } = temporary;
  const { analyst, reader } = await makeGroup(db, "readers.example");
  await rememberLayout(db, reader, { headingHash, corrections: { timeUnit: "min" }, fileName: "one.csv" });
  expect(await recallLayout(db, analyst, headingHash)).toBeUndefined();
});
