import { database } from "@/app/_server/database";
import { notFoundProblem } from "@/app/_server/problem";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { runsAndRatesTable } from "@/app/_worksheet/tables/runs-and-rates";
import { downloadHeaders } from "../download-headers";
import { openLink } from "../open-link";

/** Runs and rates of the shared study. */
export async function GET(_: Request, { params }: { params: Promise<{ token: string }> }): Promise<Response> {
  const shared = await openLink((await params).token);
  if (shared === undefined) return notFoundProblem();
  const table = runsAndRatesTable(shared.sheet, await analyseStudy(database(), shared.sheet));
  return new Response(table, { headers: downloadHeaders(`study-${shared.number}-runs.csv`) });
}
