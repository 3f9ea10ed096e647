"use client";

import { useCallback, useMemo, useState } from "react";
import type { TracePreview } from "@/app/_import/preview";
import type { SpeciesContext } from "@/app/_import/reading";
import type { GridStep } from "@/app/_ui/grid/grid-shape";
import { recipeRow, type TypedRecipes } from "../recipe-row";

/** Starting concentrations of the traces, as typed in the grid, with undo. Column ids of the grid are species ids. */
export function useRecipes(traces: readonly TracePreview[], species: readonly SpeciesContext[]) {
  const [{ typed }, setHistory] = useState<{
    readonly past: readonly TypedRecipes[];
    readonly typed: TypedRecipes;
    readonly future: readonly TypedRecipes[];
  }>({ past: [], typed: {}, future: [] });

  const take = useCallback((step: GridStep) => {
    setHistory((before) => {
      const next: Record<string, Record<string, string>> = {};
      for (const [source, texts] of Object.entries(before.typed)) next[source] = { ...texts };
      for (const { rowId, columnId, text } of step.changes) {
        if (rowId !== null) next[rowId] = { ...next[rowId], [columnId]: text };
      }
      return { past: [...before.past, before.typed], typed: next, future: [] };
    });
  }, []);
  const undo = useCallback(() => {
    setHistory((before) => {
      const last = before.past.at(-1);
      return last === undefined
        ? before
        : { past: before.past.slice(0, -1), typed: last, future: [before.typed, ...before.future] };
    });
  }, []);
  const redo = useCallback(() => {
    setHistory((before) => {
      const next = before.future[0];
      return next === undefined
        ? before
        : { past: [...before.past, before.typed], typed: next, future: before.future.slice(1) };
    });
  }, []);

  const rows = useMemo(
    () => traces.map((trace) => recipeRow(trace, species, typed)),
    [traces, species, typed],
  );
  return { rows, take, undo, redo };
}
