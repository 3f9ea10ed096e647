import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterAll, expect, test } from "vitest";

const folder = mkdtempSync(path.join(tmpdir(), "ratewright-limits-"));
// Read when the module loads, hence before its import.
process.env.DATABASE_FILE = path.join(folder, "unused.sqlite");
const { resetLimit, takeFromLimit } = await import("./rate-limit");

afterAll(() => rmSync(folder, { recursive: true, force: true }));

async function take(times: number, name: "signIn" | "api", key: string): Promise<(number | null)[]> {
  const answers: (number | null)[] = [];
  for (let i = 0; i < times; i++) {
    answers.push(await takeFromLimit(name, key));
  }
  return answers;
}

test("ten attempts to sign in are free, the next has to wait up to a quarter of an hour", async () => {
  const answers = await take(11, "signIn", "an@group.example");
  expect(answers.slice(0, 10)).toEqual(Array(10).fill(null));
  expect(answers[10]).toBeGreaterThan(890);
  expect(answers[10]).toBeLessThanOrEqual(900);
});

test("each account and each limit is counted by itself", async () => {
  expect(await takeFromLimit("signIn", "other@group.example")).toBeNull();
  expect(await takeFromLimit("api", "an@group.example")).toBeNull();
});

test("a reset starts anew", async () => {
  await take(11, "signIn", "ld@group.example");
  await resetLimit("signIn", "ld@group.example");
  expect(await takeFromLimit("signIn", "ld@group.example")).toBeNull();
});

test("calls of the API are refused from the three thousand and first in a minute", async () => {
  const answers = await take(3001, "api", "member-1");
  expect(answers.filter((answer) => answer !== null)).toHaveLength(1);
  expect(answers[3000]).toBeLessThanOrEqual(60);
});
