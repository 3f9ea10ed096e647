import type { ReactNode } from "react";
import { Prose } from "./prose";

export type CheckSeverity = "blocks" | "weakens" | "note" | "holds";

const TONE = { blocks: "text-stop", weakens: "text-warn", note: "text-note", holds: "text-ok" } as const;
const WORD = { blocks: "Blocks", weakens: "Weakens", note: "Note", holds: "Holds" } as const;
const SETTLED_WORD = {
  blocks: "Settled, blocked",
  weakens: "Settled, weakened",
  note: "Settled, noted",
  holds: "Holds",
} as const;

/** The mark alone, 14 px: octagon blocks, triangle weakens, ring notes, tick holds. Takes the colour of its text. */
export function SeverityShape({ severity, size = 14 }: { severity: CheckSeverity; size?: number }) {
  return (
    <svg width={size} height={size} viewBox="0 0 14 14" aria-hidden="true" className="flex-none">
      {severity === "blocks" && (
        <>
          <path d="M4.2.8h5.6l3.4 3.4v5.6l-3.4 3.4H4.2L.8 9.8V4.2z" fill="currentColor" />
          <path d="M4 7h6" stroke="var(--sheet)" strokeWidth="2" />
        </>
      )}
      {severity === "weakens" && (
        <>
          <path
            d="M7 .9 13.6 13H.4z"
            fill="none"
            stroke="currentColor"
            strokeWidth="1.5"
            strokeLinejoin="round"
          />
          <path d="M7 5v4M7 10.4v1.2" stroke="currentColor" strokeWidth="1.6" />
        </>
      )}
      {severity === "note" && (
        <>
          <circle cx="7" cy="7" r="6" fill="none" stroke="currentColor" strokeWidth="1.4" />
          <path d="M7 6v4.4M7 3.4v1.4" stroke="currentColor" strokeWidth="1.6" />
        </>
      )}
      {severity === "holds" && (
        <path d="M1.5 7.5 5.3 11.4 12.6 2.8" fill="none" stroke="currentColor" strokeWidth="1.9" />
      )}
    </svg>
  );
}

/** Shape and word of a severity; `children` replaces the word ("Standing", "Row 212 is not a number"). */
export function SeverityMark({
  severity,
  settled = false,
  children,
}: {
  severity: CheckSeverity;
  settled?: boolean;
  children?: ReactNode;
}) {
  return (
    <span className={`severity ${settled ? "text-ink-3" : TONE[severity]}`}>
      <SeverityShape severity={severity} />
      {children ?? (settled ? SETTLED_WORD[severity] : WORD[severity])}
    </span>
  );
}

/**
 * A check of the margin. `message` and `settled` are prose; a settled check turns grey and `settled` says who
 * answered it and why. `actions` holds links or text buttons.
 */
export function CheckNote({
  severity,
  message,
  settled = null,
  actions,
}: {
  severity: CheckSeverity;
  message: string;
  settled?: string | null;
  actions?: ReactNode;
}) {
  return (
    <div className="check">
      <SeverityMark severity={severity} settled={settled !== null} />
      <p className="mt-0.5 text-ink">
        <Prose text={message} />
        {settled !== null && (
          <>
            {" "}
            <Prose text={settled} />
          </>
        )}
      </p>
      {actions !== undefined && <div className="mt-1 flex flex-wrap gap-x-3 text-caption">{actions}</div>}
    </div>
  );
}
