import { createDocument, type ZodOpenApiPathItemObject } from "zod-openapi";
import { problem } from "../compute/estimate.schema";
import { COMPUTATIONS, type Computation } from "../compute/registry";

/** The description of the HTTP API, made from the schemas that check its requests. */
export function openApiDocument() {
  return createDocument({
    openapi: "3.1.0",
    info: {
      title: "Ratewright",
      version: "1",
      description:
        "Numbers in, numbers out; the compute calls store nothing. Units are plain text, for example L mol^-1 s^-1.",
    },
    security: [{ token: [] }, { session: [] }],
    components: {
      securitySchemes: {
        token: { type: "http", scheme: "bearer", description: "A personal token." },
        session: {
          type: "apiKey",
          in: "cookie",
          name: "ratewright-session",
          description:
            "The session of a signed-in browser; such calls must come from the server's own pages.",
        },
      },
    },
    paths: Object.fromEntries(
      COMPUTATIONS.map((entry) => [`/api/v1/compute/${entry.name}`, computePath(entry)]),
    ),
  });
}

const PROBLEMS = {
  "400": "The body is not JSON.",
  "401": "No credentials, or ones that are no longer valid.",
  "413": "The body is over the limit.",
  "422": "A value is missing, of the wrong kind, or cannot be used; `errors` names each place.",
  "429": "Too many calls; Retry-After says when to try again.",
};

function computePath(entry: Computation): ZodOpenApiPathItemObject {
  const problems = Object.fromEntries(
    Object.entries(PROBLEMS).map(([status, description]) => [
      status,
      { description, content: { "application/problem+json": { schema: problem } } },
    ]),
  );
  return {
    post: {
      operationId: entry.name,
      summary: entry.summary,
      requestBody: { required: true, content: { "application/json": { schema: entry.request } } },
      responses: {
        "200": { description: "The numbers.", content: { "application/json": { schema: entry.response } } },
        ...problems,
      },
    },
  };
}
