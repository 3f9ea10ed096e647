import "server-only";
import { z } from "zod";
import { verifySignIn } from "@/db/account/sign-in";
import { startSession } from "@/db/session/session.commands";
import { database } from "./database";
import { reportFailure } from "./failure";
import { resetLimit, takeFromLimit } from "./rate-limit";

const credentials = z.object({
  email: z.string().trim().toLowerCase().min(3).max(254),
  password: z.string().min(1).max(1024),
});

/** The codes that the sign-in page turns into sentences; next-auth hands them on in an address, so they say little. */
export const SIGN_IN_THROTTLED = "throttled";
export const SIGN_IN_UNAVAILABLE = "unavailable";

/**
 * Checks address and password, and opens a session. An unknown address and a wrong password take the same time and
 * give the same answer. Attempts are counted by the address typed, whether or not there is such an account.
 *
 * @returns the session's token as `id`, or null where the two do not belong together.
 * @throws an Error whose message is one of the codes above, with the seconds to wait after `throttled:`.
 */
export async function signInWithPassword(unparsed: unknown): Promise<{ id: string } | null> {
  const parsed = credentials.safeParse(unparsed);
  if (!parsed.success) {
    return null;
  }
  const { email, password } = parsed.data;
  const outcome = await attempt(email, password).catch((error: unknown) => {
    reportFailure(error, "sign-in");
    throw new Error(SIGN_IN_UNAVAILABLE);
  });
  if (outcome.kind === "throttled") {
    throw new Error(`${SIGN_IN_THROTTLED}:${outcome.seconds}`);
  }
  return outcome.kind === "opened" ? { id: outcome.session } : null;
}

type Attempt =
  | { readonly kind: "opened"; readonly session: string }
  | { readonly kind: "refused" }
  | { readonly kind: "throttled"; readonly seconds: number };

async function attempt(email: string, password: string): Promise<Attempt> {
  const seconds = await takeFromLimit("signIn", email);
  if (seconds !== null) {
    return { kind: "throttled", seconds };
  }
  const account = await verifySignIn(database(), email, password);
  if (account === undefined) {
    return { kind: "refused" };
  }
  await resetLimit("signIn", email);
  return { kind: "opened", session: await startSession(database(), account.accountId) };
}
