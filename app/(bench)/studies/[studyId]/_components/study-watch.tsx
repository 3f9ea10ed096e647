"use client";

import { QueryClient, QueryClientProvider, useQuery } from "@tanstack/react-query";
import { useRouter } from "next/navigation";
import { useEffect, useRef, useState } from "react";
import { useToast } from "@/app/_ui/toast";
import type { RevisionNotice } from "../revision-notice";

/** Between two looks at the revision; a hidden window does not look. */
const WATCH_MILLISECONDS = 4000;

interface Watched {
  readonly studyId: string;
  /** The revision that the page shows. */
  readonly revision: number;
}

/** Notices what others change in the study that is open, brings the page up to date and says who did what. */
export function StudyWatch(watched: Watched) {
  const [client] = useState(() => new QueryClient());
  return (
    <QueryClientProvider client={client}>
      <Watch {...watched} />
    </QueryClientProvider>
  );
}

function Watch({ studyId, revision }: Watched) {
  const router = useRouter();
  const toast = useToast();
  const refreshedFor = useRef(revision);
  const { data } = useQuery({
    queryKey: ["revision", studyId],
    queryFn: ({ signal }) => readRevision(studyId, signal),
    refetchInterval: WATCH_MILLISECONDS,
    retry: false,
  });
  useEffect(() => {
    if (data === undefined || data.revision <= Math.max(revision, refreshedFor.current)) return;
    refreshedFor.current = data.revision;
    router.refresh();
    if (!data.mine) toast({ text: `${data.name ?? "The program"} changed this study: ${data.summary}` });
  }, [data, revision, router, toast]);
  return null;
}

async function readRevision(studyId: string, signal: AbortSignal): Promise<RevisionNotice> {
  const response = await fetch(`/studies/${encodeURIComponent(studyId)}/revision`, { signal });
  if (!response.ok) throw new Error(`The server answered ${response.status}.`);
  return response.json();
}
