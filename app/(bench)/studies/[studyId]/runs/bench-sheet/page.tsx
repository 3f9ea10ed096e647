import type { Metadata } from "next";
import { database } from "@/app/_server/database";
import { openStudy } from "@/app/_server/study";
import { ButtonLink } from "@/app/_ui/button";
import { CheckNote } from "@/app/_ui/check";
import { EmptyState } from "@/app/_ui/empty-state";
import { Margin, MarginSection } from "@/app/_ui/margin";
import { PrintButton } from "@/app/_ui/print-button";
import { Sheet } from "@/app/_ui/sheet";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { dayInWords } from "@/app/_worksheet/words";
import { Cautions } from "../../../_set-up/cautions";
import { setUpFormOf } from "../../../_set-up/set-up-form";
import { BenchOptions } from "./_components/bench-options";
import { BenchPaper } from "./_components/bench-paper";
import { readOptions } from "./options";
import { benchSheetView } from "./view";

interface Props {
  params: Promise<{ studyId: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { sheet } = await openStudy((await params).studyId);
  return { title: `Bench sheet · ${sheet.study.name} · Ratewright` };
}

export default async function BenchSheetPage({ params, searchParams }: Props) {
  const { studyId } = await params;
  const { sheet, revision } = await openStudy(studyId);
  const options = readOptions(await searchParams);
  const view = benchSheetView(sheet, await analyseStudy(database(), sheet), options);
  const mixing = `/studies/${studyId}/runs/mixing`;
  const empty = view.rows.length === 0;
  return (
    <Sheet
      title={view.title}
      lead="Planned runs that add up, their columns in the order of adding. What is written in the blanks is typed in when the traces are stored."
      actions={
        <>
          <ButtonLink href={mixing}>Mixing table</ButtonLink>
          {!empty && <PrintButton kind="primary" />}
        </>
      }
      margin={
        <Margin label="Options">
          <BenchOptions options={options} starters={view.starters} startsId={view.startsId} />
          {view.notes.length > 0 && (
            <MarginSection title="Checks on the session">
              {view.notes.map(({ severity, message }) => (
                <CheckNote key={message} severity={severity} message={message} />
              ))}
            </MarginSection>
          )}
        </Margin>
      }
    >
      {empty ? (
        <EmptyState
          title="Plan a run first"
          actions={<ButtonLink href={mixing}>Open the mixing table</ButtonLink>}
        >
          A run with volumes and without a trace is planned. The sheet for the bench is made of those whose
          volumes add up.
        </EmptyState>
      ) : (
        <BenchPaper
          view={view}
          study={sheet.study.name}
          revision={`Revision ${revision}`}
          printed={`drawn up ${dayInWords(new Date().toISOString())}`}
          cautions={options.cautions ? <Cautions form={setUpFormOf(sheet)} /> : null}
        />
      )}
    </Sheet>
  );
}
