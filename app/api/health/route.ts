import { database } from "@/app/_server/database";
import { reportFailure } from "@/app/_server/failure";
import { problem } from "@/app/_server/problem";

export const dynamic = "force-dynamic";

/** Whether the server can answer: for the start script, and for whatever watches over it. Tells nothing else. */
export async function GET(): Promise<Response> {
  try {
    await database().selectFrom("research_group").select("id").limit(1).execute();
    return Response.json({ status: "ready" }, { headers: { "Cache-Control": "no-store" } });
  } catch (error) {
    reportFailure(error, "health");
    return problem(503, "The database does not answer.");
  }
}
