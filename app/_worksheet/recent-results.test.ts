import { expect, test } from "vitest";
import { RecentResults } from "./recent-results";

test("askers of one key share one computation, also while it runs", async () => {
  const results = new RecentResults<number>(2);
  let computed = 0;
  const ask = () => results.get("a", async () => ++computed);
  expect(await Promise.all([ask(), ask()])).toEqual([1, 1]);
  expect(await ask()).toBe(1);
});

test("the least recently used result is forgotten first", async () => {
  const results = new RecentResults<string>(2);
  const computed: string[] = [];
  const ask = (key: string) =>
    results.get(key, async () => {
      computed.push(key);
      return key;
    });
  for (const key of ["a", "b", "a", "c", "a", "b"]) await ask(key);
  expect(computed).toEqual(["a", "b", "c", "b"]);
});

test("a failed computation is tried again", async () => {
  const results = new RecentResults<number>(2);
  await expect(results.get("a", () => Promise.reject(new Error("no such trace")))).rejects.toThrow();
  expect(await results.get("a", async () => 7)).toBe(7);
});
