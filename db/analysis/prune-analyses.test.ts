import { expect, test } from "vitest";
import { temporaryDatabase } from "../testing/temporary-database";
import { keepAnalyses } from "./analysis.commands";
import { pruneAnalyses } from "./prune-analyses";

test("pruning removes the oldest results first, until what is left fits", async () => {
  const { db, close } = await temporaryDatabase();
  try {
    // Each result is 12 bytes of JSON: ten characters in quotes.
    for (let day = 1; day <= 5; day++) {
      const at = new Date(`2026-03-0${day}T00:00:00.000Z`);
      await keepAnalyses(db, "v1", [{ hash: `h${day}`, kind: "rate", result: "0123456789" }], at);
    }
    expect(await pruneAnalyses(db, 30)).toBe(3);
    const left = await db.selectFrom("analysis").select("hash").orderBy("hash").execute();
    expect(left.map((row) => row.hash)).toEqual(["h4", "h5"]);
    expect(await pruneAnalyses(db, 30)).toBe(0);
  } finally {
    await close();
  }
});
