import { expect, test } from "vitest";
import { contentHash } from "./content-hash";

test("the order of keys and absent members do not change the hash, values do", () => {
  expect(contentHash({ a: 1, b: [1, { c: null }] })).toBe(
    contentHash({ b: [1, { c: null }], a: 1, d: undefined }),
  );
  expect(contentHash({ a: 1 })).not.toBe(contentHash({ a: 2 }));
  expect(contentHash([1, 2])).not.toBe(contentHash([2, 1]));
  expect(contentHash({ a: "1" })).not.toBe(contentHash({ a: 1 }));
  expect(contentHash({ a: null })).not.toBe(contentHash({}));
});
