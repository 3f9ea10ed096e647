import "server-only";
import type { NextAuthOptions } from "next-auth";
import CredentialsProvider from "next-auth/providers/credentials";
import { endSession, SESSION_LIMITS } from "@/db/session/session.commands";
import { authSecret } from "./auth-secret";
import { database } from "./database";
import { env } from "./env";
import { SECURE_COOKIES, SESSION_COOKIE } from "./session-cookie";
import { signInWithPassword } from "./sign-in";

/**
 * next-auth carries the sign-in: its CSRF token, its sealed cookie. Who the member is stays in our tables: the token
 * names a session and holds nothing else, and its session endpoint tells nobody anything.
 */
export function authOptions(): NextAuthOptions {
  // Unset, next-auth would build addresses from X-Forwarded-Host or assume port 3000.
  process.env.NEXTAUTH_URL = env.publicOrigin ?? `http://localhost:${env.port}`;
  const cookie = { httpOnly: true, sameSite: "lax" as const, path: "/", secure: SECURE_COOKIES };
  return {
    secret: authSecret(),
    session: { strategy: "jwt", maxAge: SESSION_LIMITS.absoluteSeconds },
    useSecureCookies: SECURE_COOKIES,
    cookies: { sessionToken: { name: SESSION_COOKIE, options: cookie } },
    // next-auth's own pages carry inline styles that our content security policy refuses.
    pages: { signIn: "/sign-in", signOut: "/sign-in", error: "/sign-in", verifyRequest: "/sign-in" },
    providers: [
      CredentialsProvider({
        name: "password",
        credentials: { email: { type: "email" }, password: { type: "password" } },
        authorize: (credentials) => signInWithPassword(credentials),
      }),
    ],
    callbacks: {
      jwt: ({ token, user }) => ({ session: user === undefined ? token.session : user.id }),
      session: ({ session }) => ({ expires: session.expires }),
      redirect: ({ url, baseUrl }) => (url.startsWith(`${baseUrl}/`) ? url : baseUrl),
    },
    events: {
      signOut: async ({ token }) => {
        if (typeof token?.session === "string") {
          await endSession(database(), token.session);
        }
      },
    },
  };
}
