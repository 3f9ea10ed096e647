import type { Metadata } from "next";
import { database } from "@/app/_server/database";
import { openStudy } from "@/app/_server/study";
import { ButtonLink } from "@/app/_ui/button";
import { CheckNote } from "@/app/_ui/check";
import { EmptyState } from "@/app/_ui/empty-state";
import { Margin, MarginSection } from "@/app/_ui/margin";
import { Sheet } from "@/app/_ui/sheet";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { GridKeys } from "../_components/grid-keys";
import { Dispensing } from "./_components/dispensing";
import { MixingChange } from "./_components/mixing-change";
import { MixingGrid } from "./_components/mixing-grid";
import { StockTable } from "./_components/stock-table";
import { mixingGridView } from "./mixing-grid.view";
import { mixingView } from "./view";

interface Props {
  params: Promise<{ studyId: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { sheet } = await openStudy((await params).studyId);
  return { title: `Mixing table · ${sheet.study.name} · Ratewright` };
}

export default async function MixingPage({ params }: Props) {
  const { studyId } = await params;
  const { sheet, revision, canEdit } = await openStudy(studyId);
  const analysis = await analyseStudy(database(), sheet);
  const grid = mixingGridView(sheet, analysis);
  const view = mixingView(sheet, analysis, grid);
  return (
    <MixingChange studyId={studyId}>
      <Sheet
        title={view.title}
        lead="Volumes in, concentrations after mixing out, ± one standard uncertainty. Shaded columns are worked out."
        actions={
          <>
            <ButtonLink href={`/studies/${studyId}/runs`}>Traces</ButtonLink>
            <ButtonLink href={`/studies/${studyId}/runs/bench-sheet`}>Bench sheet</ButtonLink>
          </>
        }
        margin={
          <Margin label="Checks">
            <MarginSection title="Checks on the mixtures">
              {view.notes.length === 0 && (
                <p className="text-ink-2">None yet: they come with the first mixtures.</p>
              )}
              {view.notes.map((note) => (
                <CheckNote key={note.message} severity={note.severity} message={note.message} />
              ))}
            </MarginSection>
            <Dispensing
              studyId={studyId}
              revision={revision}
              facts={view.volumes}
              form={view.dispensing}
              canEdit={canEdit}
            />
            {canEdit && view.stocks.length > 0 && <GridKeys />}
          </Margin>
        }
      >
        {view.stocks.length === 0 && (
          <div className="mb-4">
            <EmptyState title="Enter what the runs are mixed from">
              A stock has a concentration with its uncertainty; water or a buffer is a stock without solutes.
              The table of volumes then gives every run its concentrations and its ionic strength.
            </EmptyState>
          </div>
        )}
        <StockTable
          studyId={studyId}
          revision={revision}
          stocks={view.stocks}
          species={view.species}
          volumeUnit={view.volumeUnit}
          sharedNote={view.sharedNote}
          canEdit={canEdit}
        />
        {view.stocks.length > 0 && (
          <div className="mt-6">
            <MixingGrid studyId={studyId} revision={revision} view={grid} canEdit={canEdit} />
          </div>
        )}
      </Sheet>
    </MixingChange>
  );
}
