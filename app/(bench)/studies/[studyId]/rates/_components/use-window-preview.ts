"use client";

import type { InitialRate, ProposedSpikes } from "kinetics-core/initial-rate";
import { useCallback, useEffect, useRef, useState } from "react";
import { type OpenTrace, openTrace } from "@/app/_workers/fit-client";
import type { TraceOfRun } from "../view";

/** Bounds in seconds, both of them times of readings. */
export interface WindowSeconds {
  readonly fromSeconds: number;
  readonly toSeconds: number;
}

/**
 * The estimate on a window that is not saved yet. The trace is fetched and handed to a worker with the first look;
 * while one estimate is made, only the newest wish waits.
 */
export function useWindowPreview(address: string, trace: TraceOfRun | null) {
  const options = trace?.options;
  const counts = trace?.counts;
  const [estimate, setEstimate] = useState<InitialRate | null>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const opened = useRef<Promise<OpenTrace> | null>(null);
  const newest = useRef<WindowSeconds | null>(null);
  const busy = useRef(false);

  useEffect(
    () => () => {
      const closing = opened.current;
      opened.current = null;
      newest.current = null;
      closing?.then((one) => one.close()).catch(() => undefined);
    },
    [],
  );

  const preview = useCallback(
    async (window: WindowSeconds) => {
      newest.current = window;
      if (busy.current || counts === undefined) return;
      busy.current = true;
      try {
        opened.current ??= fetchTrace(address);
        const worker = await opened.current;
        while (newest.current !== null) {
          const { fromSeconds, toSeconds } = newest.current;
          newest.current = null;
          setEstimate(await worker.estimate(counts, { ...options, window: [fromSeconds, toSeconds] }));
          setProblem(null);
        }
      } catch {
        opened.current = null;
        setProblem("The preview could not be made. The window can be saved all the same.");
      } finally {
        busy.current = false;
      }
    },
    [address, options, counts],
  );

  /** Readings that stand off their neighbours; null where they could not be looked at. */
  const lookForSpikes = useCallback(async (): Promise<ProposedSpikes | null> => {
    if (counts === undefined) return null;
    try {
      opened.current ??= fetchTrace(address);
      return await (await opened.current).lookForSpikes(counts);
    } catch {
      opened.current = null;
      return null;
    }
  }, [address, counts]);

  const clear = useCallback(() => {
    newest.current = null;
    setEstimate(null);
  }, []);

  return { estimate, problem, preview, lookForSpikes, clear };
}

async function fetchTrace(address: string): Promise<OpenTrace> {
  const response = await fetch(address);
  if (!response.ok) throw new Error(`The server answered ${response.status}.`);
  const both = new Float64Array(await response.arrayBuffer());
  const readings = both.length / 2;
  return openTrace(both.slice(0, readings), both.slice(readings));
}
