"use client";

import { useRouter } from "next/navigation";
import { useCallback, useEffect, useMemo, useState, useTransition } from "react";
import type { SpeciesContext, StudyContext } from "@/app/_import/reading";
import { Button } from "@/app/_ui/button";
import { Notice } from "@/app/_ui/notice";
import { Sheet } from "@/app/_ui/sheet";
import { useStudyChange } from "../../../../_change/use-study-change";
import { storeTraces } from "../actions";
import type { WaitingFile } from "../import-session";
import { headline, megabytes } from "../view";
import { ChooseFile } from "./choose-file";
import { FileTable } from "./file-table";
import { IssueList } from "./issue-list";
import { LayoutBar } from "./layout-bar";
import { RecipeGrid } from "./recipe-grid";
import { RememberedLayout } from "./remembered-layout";
import { StoreMargin } from "./store-margin";
import { useDroppedFile } from "./use-dropped-file";
import { usePreview } from "./use-preview";
import { useRecipes } from "./use-recipes";
import { useUpload } from "./use-upload";
import { ReadingFile, SendingFile } from "./waiting";

const NO_TRACES: never[] = [];

/** The whole of an import on one page: choose, look, correct, store. Nothing is stored before the last step. */
export function ImportWorkbench({
  studyId,
  waitingUploadId,
  species,
  signal,
}: {
  studyId: string;
  waitingUploadId: string | null;
  species: readonly SpeciesContext[];
  signal: StudyContext["signal"];
}) {
  const router = useRouter();
  const { announce } = useStudyChange(studyId);
  const upload = useUpload(studyId);
  const [uploadId, setUploadId] = useState(waitingUploadId);
  const [refusal, setRefusal] = useState<string | null>(null);
  const [storing, startStoring] = useTransition();
  const [storeRefusal, setStoreRefusal] = useState<string | null>(null);
  const preview = usePreview(studyId, uploadId);
  const { state, change } = preview;

  const answer = state.status === "shown" ? state.answer : state.status === "none" ? null : state.earlier;
  const reading = answer?.reading.status === "read" ? answer.reading : null;
  const recipes = useRecipes(reading?.traces ?? NO_TRACES, species);

  const forget = useCallback(() => {
    setUploadId(null);
    preview.forget();
    window.history.replaceState(null, "", `/studies/${studyId}/runs/import`);
  }, [preview.forget, studyId]);

  const drop = useCallback(
    (id: string) =>
      fetch(`/api/v1/studies/${studyId}/uploads/${id}`, { method: "DELETE" }).catch(() => undefined),
    [studyId],
  );

  const refusedReading =
    state.status === "shown" && state.answer.reading.status === "refused" ? state.answer.reading : null;
  const isCorrected = Object.keys(preview.corrections).length > 0;
  // What cannot be read at all does not wait either: its sentence stays, its bytes go.
  useEffect(() => {
    if (refusedReading === null || isCorrected || uploadId === null) return;
    setRefusal(refusedReading.message);
    void drop(uploadId);
    forget();
  }, [refusedReading, isCorrected, uploadId, drop, forget]);
  /** A correction made the file unreadable; the file is kept and the correction can be taken back. */
  const misled = refusedReading !== null && isCorrected ? refusedReading.message : null;

  async function send(content: Blob, fileName: string) {
    setRefusal(null);
    setStoreRefusal(null);
    if (uploadId !== null) void drop(uploadId);
    forget();
    const sent = await upload.send(content, fileName);
    if (sent === null) return;
    if (!sent.ok) {
      setRefusal(sent.message);
      return;
    }
    const file: WaitingFile = sent.value;
    setUploadId(file.uploadId);
    // A reload finds the waiting file again.
    window.history.replaceState(null, "", `?upload=${file.uploadId}`);
  }

  useDroppedFile((file) => {
    if (upload.sending === null && !storing) void send(file, file.name);
  });

  async function discard() {
    setStoreRefusal(null);
    if (uploadId !== null) await drop(uploadId);
    forget();
  }

  function store() {
    if (answer === null || reading === null) return;
    setStoreRefusal(null);
    startStoring(async () => {
      const result = await storeTraces({
        studyId,
        uploadId: answer.file.uploadId,
        base: answer.revision,
        // The labels that were seen are the labels that are stored, whatever others add meanwhile.
        corrections: {
          ...preview.corrections,
          labels: Object.fromEntries(reading.traces.map((trace) => [trace.source, trace.label])),
        },
        recipes: Object.fromEntries(recipes.rows.map((row) => [row.trace.source, row.molar])),
      });
      if (!result.ok) {
        setStoreRefusal(result.message);
        return;
      }
      announce(result.value);
      router.push(`/studies/${studyId}/runs`);
    });
  }

  const openRecipes = useMemo(
    () =>
      recipes.rows
        .filter((row) => species.some((one) => row.molar[one.id] === undefined))
        .map((row) => row.trace.label),
    [recipes.rows, species],
  );
  const badRecipes = recipes.rows
    .filter((row) => Object.keys(row.faults).length > 0)
    .map((row) => row.trace.label);

  const failure = refusal ?? misled ?? (state.status === "failed" ? state.message : null);
  const choosing =
    reading === null && misled === null && upload.sending === null && state.status !== "reading";

  return (
    <Sheet
      title={reading === null ? "Import traces" : headline(reading)}
      lead="Nothing is stored until you say so. Every guess of the reader can be corrected first."
      margin={
        reading !== null && answer !== null ? (
          <StoreMargin
            reading={reading}
            file={answer.file}
            studyId={studyId}
            signal={signal}
            openRecipes={openRecipes}
            badRecipes={badRecipes}
            busy={storing ? "storing" : state.status === "reading" ? "reading" : null}
            message={storeRefusal}
            onStore={store}
            onDiscard={() => void discard()}
          />
        ) : undefined
      }
    >
      {failure !== null && (
        <div className="mb-5">
          <Notice
            severity="blocks"
            title="Not read"
            actions={
              misled === null ? undefined : (
                <Button onClick={preview.forget}>Read the file without corrections</Button>
              )
            }
          >
            {failure}
          </Notice>
        </div>
      )}
      {upload.sending !== null && <SendingFile sending={upload.sending} onStop={upload.stop} />}
      {state.status === "reading" && answer === null && <ReadingFile fileName="The file" />}
      {choosing && (
        <ChooseFile
          onFile={(file) => void send(file, file.name)}
          onPaste={(text) => void send(new Blob([text], { type: "text/plain" }), "pasted cells.txt")}
        />
      )}
      {reading !== null && answer !== null && (
        <div aria-busy={state.status === "reading"}>
          <div className="import-file">
            <b>{answer.file.fileName}</b>
            <span>
              {megabytes(answer.file.size)}, {reading.lines} lines
            </span>
            <span role="status" className="sr-only">
              {state.status === "reading" ? "Reading again" : headline(reading)}
            </span>
            <Button size="small" className="ml-auto" onClick={() => void discard()}>
              Choose another file
            </Button>
          </div>
          {answer.remembered !== null && (
            <RememberedLayout remembered={answer.remembered} onUse={preview.readAs} />
          )}
          <LayoutBar reading={reading} signal={signal} change={change} />
          <FileTable reading={reading} species={species} change={change} />
          <IssueList issues={reading.issues} change={change} />
          {recipes.rows.length > 0 && (
            <RecipeGrid
              rows={recipes.rows}
              species={species}
              change={change}
              onStep={recipes.take}
              onUndo={recipes.undo}
              onRedo={recipes.redo}
            />
          )}
        </div>
      )}
    </Sheet>
  );
}
