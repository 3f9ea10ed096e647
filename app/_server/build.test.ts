import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";
import { afterEach, beforeEach, expect, test } from "vitest";
import { hashOfSources } from "./build";

let folder: string;

beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), "ratewright-sources-"));
  write("app/(bench)/page.tsx", "one");
  write("package.json", "{}");
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

function write(file: string, content: string): void {
  mkdirSync(path.dirname(path.join(folder, file)), { recursive: true });
  writeFileSync(path.join(folder, file), content);
}

test("the hash follows the content, the name and the place of every source", () => {
  const hashes = [hashOfSources(folder)];
  write("app/(bench)/page.tsx", "two");
  hashes.push(hashOfSources(folder));
  write("app/(bench)/view.ts", "");
  hashes.push(hashOfSources(folder));
  write("pnpm-lock.yaml", "lock");
  hashes.push(hashOfSources(folder));
  expect(new Set(hashes).size).toBe(4);
});

test("what no build is made of leaves the hash as it is", () => {
  const before = hashOfSources(folder);
  write("app/(bench)/view.test.ts", "test");
  write("tests/e2e/walk.spec.ts", "test");
  write("README.md", "read me");
  write("data/ratewright.sqlite", "rows");
  write("packages/kinetics-core/node_modules/x/index.js", "x");
  expect(hashOfSources(folder)).toBe(before);
});

test("the same sources give the same hash again", () => {
  expect(hashOfSources(folder)).toBe(hashOfSources(folder));
});
