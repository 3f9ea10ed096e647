import "server-only";
import { headers } from "next/headers";
import { unstable_rethrow } from "next/navigation";
import type { z } from "zod";
import type { Handle } from "@/db/database";
import { type Actor, mayActAs } from "@/db/member/actor";
import type { Role } from "@/db/member/member.table";
import { type ActionResult, refused } from "./action-result";
import { database } from "./database";
import { env } from "./env";
import { reportFailure } from "./failure";
import { fieldMessages } from "./problem";
import { roleRefusal } from "./role";
import { isSameOrigin } from "./same-origin";
import { requireMember } from "./session";

export type { ActionResult } from "./action-result";

export interface MemberCall<Input> {
  readonly actor: Actor;
  readonly input: Input;
  readonly db: Handle;
}

/**
 * The one way into a server action: same origin, signed in, role, input, then `handler`. Somebody signed out goes to
 * the sign-in page; a refused origin or role and input that does not parse come back as sentences. The handler passes
 * the actor on to a command, which decides about the study itself, and calls `notFound()` where the command says so:
 * an outsider gets the same 404 as for a study that does not exist.
 *
 * @param role the least role that may do this: reader, analyst or lead.
 */
export function memberAction<Schema extends z.ZodType, Value>(
  schema: Schema,
  role: Role,
  handler: (call: MemberCall<z.output<Schema>>) => Promise<ActionResult<Value>>,
): (input: unknown) => Promise<ActionResult<Value>> {
  return async (unparsed) => {
    if (!isSameOrigin(await headers(), env.publicOrigin)) {
      return refused(
        "This came from another address than the server's own pages. Reload the page and try again.",
      );
    }
    const actor = await requireMember();
    if (!mayActAs(actor.role, role)) {
      return refused(roleRefusal(actor.role, role));
    }
    const parsed = schema.safeParse(unparsed);
    if (!parsed.success) {
      const fields = fieldMessages(parsed.error);
      return refused(fields[0]?.message ?? "The input could not be read.", fields);
    }
    try {
      return await handler({ actor, input: parsed.data, db: database() });
    } catch (error) {
      // notFound() and redirect() travel as errors and belong to Next.
      unstable_rethrow(error);
      return refused(reportFailure(error, "server action").message);
    }
  };
}
