import type { ReactNode } from "react";
import { database } from "@/app/_server/database";
import { openStudy } from "@/app/_server/study";
import { ButtonLink } from "@/app/_ui/button";
import { InventedBanner } from "@/app/_ui/invented-banner";
import { StationRail } from "@/app/_ui/station-rail";
import { ToastRegion } from "@/app/_ui/toast";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { standingLawView } from "@/app/_worksheet/standing-law.view";
import { stationAddress } from "@/app/_worksheet/station";
import { stationRailView } from "@/app/_worksheet/station-rail.view";
import { BenchHead } from "@/app/(bench)/bench-head";
import { LatestLawRegion, LatestStandingLaw } from "../_change/latest-law";
import { StudyWatch } from "./_components/study-watch";

/** The frame of every station: where you are, the standing law, the rail. Access is decided here and in each page. */
export default async function StudyLayout({
  params,
  children,
}: {
  params: Promise<{ studyId: string }>;
  children: ReactNode;
}) {
  const { studyId } = await params;
  const { sheet, study, revision } = await openStudy(studyId);
  const analysis = await analyseStudy(database(), sheet);
  const hrefOf = stationAddress(studyId);
  return (
    <LatestLawRegion>
      <ToastRegion>
        <BenchHead
          trail={[{ name: "Studies", href: "/studies" }, { name: sheet.study.name }]}
          actions={
            <ButtonLink size="small" href={`/studies/${studyId}/share`}>
              Share
            </ButtonLink>
          }
          aside={`Revision ${revision}, saved ${study.updatedAt.slice(0, 16).replace("T", " ")} UTC`}
        />
        {sheet.study.invented && <InventedBanner />}
        <LatestStandingLaw revision={revision} view={standingLawView(sheet, analysis, hrefOf)} />
        <StationRail stations={stationRailView(sheet, analysis, hrefOf)} />
        {children}
        <StudyWatch studyId={studyId} revision={revision} />
      </ToastRegion>
    </LatestLawRegion>
  );
}
