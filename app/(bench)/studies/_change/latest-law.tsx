"use client";

import { createContext, type ReactNode, useContext, useState } from "react";
import type { StandingLawView } from "@/app/_ui/law-view";
import { StandingLaw } from "@/app/_ui/standing-law";

/** The standing law as it was at a revision of the study. */
export interface LawAtRevision {
  readonly revision: number;
  readonly view: StandingLawView;
}

const Latest = createContext<LawAtRevision | null>(null);
const Show = createContext<((law: LawAtRevision) => void) | null>(null);

/**
 * Holds the law that a change brought back, from the moment that its answer arrives: the strip follows at once, while
 * the figures of the station are still on their way.
 */
export function LatestLawRegion({ children }: { children: ReactNode }) {
  const [latest, setLatest] = useState<LawAtRevision | null>(null);
  return (
    <Show value={setLatest}>
      <Latest value={latest}>{children}</Latest>
    </Show>
  );
}

/** Shows the law after a change that was made here. Only under a LatestLawRegion. */
export function useShowLaw(): (law: LawAtRevision) => void {
  const show = useContext(Show);
  if (show === null) throw new Error("useShowLaw needs a LatestLawRegion above it");
  return show;
}

/** The strip: the law that the page was drawn with, or a later one that a change brought since. */
export function LatestStandingLaw({ revision, view }: LawAtRevision) {
  const latest = useContext(Latest);
  return <StandingLaw view={latest !== null && latest.revision > revision ? latest.view : view} />;
}
