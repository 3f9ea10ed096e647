import { expect, test } from "vitest";
import { type LinkClick, leavingAddress } from "./leaving-link";

const HERE = "https://bench.example/studies/s1/set-up";

function click(href: string, rest: Partial<LinkClick> = {}): string | null {
  return leavingAddress({ button: 0, modified: false, href, target: "", download: false, ...rest }, HERE);
}

test("a link of the rail or the head leaves the page", () => {
  expect(click("/studies/s1/runs?edit#run-1")).toBe("/studies/s1/runs?edit#run-1");
  expect(click("https://bench.example/studies", { target: "_self" })).toBe("/studies");
});

test("the page stays for another tab, a download, a place on it, and a link that leads nowhere", () => {
  expect(click("/studies", { modified: true })).toBeNull();
  expect(click("/studies", { button: 1 })).toBeNull();
  expect(click("/studies", { target: "_blank" })).toBeNull();
  expect(click("/studies/s1/runs.csv", { download: true })).toBeNull();
  expect(click("#main")).toBeNull();
  expect(click("http://")).toBeNull();
});

test("another site is the browser's to ask about", () => {
  expect(click("https://elsewhere.example/")).toBeNull();
});
