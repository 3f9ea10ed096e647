import { expect, test } from "@playwright/test";
import { type Entry, entries, methodsOf, routeOf } from "./entries";
import { type Rule, rules } from "./rules";
import type { Answer, Visitor } from "./visitor";
import { makeWorld, type World } from "./world";

const all = entries();
let world: World;

test.beforeAll(async () => {
  world = await makeWorld("every-entry");
});

test("every page, handler and action has a rule, and every rule something to rule", () => {
  expect(all.map(({ key }) => key).filter((key) => !(key in rules))).toEqual([]);
  const known = new Set(all.map(({ key }) => key));
  expect(Object.keys(rules).filter((key) => !known.has(key))).toEqual([]);
});

test("what an address names by study, run or member is ruled for its group", () => {
  const loose = all.filter(
    ({ key }) =>
      /^(page|[A-Z]+) .*\[(studyId|runId|uploadId|memberId)\]/.test(key) && rules[key]?.who !== "group",
  );
  expect(loose.map(({ key }) => key)).toEqual([]);
});

test("routes and methods are read from files", () => {
  expect(routeOf("app/(bench)/studies/[studyId]/page.tsx")).toBe("/studies/[studyId]");
  expect(routeOf("app/page.tsx")).toBe("/");
  expect(methodsOf("export const GET = route();\nexport async function POST() {}")).toEqual(["GET", "POST"]);
  expect(methodsOf("const both = route();\nexport { both as GET, both as POST };")).toEqual(["GET", "POST"]);
});

for (const entry of all) {
  const rule = rules[entry.key];
  if (rule !== undefined) {
    test(`${entry.key} is for ${rule.who}`, () => check(entry, rule));
  }
}

async function check(entry: Entry, rule: Rule): Promise<void> {
  const nobody = await enter(entry, rule, world.signedOut);
  expect(nobody.body).not.toContain(world.marker);
  if (rule.who === "anyone") {
    expect(nobody.status, nobody.body).toBeLessThan(500);
    return;
  }
  if (rule.who === "link") {
    await expectOnlyByLink(entry, nobody);
    return;
  }
  expectTurnedAway(entry, nobody);

  const outsider = rule.who === "group" ? world.outsider : await world.passingOutsider();
  const answer = await enter(entry, rule, outsider);
  expect(answer.body).not.toContain(world.marker);
  if (rule.who === "group") {
    expect(answer.status, `to an outsider, ${answer.body.slice(0, 400)}`).toBe(404);
    // The action exists and was run: it is the study that is not there for them.
    expect(answer.headers.get("x-nextjs-action-not-found")).toBeNull();
    if (entry.kind === "page") {
      await expectNothingByRsc(entry, outsider);
      await expectShownToInsider(entry);
    }
  }
}

/** `guessed` came for a token that nobody made. The link's own token shows the study, or the refusals prove nothing. */
async function expectOnlyByLink(entry: Entry, guessed: Answer): Promise<void> {
  expect(guessed.status, guessed.body.slice(0, 400)).toBe(404);
  const signedIn = await world.outsider.send(address(entry.route));
  expect(signedIn.status).toBe(404);
  expect(signedIn.body).not.toContain(world.marker);
  const held = await world.signedOut.send(entry.route.replace("[token]", world.linkToken));
  expect(held.status, held.body.slice(0, 400)).toBe(200);
  expect(held.body).toContain(world.marker);
}

/** Signed out: a page or action leads to the sign-in page, a handler says 401. */
function expectTurnedAway(entry: Entry, answer: Answer): void {
  if (entry.kind === "handler") {
    expect(answer.status, answer.body).toBe(401);
    return;
  }
  // An action's answer carries the page that it leads to, drawn already, with that page's status.
  const to = answer.headers.get(entry.kind === "action" ? "x-action-redirect" : "location");
  expect(to, `${answer.status} ${answer.body.slice(0, 400)}`).toMatch(/^\/sign-in/);
}

/** A client-side navigation gets the not-found digest, with whatever status the framework gives it. */
async function expectNothingByRsc(entry: Extract<Entry, { kind: "page" }>, outsider: Visitor): Promise<void> {
  const answer = await outsider.send(address(entry.route), { headers: { RSC: "1" } });
  expect(answer.body).not.toContain(world.marker);
  if (answer.status < 300) {
    expect(answer.body).toContain("NEXT_HTTP_ERROR_FALLBACK;404");
  }
}

/** Else the refusals above could come from a page that shows nobody anything. */
async function expectShownToInsider(entry: Extract<Entry, { kind: "page" }>): Promise<void> {
  const answer = await world.insider.send(address(entry.route));
  expect([200, 307], "to a member of the group").toContain(answer.status);
  if (answer.status === 200) {
    expect(answer.body).toContain(world.marker);
  }
}

function enter(entry: Entry, rule: Rule, visitor: Visitor): Promise<Answer> {
  const sent = rule.who === "group" ? rule.send?.(world) : undefined;
  if (entry.kind === "action") {
    return visitor.act(address(entry.route), entry.actionId, [sent ?? null]);
  }
  const at = (rule.who === "anyone" ? rule.at : undefined) ?? address(entry.route);
  if (entry.kind === "page" || entry.method === "GET") {
    return visitor.send(at);
  }
  return visitor.send(at, {
    method: entry.method,
    headers: { "Content-Type": "application/json" },
    body: JSON.stringify(sent ?? {}),
  });
}

/** "/studies/[studyId]/runs" with the other group's ids. */
function address(route: string): string {
  const values: Record<string, string> = {
    studyId: world.studyId,
    runId: world.runId,
    uploadId: world.uploadId,
    revision: String(world.revision),
    memberId: world.memberId,
    token: "A".repeat(43),
  };
  return route.replace(/\[(\w+)\]/g, (_, name: string) => {
    const value = values[name];
    if (value === undefined) {
      throw new Error(`tests/access does not know what to put for [${name}] in ${route}.`);
    }
    return encodeURIComponent(value);
  });
}
