import "server-only";
import { unstable_rethrow } from "next/navigation";
import type { z } from "zod";
import type { Handle } from "@/db/database";
import { type Actor, mayActAs } from "@/db/member/actor";
import type { Role } from "@/db/member/member.table";
import { actorOfToken } from "@/db/token/token.queries";
import type { TokenScope } from "@/db/token/token.table";
import { acceptedInWords } from "./accepted-in-words";
import { readJsonBody } from "./body";
import { database } from "./database";
import { env } from "./env";
import { reportFailure } from "./failure";
import { fieldMessages, problem } from "./problem";
import { takeFromLimit } from "./rate-limit";
import { roleRefusal } from "./role";
import { isSameOrigin } from "./same-origin";
import { currentMember } from "./session";

const SAFE_METHODS = new Set(["GET", "HEAD", "OPTIONS"]);

export interface RouteOptions<Schema extends z.ZodType> {
  /** Of what the handler receives as `input`. */
  readonly schema: Schema;
  /**
   * Where the input comes from. Unsaid: the JSON body of POST, PUT, PATCH and DELETE, the query of GET. "query" leaves
   * the body alone, for a handler that streams it.
   */
  readonly from?: "body" | "query";
  /** What a personal token must be good for; null where only a signed-in browser may call. */
  readonly scope: TokenScope | null;
  /** The least role that may do this. */
  readonly role: Role;
  /** Of a JSON body, in bytes. */
  readonly bodyLimit?: number;
}

export interface RouteCall<Input> {
  readonly request: Request;
  /** Of the path; a handler that looks something up by one answers `notFoundProblem()` to an outsider. */
  readonly params: Readonly<Record<string, string>>;
  readonly actor: Actor;
  readonly input: Input;
  readonly db: Handle;
}

interface RouteContext {
  /** Resolves to undefined where the path has no parameters, whatever the framework's types say. */
  readonly params: Promise<Record<string, string | string[] | undefined>>;
}

/**
 * The one way into a route handler: who asks (session cookie or bearer token), from where, how often, in which role,
 * with what input. Refusals are problem details; an unexpected error is logged and told as a sentence.
 */
export function route<Schema extends z.ZodType>(
  options: RouteOptions<Schema>,
  handler: (call: RouteCall<z.output<Schema>>) => Promise<Response>,
): (request: Request, context: RouteContext) => Promise<Response> {
  return async (request, context) => {
    try {
      const caller = await identify(request, options.scope);
      if (caller instanceof Response) {
        return caller;
      }
      const { actor } = caller;
      const seconds = await takeFromLimit("api", actor.memberId);
      if (seconds !== null) {
        return problem(429, `Too many calls. Try again in ${seconds} s.`, {
          headers: { "Retry-After": String(seconds) },
        });
      }
      if (!mayActAs(actor.role, options.role)) {
        return problem(403, roleRefusal(actor.role, options.role));
      }
      const input = await readInput(request, options);
      if (input instanceof Response) {
        return input;
      }
      const params = singleParams(await context.params);
      return await handler({ request, params, actor, input: input.value, db: database() });
    } catch (error) {
      // notFound() and redirect() travel as errors and belong to Next.
      unstable_rethrow(error);
      const failure = reportFailure(error, `${request.method} ${new URL(request.url).pathname}`);
      return problem(failure.status, failure.message);
    }
  };
}

async function identify(
  request: Request,
  scope: TokenScope | null,
): Promise<{ readonly actor: Actor } | Response> {
  const authorization = request.headers.get("authorization");
  if (authorization !== null) {
    const token = /^Bearer ([\w-]{20,200})$/.exec(authorization)?.[1];
    const holder = token === undefined ? undefined : await actorOfToken(database(), token);
    if (holder === undefined) {
      return unauthorised("The token is not known or no longer valid. Make a new one and send it as Bearer.");
    }
    return scope !== null && covers(holder.scope, scope)
      ? { actor: holder.actor }
      : problem(
          403,
          `This call needs ${scope === null ? "a signed-in browser" : `a token with the scope ${scope}`}.`,
        );
  }
  const actor = await currentMember();
  if (actor === null) {
    return unauthorised("Sign in, or send a personal token as Authorization: Bearer.");
  }
  if (!SAFE_METHODS.has(request.method) && !isSameOrigin(request.headers, env.publicOrigin)) {
    return problem(
      403,
      "A call with a session cookie must come from the server's own pages. Use a personal token instead.",
    );
  }
  return { actor };
}

/** A token that may write may read too. */
function covers(held: TokenScope, needed: TokenScope): boolean {
  return held === "write" || needed === "read";
}

function unauthorised(detail: string): Response {
  return problem(401, detail, { headers: { "WWW-Authenticate": "Bearer" } });
}

async function readInput<Schema extends z.ZodType>(
  request: Request,
  options: RouteOptions<Schema>,
): Promise<{ readonly value: z.output<Schema> } | Response> {
  const from = options.from ?? (SAFE_METHODS.has(request.method) ? "query" : "body");
  const received =
    from === "query"
      ? { ok: true as const, value: Object.fromEntries(new URL(request.url).searchParams) }
      : await readJsonBody(request, options.bodyLimit);
  if (!received.ok) {
    return problem(received.status, received.detail);
  }
  const parsed = options.schema.safeParse(received.value, { error: acceptedInWords });
  if (parsed.success) {
    return { value: parsed.data };
  }
  const errors = fieldMessages(parsed.error);
  const [first] = errors;
  const detail =
    first === undefined
      ? "The input could not be read."
      : sentence(`${first.path || "body"}: ${first.message}`);
  return problem(422, detail, { errors });
}

/** Our paths have no catch-all parameters under route(), so each is one string. */
function singleParams(
  params: Record<string, string | string[] | undefined> | undefined,
): Record<string, string> {
  return Object.fromEntries(
    Object.entries(params ?? {}).filter((entry): entry is [string, string] => typeof entry[1] === "string"),
  );
}

function sentence(text: string): string {
  return /[.!?]$/.test(text) ? text : `${text}.`;
}
