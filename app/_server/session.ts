import "server-only";
import { cookies, headers } from "next/headers";
import { redirect } from "next/navigation";
import { decode } from "next-auth/jwt";
import { cache } from "react";
import type { Actor } from "@/db/member/actor";
import { actorOfSession } from "@/db/session/session.queries";
import { authSecret } from "./auth-secret";
import { database } from "./database";
import { SESSION_COOKIE } from "./session-cookie";

/** The session that the request's cookie names, in plain; the row keeps its hash. Null without a cookie, or with one that we did not seal. */
export const currentSessionToken = cache(async (): Promise<string | null> => {
  const token = (await cookies()).get(SESSION_COOKIE)?.value;
  if (token === undefined) {
    return null;
  }
  try {
    const claims = await decode({ token, secret: authSecret() });
    return typeof claims?.session === "string" ? claims.session : null;
  } catch {
    // A forged, damaged or outlived cookie is the same as none: whoever sends it is signed out.
    return null;
  }
});

/**
 * Who is asking. The cookie names only a session; the row, its account and its membership are read for every
 * request, so that a changed role, a sign-out everywhere or a removed membership acts on the next one.
 */
export const currentMember = cache(async (): Promise<Actor | null> => {
  const token = await currentSessionToken();
  return token === null ? null : ((await actorOfSession(database(), token)) ?? null);
});

/** The member, or the sign-in page, which leads back to where the visitor wanted to go. */
export async function requireMember(): Promise<Actor> {
  const actor = await currentMember();
  if (actor === null) {
    const wanted = (await headers()).get("x-path");
    redirect(wanted === null ? "/sign-in" : `/sign-in?to=${encodeURIComponent(wanted)}`);
  }
  return actor;
}
