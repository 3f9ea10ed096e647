import { describe, expect, it } from "vitest";
import type { ShareLinkLine } from "@/db/share-link/share-link.queries";
import { linkViews } from "./view";

const LINE: ShareLinkLine = {
  id: "l1",
  label: "for the partner laboratory",
  frozenRevision: null,
  createdAt: "2026-03-14T10:42:00.000Z",
  expiresAt: "2026-06-30T10:42:00.000Z",
  revokedAt: null,
  lastRequestedAt: null,
  requests: 0,
  madeBy: "AN",
};

const stateAt = (line: ShareLinkLine, now: string) => linkViews([line], new Date(now))[0]?.state;

describe("the list of links", () => {
  it("says what a link shows, who made it and when it closes", () => {
    expect(linkViews([LINE], new Date("2026-03-15T00:00:00Z"))).toEqual([
      {
        id: "l1",
        label: "for the partner laboratory",
        shows: "Live",
        made: "14 March 2026, AN",
        closes: "30 June 2026",
        lastRequested: "never",
        state: "open",
      },
    ]);
  });

  it("closes a link at its moment, not after it", () => {
    expect(stateAt(LINE, "2026-06-30T10:41:59.999Z")).toBe("open");
    expect(stateAt(LINE, "2026-06-30T10:42:00.000Z")).toBe("expired");
  });

  it("calls a revoked link revoked, expired or not", () => {
    const revoked = { ...LINE, revokedAt: "2026-04-01T08:00:00.000Z" };
    expect(stateAt(revoked, "2026-12-01T00:00:00Z")).toBe("revoked");
    expect(linkViews([revoked], new Date("2026-12-01T00:00:00Z"))[0]?.closes).toBe("revoked 1 April 2026");
  });
});
