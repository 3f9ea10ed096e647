import { STATUS_CODES } from "node:http";
import type { z } from "zod";
import type { FieldMessage } from "./action-result";

/** Of 400,000 bad numbers the first hundred say enough; all of them would make an answer of 33 MB. */
const MOST_ERRORS = 100;

/** A refusal of the HTTP API as RFC 9457 problem details. `detail` is a sentence with the way out. */
export function problem(
  status: number,
  detail: string,
  more: { readonly errors?: readonly FieldMessage[]; readonly headers?: Record<string, string> } = {},
): Response {
  const body = {
    type: "about:blank",
    title: STATUS_CODES[status] ?? "Error",
    status,
    detail,
    ...(more.errors === undefined ? {} : { errors: more.errors.slice(0, MOST_ERRORS) }),
  };
  return new Response(JSON.stringify(body), {
    status,
    headers: {
      "Content-Type": "application/problem+json",
      "Cache-Control": "no-store",
      // What is left of a body that nobody reads would stand in the way of the next call on this connection.
      ...(status === 413 ? { Connection: "close" } : {}),
      ...more.headers,
    },
  });
}

/** The same answer for what does not exist and for what belongs to another group. */
export function notFoundProblem(): Response {
  return problem(404, "There is nothing at this address for you.");
}

/** Issues of a zod parse by dotted path, "runs.2.rate". */
export function fieldMessages(error: z.ZodError): FieldMessage[] {
  return error.issues.map((issue) => ({
    path: issue.path.map(String).join("."),
    message: issue.message,
  }));
}
