import { Button } from "@/app/_ui/button";
import { megabytes } from "../view";
import type { Sending } from "./use-upload";

/** A file on its way, with how much has arrived and a way to stop. */
export function SendingFile({ sending, onStop }: { sending: Sending; onStop: () => void }) {
  const { fileName, sentBytes, totalBytes } = sending;
  const percent = totalBytes === 0 ? 100 : Math.floor((100 * sentBytes) / totalBytes);
  return (
    <section className="import-file" aria-label="Sending the file">
      <b>{fileName}</b>
      <progress className="import-progress" max={100} value={percent} aria-label={`Sending ${fileName}`} />
      <span role="status">
        {percent < 100 ? `${megabytes(sentBytes)} of ${megabytes(totalBytes)} sent` : "Sent, being kept"}
      </span>
      <Button size="small" onClick={onStop}>
        Stop
      </Button>
    </section>
  );
}

export function ReadingFile({ fileName }: { fileName: string }) {
  return (
    <section className="import-file" aria-label="Reading the file">
      <b>{fileName}</b>
      <progress className="import-progress" aria-label={`Reading ${fileName}`} />
      <span role="status">Reading</span>
    </section>
  );
}
