import type { Metadata } from "next";
import { database } from "@/app/_server/database";
import { openStudy } from "@/app/_server/study";
import { CheckNote } from "@/app/_ui/check";
import { MarginSection } from "@/app/_ui/margin";
import { Prose } from "@/app/_ui/prose";
import { Unit } from "@/app/_ui/unit";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { setUpFormOf } from "../../_set-up/set-up-form";
import { SetUpSheet } from "./_components/set-up-sheet";
import { setUpTitle, unitLines } from "./view";

interface Props {
  params: Promise<{ studyId: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { sheet } = await openStudy((await params).studyId);
  return { title: `Set-up · ${sheet.study.name} · Ratewright` };
}

export default async function SetUpPage({ params }: Props) {
  const { studyId } = await params;
  const { sheet, revision, canEdit } = await openStudy(studyId);
  const analysis = await analyseStudy(database(), sheet);
  const checks = analysis.checks.filter((check) => check.station === "set-up");
  return (
    <SetUpSheet
      studyId={studyId}
      revision={revision}
      canEdit={canEdit}
      title={setUpTitle(sheet)}
      kept={setUpFormOf(sheet)}
      followsStandards={sheet.signal?.kind === "calibrated" && sheet.signal.source === "standards"}
      margin={
        <>
          {checks.length > 0 && (
            <MarginSection title="Checks on the set-up">
              {checks.map((check) => (
                <CheckNote
                  key={`${check.code} ${check.message}`}
                  severity={check.severity}
                  message={check.message}
                  settled={check.settled}
                />
              ))}
            </MarginSection>
          )}
          <MarginSection title="Units of this study">
            <dl className="fact-list">
              {unitLines(sheet, analysis).map(({ of, unit }) => (
                <div key={of} className="contents">
                  <dt>
                    <Prose text={of} />
                  </dt>
                  <dd>
                    <Unit text={unit} />
                  </dd>
                </div>
              ))}
            </dl>
          </MarginSection>
        </>
      }
    />
  );
}
