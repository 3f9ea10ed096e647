import { randomBytes } from "node:crypto";
import { expect, test } from "@playwright/test";
import { connect } from "@/db/connect";
import { createShareLink, revokeShareLink } from "@/db/share-link/share-link.commands";
import { type Answer, Visitor } from "../access/visitor";
import { browserRun } from "../browser-run";
import { makeNineRunStudy, type NineRunStudy } from "./nine-runs";

/**
 * Who holds a link that does not open learns nothing from the refusal: not whether it ever opened, nor why it does
 * no longer. Answers are compared byte for byte: status, every header, body. What
 * differs by nature is taken out first: the nonce of each response (for data also the framework's random number of it),
 * and, where two tokens are compared, the token itself, which stands in the address that the asker sent and which the
 * framework repeats in the page. Where one token is asked for while it is expired, revoked and unknown in turn, it
 * stays in.
 */

const { databaseFile, origin } = browserRun();
const HOUR = 3_600_000;

interface Request {
  readonly what: string;
  /** Of the address, after the token. */
  readonly end: string;
  readonly headers: Record<string, string>;
  /** What an open link answers and a dead one must not; a prefetch tells no more than that there is such a page. */
  readonly shows: string | null;
}

/** What somebody may ask of a link: its page, the page's data as a navigation fetches them, and both tables. */
const REQUESTS: readonly Request[] = [
  { what: "the page", end: "", headers: {}, shows: "R05" },
  { what: "the page's data", end: "", headers: { RSC: "1" }, shows: "R05" },
  { what: "a prefetch", end: "", headers: { RSC: "1", "Next-Router-Prefetch": "1" }, shows: null },
  { what: "the table of runs", end: "/runs.csv", headers: {}, shows: "R05" },
  { what: "the table of traces", end: "/traces.csv", headers: {}, shows: "R05" },
];

let study: NineRunStudy;

test.beforeAll(async () => {
  study = await makeNineRunStudy("dead-links");
});

/** A new link of the study, dead or alive; made through the commands that people use. */
async function makeLink(state: "open" | "expired" | "revoked"): Promise<string> {
  const db = connect(databaseFile);
  try {
    const now = new Date();
    const made = await createShareLink(
      db,
      study.lead,
      {
        studyId: study.studyId,
        label: state,
        expiresAt: state === "expired" ? new Date(now.getTime() - HOUR) : null,
        frozenRevision: null,
      },
      state === "expired" ? new Date(now.getTime() - 2 * HOUR) : now,
    );
    if (made.status !== "created") throw new Error(`No link was made: ${made.status}.`);
    if (state === "revoked") await revokeShareLink(db, study.lead, made.id);
    return made.token;
  } finally {
    await db.destroy();
  }
}

/** The answer at the end of at most one redirect: data are served under an address that names their kind. */
async function ask(token: string, { end, headers }: Request): Promise<Answer> {
  const visitor = new Visitor(origin);
  const answer = await visitor.send(`/share/${token}${end}`, { headers });
  const to = answer.headers.get("location");
  return to === null ? answer : visitor.send(new URL(to, origin).href.slice(origin.length), { headers });
}

interface Said {
  readonly status: number;
  readonly headers: readonly (readonly [string, string])[];
  readonly body: string;
}

/** The framework's random number of a response that carries data, before the keys of the parts of its head. */
const RESPONSE_NUMBER = /\["\$","\$L\w+","([\w-]{21})[vm]"/;

/** The answer without what is drawn at random for each response, and without the time of day. */
function said({ status, headers, body }: Answer, token?: string): Said {
  const random = [
    [/'nonce-([^']+)'/.exec(headers.get("content-security-policy") ?? "")?.[1], "NONCE"],
    [RESPONSE_NUMBER.exec(body)?.[1], "NUMBER"],
    [token, "TOKEN"],
  ] as const;
  const plain = (text: string) =>
    random.reduce((rest, [part, name]) => (part === undefined ? rest : rest.replaceAll(part, name)), text);
  return {
    status,
    headers: [...headers].filter(([name]) => name !== "date").map(([name, value]) => [name, plain(value)]),
    body: plain(body),
  };
}

for (const request of REQUESTS) {
  test(`${request.what}: revoked, expired and unknown tokens are told the same`, async () => {
    const open = await makeLink("open");
    const alive = await ask(open, request);
    expect(alive.status, "an open link, else the refusals prove nothing").toBe(200);
    if (request.shows !== null) expect(alive.body).toContain(request.shows);

    const tokens = {
      revoked: await makeLink("revoked"),
      expired: await makeLink("expired"),
      unknown: randomBytes(32).toString("base64url"),
    };
    const unknown = said(await ask(tokens.unknown, request), tokens.unknown);
    // The framework answers a navigation's request for data with 200 and says "not found" inside.
    expect(unknown.status).toBe(request.headers.RSC === undefined ? 404 : 200);
    if (request.shows !== null) expect(unknown.body).not.toContain(request.shows);
    expect(unknown.body).not.toContain(study.name);
    for (const state of ["revoked", "expired"] as const) {
      expect(said(await ask(tokens[state], request), tokens[state]), state).toEqual(unknown);
    }
  });

  test(`${request.what}: one token is told the same while it is expired, revoked and unknown`, async () => {
    const token = await makeLink("expired");
    const expired = said(await ask(token, request));
    const db = connect(databaseFile);
    try {
      const links = () =>
        db
          .selectFrom("share_link")
          .select("id")
          .where("study_id", "=", study.studyId)
          .orderBy("created_at", "desc");
      const { id } = await links().where("label", "=", "expired").executeTakeFirstOrThrow();
      await db.updateTable("share_link").set({ expires_at: null }).where("id", "=", id).execute();
      const alive = await ask(token, request);
      if (request.shows !== null) expect(alive.body, "the row is this token's").toContain(request.shows);
      await revokeShareLink(db, study.lead, id);
      expect(said(await ask(token, request)), "revoked").toEqual(expired);
      await db.deleteFrom("share_link").where("id", "=", id).execute();
      expect(said(await ask(token, request)), "unknown").toEqual(expired);
    } finally {
      await db.destroy();
    }
  });
}
