import type { Metadata } from "next";
import { database } from "@/app/_server/database";
import { openStudy } from "@/app/_server/study";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { StandardsSheet } from "./_components/standards-sheet";
import { standardsView } from "./view";

export const metadata: Metadata = { title: "Standards" };

/** The calibration line: its standards, what it shows and what it cannot, and whether the signal follows it. */
export default async function StandardsPage({
  params,
  searchParams,
}: {
  params: Promise<{ studyId: string }>;
  searchParams: Promise<{ reading?: string | string[] }>;
}) {
  const { studyId } = await params;
  const { sheet, revision, canEdit } = await openStudy(studyId);
  const analysis = await analyseStudy(database(), sheet);
  const { reading } = await searchParams;
  const typed = typeof reading === "string" ? reading.slice(0, 400) : "";
  return (
    <StandardsSheet
      studyId={studyId}
      revision={revision}
      canEdit={canEdit}
      view={standardsView(sheet, analysis, typed)}
    />
  );
}
