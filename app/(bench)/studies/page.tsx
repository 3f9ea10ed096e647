import type { Metadata } from "next";
import { database } from "@/app/_server/database";
import { drawnTraces } from "@/app/_server/drawn-traces";
import { requireMember } from "@/app/_server/session";
import { ButtonLink } from "@/app/_ui/button";
import { SectionTitle } from "@/app/_ui/sheet";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { presentRuns } from "@/app/_worksheet/present-runs";
import { type Actor, mayActAs } from "@/db/member/actor";
import { lastEntries } from "@/db/study/last-entries";
import { listStudies, readStudy } from "@/db/study/study.queries";
import { BenchHead } from "../bench-head";
import { FindBox } from "./_components/find-box";
import { FirstVisit } from "./_components/first-visit";
import { StudyTable } from "./_components/study-table";
import { listLead, matches, type StudyRow, studyRow } from "./view";

export const metadata: Metadata = { title: "Studies · Ratewright" };

export default async function StudiesPage({
  searchParams,
}: {
  searchParams: Promise<{ find?: string | string[] }>;
}) {
  const actor = await requireMember();
  const rows = await readRows(actor);
  const { find } = await searchParams;
  const asked = typeof find === "string" ? find.slice(0, 200) : "";
  const canMake = mayActAs(actor.role, "analyst");
  const own = rows.filter((row) => !row.invented);
  const invented = rows.filter((row) => row.invented && matches(row, asked));
  const found = own.filter((row) => matches(row, asked));
  return (
    <>
      <BenchHead />
      <main id="main" tabIndex={-1} className="sheet full border-t-[3px] border-t-ink">
        <div className="mx-auto w-full max-w-[1240px] min-w-0">
          <div className="sheet-head mt-3.5 mb-5.5">
            <div>
              <h1 className="text-page!">{own.length === 0 ? "No studies yet" : "Studies"}</h1>
              <p className="lead">
                {own.length === 0
                  ? "Bring four runs with two levels of each reactant. That is enough for a first law."
                  : listLead(own)}
              </p>
            </div>
            <div className="sheet-actions">
              {rows.length > 0 && <FindBox asked={asked} />}
              {canMake && (
                <ButtonLink kind={own.length === 0 ? "plain" : "primary"} href="/studies/new">
                  New study
                </ButtonLink>
              )}
            </div>
          </div>
          {own.length === 0 ? (
            canMake ? (
              <FirstVisit />
            ) : (
              <p className="text-ink-2">As a reader you will find the studies of your group here.</p>
            )
          ) : (
            found.length > 0 && <StudyTable caption="Studies of your group" rows={found} />
          )}
          {invented.length > 0 && (
            <section className="mt-9">
              <SectionTitle note="made for demonstration, invented data; open to read and to try things">
                {own.length === 0 ? "Finished studies to look into" : "Demonstration"}
              </SectionTitle>
              <StudyTable caption="Invented studies" rows={invented} />
            </section>
          )}
          {asked !== "" && found.length + invented.length === 0 && (
            <p className="border-t-2 border-t-ink py-4 text-ink-2">
              No study holds “{asked}” in its name, reaction, species or conditions.
            </p>
          )}
        </div>
      </main>
    </>
  );
}

async function readRows(actor: Actor): Promise<StudyRow[]> {
  const db = database();
  const [listed, entries] = await Promise.all([listStudies(db, actor), lastEntries(db, actor)]);
  const now = new Date();
  const rows = await Promise.all(
    listed.map(async ({ studyId }) => {
      const study = await readStudy(db, actor, studyId);
      if (study === undefined) return [];
      const { sheet } = study;
      const hashes = presentRuns(sheet).flatMap((run) => (run.trace === null ? [] : [run.trace.sha256]));
      const [analysis, traces] = await Promise.all([analyseStudy(db, sheet), drawnTraces(db, hashes)]);
      return [studyRow({ study, analysis, traces, lastEntry: entries.get(studyId), now })];
    }),
  );
  return rows.flat();
}
