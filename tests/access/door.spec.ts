import { expect, test } from "@playwright/test";
import { TEST_PASSWORD } from "@/db/testing/make-group";
import { browserRun } from "../browser-run";
import { entries } from "./entries";
import { Visitor } from "./visitor";
import { makeWorld, type World } from "./world";

const { origin } = browserRun();
/** A page for any member, which carries the member menu and its actions. */
const PAGE = "/studies/new";
let world: World;

test.beforeAll(async () => {
  world = await makeWorld("door");
});

function actionId(name: string): string {
  const found = entries().find(({ kind, key }) => kind === "action" && key.endsWith(`#${name}`));
  if (found?.kind !== "action") {
    throw new Error(`The build has no action ${name}.`);
  }
  return found.actionId;
}

const isSignedIn = async (visitor: Visitor) => (await visitor.send(PAGE)).status === 200;

test.describe("a call that rides on the session cookie", () => {
  const refusals: Record<string, Record<string, string>> = {
    "from another origin": { Origin: "https://elsewhere.example", "Sec-Fetch-Site": "cross-site" },
    "from another origin that claims to be ours": { Origin: "https://elsewhere.example" },
    "from a page of another site": { "Sec-Fetch-Site": "cross-site" },
    "from another port of this machine": { Origin: "http://localhost:1", "Sec-Fetch-Site": "same-site" },
    "from a sandboxed page": { Origin: "null" },
    "with X-Forwarded-Host forged to match its origin": {
      Origin: "https://elsewhere.example",
      "Sec-Fetch-Site": "same-origin",
      "X-Forwarded-Host": "elsewhere.example",
      "X-Forwarded-Proto": "https",
    },
  };

  for (const [how, headers] of Object.entries(refusals)) {
    test(`${how} ends no session`, async () => {
      const visitor = await world.passingOutsider();
      const answer = await visitor.act(PAGE, actionId("signOut"), [null], headers);
      expect(answer.headers.get("set-cookie") ?? "").not.toContain("ratewright-session=;");
      expect(await isSignedIn(visitor)).toBe(true);
    });

    test(`${how} signs nobody in`, async () => {
      const visitor = new Visitor(origin);
      const { csrfToken } = JSON.parse((await visitor.send("/api/auth/csrf")).body);
      const answer = await visitor.send("/api/auth/callback/credentials", {
        method: "POST",
        headers: { "Content-Type": "application/x-www-form-urlencoded", ...headers },
        body: new URLSearchParams({
          csrfToken,
          email: `lead@${world.outside}`,
          password: TEST_PASSWORD,
        }).toString(),
      });
      expect(answer.status).toBe(403);
      expect(await isSignedIn(visitor)).toBe(false);
    });
  }

  test("with neither Origin nor Sec-Fetch-Site ends no session", async () => {
    const visitor = await world.passingOutsider();
    await fetch(`${origin}${PAGE}`, {
      method: "POST",
      redirect: "manual",
      headers: {
        Cookie: visitor.cookieHeader(),
        "Content-Type": "text/plain;charset=UTF-8",
        "Next-Action": actionId("signOut"),
      },
      body: "[null]",
    });
    expect(await isSignedIn(visitor)).toBe(true);
  });

  test("from our own page goes through", async () => {
    const visitor = await world.passingOutsider();
    const answer = await visitor.act(PAGE, actionId("signOut"), [null]);
    expect(answer.headers.get("x-action-redirect")).toMatch(/^\/sign-in/);
    expect(await isSignedIn(visitor)).toBe(false);
  });
});

test("no address that the server gives follows X-Forwarded-Host", async () => {
  const forged = { "X-Forwarded-Host": "elsewhere.example", "X-Forwarded-Proto": "https" };
  const visitor = new Visitor(origin);
  for (const path of [
    "/",
    "/studies",
    "/sign-in",
    "/api/auth/signin",
    "/api/auth/providers",
    "/api/auth/error",
  ]) {
    const answer = await visitor.send(path, { headers: forged });
    const headers = JSON.stringify([...answer.headers]);
    expect(headers + answer.body, path).not.toContain("elsewhere.example");
  }
});

