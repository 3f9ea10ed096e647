import { expect, test } from "@playwright/test";
import { connect } from "@/db/connect";
import { browserRun } from "../browser-run";
import { Visitor } from "./visitor";
import { makeWorld } from "./world";

const { databaseFile, origin } = browserRun();
/** A line of a stack, a path of the server, or the class of an error. */
const LEAK =
  /^\s*at .+:\d+:\d+\)?$|node_modules|\.next\/server|\.tsx?:\d|file:\/\/|\b(Type|Syntax|Range|Sqlite|Zod)Error\b/m;
const visitor = new Visitor(origin);

function nonceOf(policy: string | null): string | undefined {
  return /script-src [^;]*'nonce-([A-Za-z0-9+/]{22}==)'/.exec(policy ?? "")?.[1];
}

test.describe("the content security policy", () => {
  for (const path of ["/sign-in", "/no-such-page", "/icons", "/share/unknown", "/studies"]) {
    test(`stands on ${path} with a nonce of its own for each response`, async () => {
      const [first, second] = [await visitor.send(path), await visitor.send(path)];
      const policy = first.headers.get("content-security-policy");
      const nonce = nonceOf(policy);
      expect(nonce).toBeDefined();
      expect(nonceOf(second.headers.get("content-security-policy"))).not.toBe(nonce);
      expect(policy).toContain("default-src 'self'");
      expect(policy).toContain("frame-ancestors 'none'");
      expect(policy).not.toMatch(/script-src[^;]*'unsafe/);
    });
  }

  test("covers every script of a page with its nonce", async () => {
    const { headers, body } = await visitor.send("/sign-in");
    const nonce = nonceOf(headers.get("content-security-policy"));
    const scripts = body.match(/<script\b[^>]*>/g) ?? [];
    expect(scripts.length).toBeGreaterThan(3);
    expect(scripts.filter((script) => !script.includes(`nonce="${nonce}"`))).toEqual([]);
  });

  test("does not take its nonce from the request", async () => {
    const sent = {
      "x-nonce": "AAAAAAAAAAAAAAAAAAAAAA==",
      "Content-Security-Policy": "script-src 'nonce-AAAA'",
    };
    const { headers, body } = await visitor.send("/sign-in", { headers: sent });
    expect(headers.get("content-security-policy")).not.toContain("AAAA");
    expect(body).not.toContain("AAAAAAAA");
  });
});

test("a shared page sends no Referer and wants not to be found", async () => {
  const { headers } = await visitor.send("/share/unknown");
  expect(headers.get("referrer-policy")).toBe("no-referrer");
  expect(headers.get("x-robots-tag")).toBe("noindex, nofollow");
});

test("the icon is also where browsers look for it by themselves", async () => {
  const icon = await visitor.send("/favicon.ico");
  expect(icon.status).toBe(200);
  expect(icon.headers.get("content-type")).toBe("image/svg+xml");
});

test("no answer says what the server is made with", async () => {
  const { headers } = await visitor.send("/sign-in");
  expect(headers.get("x-powered-by")).toBeNull();
  expect(headers.get("server")).toBeNull();
});

test("no answer to bad input carries a stack trace, a file name or an error's class", async () => {
  const json = { "Content-Type": "application/json" };
  const requests: [string, Parameters<Visitor["send"]>[1]][] = [
    ["/studies/%E0%A4%A", {}],
    ["/studies/%00", {}],
    [`/studies/${"x".repeat(4000)}`, {}],
    ["/sign-in?to=%FF&to=b", {}],
    ["/share/%2e%2e%2f", {}],
    ["/sign-in", { method: "POST", headers: { "Next-Action": "not-an-action" }, body: "[]" }],
    ["/sign-in", { method: "POST", headers: { "Next-Action": "7f".repeat(21) }, body: "[" }],
    [
      "/sign-in",
      { method: "POST", headers: { "Content-Type": "multipart/form-data; boundary=x" }, body: "--x" },
    ],
    ["/sign-in", { headers: { RSC: "1", "Next-Router-State-Tree": "%7Bnot json" } }],
    ["/api/auth/callback/credentials", { method: "POST", headers: json, body: "{" }],
    ["/api/auth/callback/nowhere", {}],
    ["/api/auth/session", { headers: { Cookie: "ratewright-session=x" } }],
    ["/api/v1/no-such-thing", { method: "POST", headers: json, body: "{" }],
    ["/api/health", { method: "DELETE" }],
  ];
  for (const [path, init] of requests) {
    const { status, body } = await visitor.send(path, init);
    const what = `${init?.method ?? "GET"} ${path.slice(0, 60)} answered ${status}`;
    expect(body, what).not.toMatch(LEAK);
  }
});

test("a page that fails says so with a reference, and keeps the error in the log", async () => {
  const { studyId, insider, marker } = await makeWorld("failing");
  const db = connect(databaseFile);
  // A row that no command can have written: reading it throws.
  await db
    .updateTable("study")
    .set({ updated_at: `broken ${marker}` })
    .where("id", "=", studyId)
    .execute();
  await db.destroy();
  const { status, body } = await insider.send(`/studies/${studyId}/set-up`);
  expect(status).toBe(500);
  expect(body).not.toContain(marker);
  expect(body).not.toMatch(LEAK);
});
