import type { Metadata } from "next";
import { database } from "@/app/_server/database";
import { openStudy } from "@/app/_server/study";
import { Margin, MarginSection } from "@/app/_ui/margin";
import { SectionTitle, Sheet } from "@/app/_ui/sheet";
import { listShareLinks } from "@/db/share-link/share-link.queries";
import { LinkTable } from "./_components/link-table";
import { NewLink } from "./_components/new-link";
import { linkViews } from "./view";

export const metadata: Metadata = { title: "Share" };

/** Who may read this study without an account: links made, requested, revoked. */
export default async function SharePage({ params }: { params: Promise<{ studyId: string }> }) {
  const { studyId } = await params;
  const { actor, revision, canEdit } = await openStudy(studyId);
  const links = linkViews(await listShareLinks(database(), actor, studyId), new Date());
  const open = links.filter((link) => link.state === "open").length;
  return (
    <Sheet
      title={open === 0 ? "Nobody outside the group can read this study" : openInWords(open)}
      lead="A link shows the law, its evidence, runs and rates, read-only and without an account."
      margin={
        <Margin label="What a link shows">
          <MarginSection title="What a link shows">
            <p>
              The law with its interval, checks, traces, runs with their rates and the reasons for which runs
              were set aside, and both tables to download. No names of people, no comments, no history.
            </p>
          </MarginSection>
          <MarginSection title="Live or frozen">
            <p>
              A live link follows the study. A frozen one keeps showing the revision that stood when it was
              made, whatever is changed later.
            </p>
          </MarginSection>
          <MarginSection title="Last requested">
            <p>Mail scanners follow links too, so a request is not yet a reader.</p>
          </MarginSection>
        </Margin>
      }
    >
      {canEdit ? (
        <NewLink studyId={studyId} revision={revision} />
      ) : (
        <p className="text-ink-2">Leads and analysts make and revoke links.</p>
      )}
      {links.length > 0 && (
        <section className="mt-8">
          <SectionTitle>Links</SectionTitle>
          <LinkTable studyId={studyId} links={links} canRevoke={canEdit} />
        </section>
      )}
    </Sheet>
  );
}

function openInWords(open: number): string {
  return open === 1 ? "One link reads this study" : `${open} links read this study`;
}
