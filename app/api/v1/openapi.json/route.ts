import { openApiDocument } from "./document";

/** Public: it describes the API and holds nothing of anybody. */
export function GET(): Response {
  return Response.json(openApiDocument());
}
