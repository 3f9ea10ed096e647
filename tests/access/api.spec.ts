import { randomBytes } from "node:crypto";
import { expect, test } from "@playwright/test";
import { connect } from "@/db/connect";
import type { Actor } from "@/db/member/actor";
import { makeGroup, TEST_PASSWORD } from "@/db/testing/make-group";
import { createToken, revokeToken } from "@/db/token/token.commands";
import { browserRun } from "../browser-run";
import { Visitor } from "./visitor";

const { databaseFile, origin } = browserRun();
const db = connect(databaseFile);
const domain = `api-${randomBytes(3).toString("hex")}.example`;
const PATH = "/api/v1/compute/rate-law";
/** Three runs of a first-order reaction with k = 0.02 s⁻¹. */
const REQUEST = JSON.stringify({
  species: ["A"],
  runs: [1, 2, 4].map((level) => ({
    label: `R${level}`,
    concentrations: { A: level / 1000 },
    rate: (0.02 * level) / 1000,
  })),
});

let actor: Actor;
const browser = new Visitor(origin);

test.beforeAll(async () => {
  actor = (await makeGroup(db, domain)).analyst;
  await browser.signIn(`analyst@${domain}`, TEST_PASSWORD);
});
test.afterAll(() => db.destroy());

function call(headers: Record<string, string>, body: string = REQUEST): Promise<Response> {
  return fetch(origin + PATH, {
    method: "POST",
    headers: { "Content-Type": "application/json", ...headers },
    body,
  });
}

const bearer = (token: string) => ({ Authorization: `Bearer ${token}` });
const cookie = () => ({ Cookie: browser.cookieHeader() });

async function expectProblem(response: Response, status: number): Promise<Record<string, unknown>> {
  expect(response.status).toBe(status);
  expect(response.headers.get("content-type")).toBe("application/problem+json");
  const body: Record<string, unknown> = await response.json();
  expect(body).toMatchObject({ type: expect.any(String), title: expect.any(String), status });
  expect(body.detail).toMatch(/\S.*[.]$/);
  return body;
}

test("a personal token needs no origin and no cookie", async () => {
  const { token } = await createToken(db, actor, { name: "script", scope: "read", expiresAt: null });
  const response = await call(bearer(token));
  expect(response.status).toBe(200);
  expect(await response.json()).toHaveProperty("rateConstant");
});

test("a token that is unknown, revoked, expired or malformed is answered 401, each alike", async () => {
  const revoked = await createToken(db, actor, { name: "revoked", scope: "write", expiresAt: null });
  await revokeToken(db, actor, revoked.id);
  const expired = await createToken(db, actor, {
    name: "old",
    scope: "write",
    expiresAt: new Date(Date.now() - 1000),
  });
  const details = new Set<unknown>();
  for (const token of [randomBytes(32).toString("base64url"), revoked.token, expired.token, "x"]) {
    const response = await call(bearer(token));
    expect(response.headers.get("www-authenticate")).toBe("Bearer");
    details.add((await expectProblem(response, 401)).detail);
  }
  expect(details.size).toBe(1);
});

test("a bad token is not made good by a cookie beside it", async () => {
  await expectProblem(await call({ ...cookie(), Origin: origin, ...bearer("A".repeat(43)) }), 401);
});

test("neither token nor cookie is answered 401", async () => {
  await expectProblem(await call({ Origin: origin }), 401);
});

test("a cookie goes with our own origin only", async () => {
  expect((await call({ ...cookie(), Origin: origin })).status).toBe(200);
  const origins: Record<string, string>[] = [{}, { Origin: "https://elsewhere.example" }, { Origin: "null" }];
  for (const headers of origins) {
    await expectProblem(await call({ ...cookie(), ...headers }), 403);
  }
  const forged = { Origin: "https://elsewhere.example", "X-Forwarded-Host": "elsewhere.example" };
  await expectProblem(await call({ ...cookie(), ...forged }), 403);
});

test.describe("bad input", () => {
  const ours = () => ({ ...cookie(), Origin: origin });

  test("that is no JSON is answered 400", async () => {
    await expectProblem(await call(ours(), "{"), 400);
    await expectProblem(await call(ours(), ""), 400);
  });

  test("that is not sent as JSON is answered 415", async () => {
    await expectProblem(await call({ ...ours(), "Content-Type": "text/plain" }), 415);
  });

  test("that does not fit is answered 422 and names each field by its path", async () => {
    const request = { species: ["A"], runs: [{ label: "R1", concentrations: { A: 1 }, rate: "fast" }] };
    const body = await expectProblem(await call(ours(), JSON.stringify(request)), 422);
    expect(body.errors).toContainEqual({ path: "runs.0.rate", message: expect.stringMatching(/\S/) });
  });

  test("over the limit is answered 413, whether or not it says how long it is", async () => {
    const large = JSON.stringify({ species: ["A".repeat(9 * 1024 * 1024)] });
    await expectProblem(await call(ours(), large), 413);
    const unsaid = new ReadableStream({
      start(controller) {
        controller.enqueue(new TextEncoder().encode(large));
        controller.close();
      },
    });
    const init = {
      method: "POST",
      headers: { "Content-Type": "application/json", ...ours() },
      body: unsaid,
      duplex: "half",
    };
    await expectProblem(await fetch(origin + PATH, init), 413);
  });

  test("with a number that would overflow is answered 422 and names it", async () => {
    const request = { species: ["A"], runs: [{ label: "R1", concentrations: { A: 1e308 }, rate: 1 }] };
    const body = await expectProblem(await call(ours(), JSON.stringify(request)), 422);
    expect(body.errors).toEqual([
      { path: "runs.0.concentrations.A", message: expect.stringMatching(/power of ten/) },
    ]);
  });

  test("with a species named like what every object has is answered 422", async () => {
    for (const name of ["constructor", "__proto__", "toString"]) {
      const runs = `[{"label":"R1","concentrations":{"${name}":1},"rate":1}]`;
      await expectProblem(await call(ours(), `{"species":["${name}"],"runs":${runs}}`), 422);
    }
  });

  test("with a hundred thousand faults is answered with the first hundred", async () => {
    const numbers = Array.from({ length: 100_000 }, () => "x");
    const response = await fetch(`${origin}/api/v1/compute/initial-rate`, {
      method: "POST",
      headers: { "Content-Type": "application/json", ...ours() },
      body: JSON.stringify({ time: numbers, signal: numbers }),
    });
    expect((await expectProblem(response, 422)).errors).toHaveLength(100);
  });
});

test("a large call is computed in the pool and answered like any other", async () => {
  const { token } = await createToken(db, actor, { name: "large", scope: "read", expiresAt: null });
  const runs = Array.from({ length: 500 }, (_, i) => {
    const level = 1 + (i % 7);
    return { label: `R${i}`, concentrations: { A: level / 1000 }, rate: (0.02 * level) / 1000 };
  });
  const response = await call(bearer(token), JSON.stringify({ species: ["A"], runs }));
  expect(response.status).toBe(200);
  const answer: { rateConstant: { estimate: number } } = await response.json();
  expect(answer.rateConstant.estimate).toBeCloseTo(0.02, 10);
});
