import { database } from "@/app/_server/database";
import { notFoundProblem } from "@/app/_server/problem";
import { tracesTable } from "@/app/_worksheet/tables/traces-table";
import { downloadHeaders } from "../download-headers";
import { openLink } from "../open-link";

/** Every reading of the shared study, streamed a run at a time. */
export async function GET(_: Request, { params }: { params: Promise<{ token: string }> }): Promise<Response> {
  const shared = await openLink((await params).token);
  if (shared === undefined) return notFoundProblem();
  const parts = tracesTable(database(), shared.sheet);
  const encoder = new TextEncoder();
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const { done, value } = await parts.next();
      if (done) controller.close();
      else controller.enqueue(encoder.encode(value));
    },
  });
  return new Response(body, { headers: downloadHeaders(`study-${shared.number}-traces.csv`) });
}
