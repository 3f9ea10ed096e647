import { afterAll, beforeAll, expect, test } from "vitest";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { keepAnalyses } from "./analysis.commands";
import { readAnalyses } from "./analysis.queries";

let temporary: TemporaryDatabase;

beforeAll(async () => {
  temporary = await temporaryDatabase();
});

afterAll(() => temporary.close());

test("a kept result comes back to the last bit, for its own version of the library alone", async () => {
  const { db } = temporary;
  const result = { slope: 0.1 + 0.2, flags: [] };
  await keepAnalyses(db, "v1", [{ hash: "a", kind: "rate", result }]);
  expect((await readAnalyses(db, "v1", ["a", "b"])).get("a")).toEqual(result);
  expect((await readAnalyses(db, "v2", ["a"])).size).toBe(0);
});

test("keeping twice is harmless, and a new version drops what the old one made", async () => {
  const { db } = temporary;
  await keepAnalyses(db, "v1", [{ hash: "a", kind: "rate", result: 1 }]);
  await keepAnalyses(db, "v2", [{ hash: "c", kind: "rate", result: 2 }]);
  const rows = await db.selectFrom("analysis").select("hash").execute();
  expect(rows).toEqual([{ hash: "c" }]);
});
