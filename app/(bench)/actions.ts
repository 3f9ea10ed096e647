"use server";

import { cookies } from "next/headers";
import { redirect } from "next/navigation";
import { z } from "zod";
import { memberAction } from "@/app/_server/member-action";
import { currentSessionToken } from "@/app/_server/session";
import { SECURE_COOKIES, SESSION_COOKIE } from "@/app/_server/session-cookie";
import { endAllSessions, endSession } from "@/db/session/session.commands";

/** Ends this browser's session. */
export const signOut = memberAction(z.unknown(), "reader", async ({ db }) => {
  const token = await currentSessionToken();
  if (token !== null) {
    await endSession(db, token);
  }
  return leave();
});

/** Ends every session of the account, on whatever device; each is refused from its next request on. */
export const signOutEverywhere = memberAction(z.unknown(), "reader", async ({ actor, db }) => {
  await endAllSessions(db, actor.accountId);
  return leave();
});

async function leave(): Promise<never> {
  // Written out, since a browser ignores the removal of a __Host- cookie that does not say Secure.
  (await cookies()).set(SESSION_COOKIE, "", { maxAge: 0, path: "/", httpOnly: true, secure: SECURE_COOKIES });
  redirect("/sign-in");
}
