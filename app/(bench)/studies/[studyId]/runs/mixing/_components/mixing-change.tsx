"use client";

import { createContext, type ReactNode, useContext } from "react";
import { useStudyChange } from "../../../../_change/use-study-change";

const Change = createContext<ReturnType<typeof useStudyChange> | null>(null);

/** One history of changes for the whole page, so that Ctrl+Z takes back the last of them and not one of each part. */
export function MixingChange({ studyId, children }: { studyId: string; children: ReactNode }) {
  return <Change value={useStudyChange(studyId, { latestOnly: true })}>{children}</Change>;
}

/** Only under a MixingChange. */
export function useMixingChange() {
  const change = useContext(Change);
  if (change === null) throw new Error("useMixingChange needs a MixingChange above it");
  return change;
}
