import type { Corrections } from "@/app/_import/corrections";
import { Button } from "@/app/_ui/button";
import { Notice } from "@/app/_ui/notice";
import type { RememberedReading } from "../import-session";

/** A file of this heading was read before, otherwise than the guesses say: offered, never done by itself. */
export function RememberedLayout({
  remembered,
  onUse,
}: {
  remembered: RememberedReading;
  onUse: (layout: Corrections) => void;
}) {
  return (
    <div className="mb-4">
      <Notice
        severity="note"
        title="This heading was read before"
        actions={
          <Button size="small" onClick={() => onUse(remembered.corrections)}>
            Read it the same way
          </Button>
        }
      >
        {remembered.fileName} had the same columns, and what they are was said by hand on{" "}
        <time dateTime={remembered.at}>{remembered.at.slice(0, 10)}</time>.
      </Notice>
    </div>
  );
}
