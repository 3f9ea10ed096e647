import { TraceFigure } from "@/app/_figures/trace-figure";
import type { StudyContext } from "@/app/_import/reading";
import { Button } from "@/app/_ui/button";
import { CheckNote } from "@/app/_ui/check";
import { Margin, MarginSection } from "@/app/_ui/margin";
import type { WaitingFile } from "../import-session";
import { type ReadPreview, shortHash, storedFacts, storeLabel, traceFigure } from "../view";

/** What will be stored, drawn and counted, the button that does it, and what was checked. */
export function StoreMargin({
  reading,
  file,
  studyId,
  signal,
  openRecipes,
  badRecipes,
  busy,
  message,
  onStore,
  onDiscard,
}: {
  reading: ReadPreview;
  file: WaitingFile;
  studyId: string;
  signal: StudyContext["signal"];
  /** Labels of traces without a concentration that the law needs. */
  openRecipes: readonly string[];
  badRecipes: readonly string[];
  busy: "storing" | "reading" | null;
  /** Why storing was refused. */
  message: string | null;
  onStore: () => void;
  onDiscard: () => void;
}) {
  const { traces } = reading;
  const blocking = reading.issues.filter((issue) => issue.severity === "blocks");
  const reason =
    blocking[0] !== undefined
      ? `${blocking.length === 1 ? "A question stands" : `${blocking.length} questions stand`} open: ${blocking[0].place}.`
      : badRecipes.length > 0
        ? `A concentration of ${badRecipes[0]} cannot be read.`
        : null;
  const figure = traceFigure(traces, signal);
  return (
    <Margin label="What will be stored">
      <MarginSection title="What will be stored">
        {figure.traces.length > 0 && (
          <TraceFigure
            view={figure}
            label={`Preview of ${figure.traces.length} traces`}
            width={268}
            height={206}
            interactive={false}
          />
        )}
        <dl className="import-facts">
          {traces.length > 0 &&
            storedFacts(traces).map(({ name, text }) => (
              <div key={name}>
                <dt>{name}</dt>
                <dd>{text}</dd>
              </div>
            ))}
          <div>
            <dt>Raw file</dt>
            <dd>
              <a href={`/api/v1/studies/${studyId}/uploads/${file.uploadId}`} download={file.fileName}>
                byte for byte
              </a>
              , SHA-256 <span title={file.sha256}>{shortHash(file.sha256)}</span>
            </dd>
          </div>
        </dl>
        <p className="hint">
          The traces join the law as soon as they are stored. The message then says what it did to the law and
          takes it back if you want.
        </p>
        <p className="mt-3 flex flex-wrap gap-2">
          <Button kind="primary" onClick={onStore} disabled={reason !== null || busy !== null}>
            {busy === "storing" ? "Storing" : storeLabel(traces.length)}
          </Button>
          <Button onClick={onDiscard} disabled={busy === "storing"}>
            Discard
          </Button>
        </p>
        <div role="status">{reason !== null && <p className="hint">{reason}</p>}</div>
        {message !== null && (
          <div role="alert">
            <CheckNote severity="blocks" message={message} />
          </div>
        )}
      </MarginSection>
      <MarginSection title="Checks before storing">
        {file.storedAs.length > 0 ? (
          <CheckNote
            severity="weakens"
            message={`These very bytes are already stored as ${file.storedAs.length > 4 ? `${file.storedAs[0]} to ${file.storedAs.at(-1)}` : file.storedAs.join(", ")}. Stored again they count as new runs.`}
          />
        ) : (
          <CheckNote severity="holds" message="No file with these bytes is in the study yet." />
        )}
        {!reading.issues.some(({ code }) => code === "falling-time" || code === "repeated-time") && (
          <CheckNote severity="holds" message="Time rises throughout every trace." />
        )}
        {openRecipes.length > 0 && (
          <CheckNote
            severity="weakens"
            message={`Starting concentrations are missing for ${openRecipes.length > 4 ? `${openRecipes.length} runs` : openRecipes.join(", ")}. They can be stored, and stay out of the law until the run sheet has them.`}
          />
        )}
      </MarginSection>
    </Margin>
  );
}