test.describe("a session", () => {
  test("kept by somebody who copied the cookie ends with its sign-out", async () => {
    const visitor = await world.passingOutsider();
    const copied = visitor.cookieHeader();
    await visitor.act(PAGE, actionId("signOut"), [null]);
    const answer = await new Visitor(origin).send(PAGE, { headers: { Cookie: copied } });
    expect(answer.status).toBe(307);
    expect(answer.headers.get("location")).toBe(`/sign-in?to=${encodeURIComponent(PAGE)}`);
  });

  test("on every device ends at its next request after a sign-out everywhere", async () => {
    const [here, there] = [await world.passingOutsider(), await world.passingOutsider()];
    expect(await isSignedIn(there)).toBe(true);
    await here.act(PAGE, actionId("signOutEverywhere"), [null]);
    expect(await isSignedIn(there)).toBe(false);
    expect(await isSignedIn(here)).toBe(false);
    expect(await isSignedIn(world.insider), "another account stays signed in").toBe(true);
  });

  test("of a forged or damaged cookie is none", async () => {
    for (const value of [
      "",
      "x",
      "eyJhbGciOiJub25lIn0.e30.",
      `eyJhbGciOiJkaXIiLCJlbmMiOiJBMjU2R0NNIn0..${"A".repeat(400)}`,
    ]) {
      const answer = await new Visitor(origin).send(PAGE, {
        headers: { Cookie: `ratewright-session=${value}` },
      });
      expect(answer.status, value).toBe(307);
    }
  });

  test("tells next-auth's own endpoint nothing about the member", async () => {
    const answer = await world.insider.send("/api/auth/session");
    expect(Object.keys(JSON.parse(answer.body))).toEqual(["expires"]);
  });

  test("lives in a cookie that scripts cannot read and other sites cannot send along", async () => {
    const visitor = new Visitor(origin);
    const { csrfToken } = JSON.parse((await visitor.send("/api/auth/csrf")).body);
    const answer = await visitor.send("/api/auth/callback/credentials", {
      method: "POST",
      headers: { "Content-Type": "application/x-www-form-urlencoded" },
      body: new URLSearchParams({
        csrfToken,
        email: `lead@${world.outside}`,
        password: TEST_PASSWORD,
      }).toString(),
    });
    const cookie = answer.headers.getSetCookie().find((line) => line.startsWith("ratewright-session="));
    expect(cookie).toMatch(/; HttpOnly/);
    expect(cookie).toMatch(/; SameSite=Lax/);
  });
});

test.describe("signing in", () => {
  test("answers an unknown address and a wrong password alike", async () => {
    const unknown = await new Visitor(origin).signIn(`nobody@${world.outside}`, "a password for tests");
    const wrong = await new Visitor(origin).signIn(`analyst@${world.outside}`, "not the password");
    expect(unknown).toEqual({ status: 401, refusal: "CredentialsSignin" });
    expect(wrong).toEqual(unknown);
  });

  test("is throttled by account, for the right password too, and for nobody else", async () => {
    const email = `reader@${world.outside}`;
    for (let attempt = 1; attempt <= 10; attempt++) {
      expect((await new Visitor(origin).signIn(email, `guess ${attempt}`)).refusal).toBe("CredentialsSignin");
    }
    const eleventh = await new Visitor(origin).signIn(email, TEST_PASSWORD);
    expect(eleventh.status).toBe(401);
    expect(eleventh.refusal).toMatch(/^throttled:\d+$/);
    const otherCase = await new Visitor(origin).signIn(` ${email.toUpperCase()}`, TEST_PASSWORD);
    expect(otherCase.refusal, "the same account in other letters").toMatch(/^throttled:/);
    expect((await new Visitor(origin).signIn(`lead@${world.outside}`, TEST_PASSWORD)).status).toBe(200);
  });

  test("starts counting anew after it succeeded", async () => {
    const email = `analyst@${world.outside}`;
    for (let round = 0; round < 2; round++) {
      for (let attempt = 0; attempt < 8; attempt++) {
        await new Visitor(origin).signIn(email, "not the password");
      }
      expect((await new Visitor(origin).signIn(email, TEST_PASSWORD)).status).toBe(200);
    }
  });
});
