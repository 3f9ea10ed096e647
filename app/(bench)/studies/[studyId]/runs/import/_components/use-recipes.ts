"use client";

import { concentrationToMolar } from "kinetics-core/quantities";
import { useCallback, useMemo, useState } from "react";
import type { TracePreview } from "@/app/_import/preview";
import type { SpeciesContext } from "@/app/_import/reading";
import type { GridStep } from "@/app/_ui/grid/grid-shape";
import { parseNumber } from "@/app/_worksheet/typed-number/parse-number";
import { prefilled } from "../view";

/** Typed texts by trace source and species id, over what the file or a planned run gives. */
type Typed = Readonly<Record<string, Readonly<Record<string, string>>>>;

/** Starting concentrations of the traces, as typed in the grid, with undo. Column ids of the grid are species ids. */
export function useRecipes(traces: readonly TracePreview[], species: readonly SpeciesContext[]) {
  const [{ typed }, setHistory] = useState<{
    readonly past: readonly Typed[];
    readonly typed: Typed;
    readonly future: readonly Typed[];
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

  const rows = useMemo(() => traces.map((trace) => rowOf(trace, species, typed)), [traces, species, typed]);
  return { rows, take, undo, redo };
}

export interface RecipeRow {
  readonly trace: TracePreview;
  readonly texts: Readonly<Record<string, string>>;
  readonly faults: Readonly<Record<string, string>>;
  /** mol L⁻¹ by species id, where given and readable. */
  readonly molar: Readonly<Record<string, number>>;
}

function rowOf(trace: TracePreview, species: readonly SpeciesContext[], typed: Typed): RecipeRow {
  const texts: Record<string, string> = {};
  const faults: Record<string, string> = {};
  const molar: Record<string, number> = {};
  for (const one of species) {
    const given = trace.recipe[one.id];
    const before = given === undefined ? "" : prefilled(given.molar, one);
    const text = typed[trace.source]?.[one.id] ?? before;
    texts[one.id] = text;
    if (given !== undefined && text === before) {
      // Untouched: the very number of the file, not one that went through the text of a box.
      molar[one.id] = given.molar;
      continue;
    }
    const reading = parseNumber(text);
    if (reading.status === "not-a-number") faults[one.id] = reading.message;
    else if (reading.status === "number" && reading.value < 0)
      faults[one.id] = "A concentration is not negative.";
    else if (reading.status === "number") molar[one.id] = concentrationToMolar(reading.value, one.unit);
  }
  return { trace, texts, faults, molar };
}
