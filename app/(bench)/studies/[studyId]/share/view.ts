import { dayInWords } from "@/app/_worksheet/words";
import type { ShareLinkLine } from "@/db/share-link/share-link.queries";

/** A link as the list shows it. Times are days in UTC; a link's minute is nobody's business. */
export interface LinkView {
  readonly id: string;
  readonly label: string;
  /** "Live" or "Frozen at revision 12". */
  readonly shows: string;
  readonly made: string;
  readonly closes: string;
  readonly lastRequested: string;
  readonly state: "open" | "expired" | "revoked";
}

export function linkViews(lines: readonly ShareLinkLine[], now: Date): LinkView[] {
  return lines.map((line) => ({
    id: line.id,
    label: line.label === "" ? "No note" : line.label,
    shows: line.frozenRevision === null ? "Live" : `Frozen at revision ${line.frozenRevision}`,
    made: `${dayInWords(line.createdAt)}, ${line.madeBy}`,
    closes: closing(line),
    lastRequested: line.lastRequestedAt === null ? "never" : dayInWords(line.lastRequestedAt),
    state: stateOf(line, now),
  }));
}

function stateOf(line: ShareLinkLine, now: Date): LinkView["state"] {
  if (line.revokedAt !== null) return "revoked";
  return line.expiresAt !== null && new Date(line.expiresAt) <= now ? "expired" : "open";
}

function closing(line: ShareLinkLine): string {
  if (line.revokedAt !== null) return `revoked ${dayInWords(line.revokedAt)}`;
  return line.expiresAt === null ? "when revoked" : dayInWords(line.expiresAt);
}
