import { redirect } from "next/navigation";
import { openStudy } from "@/app/_server/study";
import { presentRuns } from "@/app/_worksheet/present-runs";
import { stationAddress } from "@/app/_worksheet/station";

/** A study opens where its work is: at the law once there are runs, at the run sheet before. */
export default async function StudyPage({ params }: { params: Promise<{ studyId: string }> }) {
  const { studyId } = await params;
  const { sheet } = await openStudy(studyId);
  redirect(stationAddress(studyId)(presentRuns(sheet).length > 0 ? "rate-law" : "runs"));
}
