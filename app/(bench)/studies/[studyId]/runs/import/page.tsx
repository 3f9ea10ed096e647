import type { Metadata } from "next";
import { studyContext } from "@/app/_import/study-context";
import { openStudy } from "@/app/_server/study";
import { ButtonLink } from "@/app/_ui/button";
import { Notice } from "@/app/_ui/notice";
import { Sheet } from "@/app/_ui/sheet";
import { ImportWorkbench } from "./_components/import-workbench";
import "./import.css";

export const metadata: Metadata = { title: "Import traces" };

/** A file or a paste becomes traces of runs. `?upload=` names a file that waits already, so that a reload loses nothing. */
export default async function ImportPage({
  params,
  searchParams,
}: {
  params: Promise<{ studyId: string }>;
  searchParams: Promise<{ upload?: string | string[] }>;
}) {
  const { studyId } = await params;
  const { upload } = await searchParams;
  const { sheet, canEdit } = await openStudy(studyId);
  if (!canEdit) {
    return (
      <Sheet title="Import traces">
        <Notice
          severity="note"
          title="Only analysts and leads import traces"
          actions={<ButtonLink href={`/studies/${studyId}/runs`}>Back to the runs</ButtonLink>}
        >
          Your role in this group is reader. Ask an analyst or a lead of the group to import the file.
        </Notice>
      </Sheet>
    );
  }
  const { species, signal } = studyContext(sheet);
  return (
    <ImportWorkbench
      studyId={studyId}
      waitingUploadId={typeof upload === "string" ? upload : null}
      species={species}
      signal={signal}
    />
  );
}
