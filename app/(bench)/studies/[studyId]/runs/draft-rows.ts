import type { GridStep } from "@/app/_ui/grid/grid-shape";
import { type Cells, nextLabel } from "./run-row";
import type { RowEdit } from "./schema";

/**
 * What is typed in the grid and not yet in the sheet, as plain data: texts over the kept ones, and rows that are
 * new. A row leaves the draft once it was kept; a row that is not read stays here, and the law keeps its last good
 * values.
 */
export interface Draft {
  /** By row key (a run's id, or a key of the page's own) and column id. */
  readonly texts: Readonly<Record<string, Readonly<Record<string, string>>>>;
  /** Keys of new rows in order; the last one is blank and waits to be typed into. */
  readonly newKeys: readonly string[];
  readonly nextKey: number;
}

/** What a draft lies over: the rows as they were kept, and how the texts of one are read. */
export interface KeptRowTexts {
  readonly rows: readonly { readonly runId: string; readonly cells: Cells }[];
  /** By column: what is wrong with these texts. */
  readonly faultsOf: (cells: Cells) => Cells;
}

const NEW = "new-";

export const emptyDraft: Draft = { texts: {}, newKeys: [`${NEW}0`], nextKey: 1 };

export interface CellBefore {
  readonly key: string;
  readonly column: string;
  /** Undefined where the kept text showed. */
  readonly text: string | undefined;
}

export interface AppliedStep {
  readonly draft: Draft;
  readonly touched: readonly string[];
  readonly before: readonly CellBefore[];
}

/** One step of the grid laid over the draft. New rows without a label get the next one. */
export function applyStep(draft: Draft, step: GridStep, kept: KeptRowTexts): AppliedStep {
  const texts: Record<string, Record<string, string>> = structuredClone(draft.texts) as Record<
    string,
    Record<string, string>
  >;
  const newKeys = [...draft.newKeys];
  let { nextKey } = draft;
  const before: CellBefore[] = [];
  const touched = new Set<string>();
  const write = (key: string, column: string, text: string) => {
    before.push({ key, column, text: texts[key]?.[column] });
    texts[key] = { ...texts[key], [column]: text };
    touched.add(key);
  };
  const shownNew = newKeys.length;
  for (const change of step.changes) {
    const place = shownNew + change.newRow;
    while (change.rowId === null && newKeys.length <= place) {
      newKeys.push(`${NEW}${nextKey}`);
      nextKey += 1;
    }
    const key = change.rowId ?? newKeys[place];
    if (key !== undefined) write(key, change.columnId, change.text);
  }
  for (const key of newKeys) {
    const row = texts[key];
    if (!touched.has(key) || row === undefined || (row.label ?? "") !== "" || isBlank(row)) continue;
    write(key, "label", nextLabel(labelsOf({ ...draft, texts, newKeys }, kept)));
  }
  const last = newKeys.at(-1);
  if (last === undefined || !isBlank(texts[last] ?? {})) {
    newKeys.push(`${NEW}${nextKey}`);
    nextKey += 1;
  }
  return { draft: { texts, newKeys, nextKey }, touched: [...touched], before };
}

/** Puts texts back to what they were before a step. */
export function restoreCells(draft: Draft, cells: readonly CellBefore[]): Draft {
  const texts: Record<string, Record<string, string>> = structuredClone(draft.texts) as Record<
    string,
    Record<string, string>
  >;
  for (const { key, column, text } of cells.toReversed()) {
    const row = { ...texts[key] };
    if (text === undefined) delete row[column];
    else row[column] = text;
    texts[key] = row;
  }
  return { ...draft, texts };
}

export function withoutRows(draft: Draft, keys: Iterable<string>): Draft {
  const gone = new Set(keys);
  return {
    ...draft,
    texts: Object.fromEntries(Object.entries(draft.texts).filter(([key]) => !gone.has(key))),
    newKeys: draft.newKeys.filter((key) => !gone.has(key)),
  };
}

/** Drops the cells that still hold what was kept; what was typed over them meanwhile stays. */
export function withoutKept(draft: Draft, key: string, kept: Readonly<Record<string, string>>): Draft {
  const left = Object.entries(draft.texts[key] ?? {}).filter(([column, text]) => kept[column] !== text);
  if (left.length === 0) return withoutRows(draft, [key]);
  return { ...draft, texts: { ...draft.texts, [key]: Object.fromEntries(left) } };
}

/** New rows that are runs of the sheet by now: what is still typed in them goes on as an edit of the run. */
export function adoptRows(draft: Draft, runIds: Readonly<Record<string, string>>): Draft {
  return {
    ...draft,
    texts: Object.fromEntries(Object.entries(draft.texts).map(([key, cells]) => [runIds[key] ?? key, cells])),
    newKeys: draft.newKeys.filter((key) => runIds[key] === undefined),
  };
}

/**
 * Keys of the rows in the order in which they are drawn: runs that were there, then all that this page added, by
 * when they were begun. A row stays in its place when it is kept, or what is typed next would land in another one.
 * `runIds` tells what new rows became.
 */
export function rowOrder(
  draft: Draft,
  kept: Pick<KeptRowTexts, "rows">,
  runIds: Readonly<Record<string, string>>,
): readonly { readonly key: string; readonly runId: string | null }[] {
  const begun = new Map(Object.entries(runIds).map(([key, runId]) => [runId, key]));
  const rows = kept.rows.map(({ runId }) => ({ key: begun.get(runId) ?? runId, runId }));
  const added = [
    ...rows.filter(({ runId }) => begun.has(runId)),
    ...draft.newKeys.map((key) => ({ key, runId: null })),
  ];
  const place = ({ key }: { key: string }) => Number(key.slice(NEW.length));
  return [
    ...rows.filter(({ runId }) => !begun.has(runId)),
    ...added.sort((one, other) => place(one) - place(other)),
  ];
}

export function isBlank(cells: Readonly<Record<string, string>>): boolean {
  return Object.values(cells).every((text) => text.trim() === "");
}

/** By row key and column: what stands against keeping a row. A blank new row has no faults and is not kept. */
export function draftFaults(
  draft: Draft,
  kept: KeptRowTexts,
): Readonly<Record<string, Readonly<Record<string, string>>>> {
  const faults: Record<string, Record<string, string>> = {};
  const owners = labelOwners(draft, kept);
  for (const [key, cells] of Object.entries(draft.texts)) {
    const isNew = draft.newKeys.includes(key);
    if (isNew && isBlank(cells)) continue;
    const found = { ...kept.faultsOf(isNew ? { label: "", ...cells } : cells) };
    const label = cells.label?.trim();
    if (label !== undefined && label !== "" && (owners.get(label)?.length ?? 0) > 1) {
      found.label = `Another run is called ${label} already. Give one of them another label.`;
    }
    if (Object.keys(found).length > 0) faults[key] = found;
  }
  return faults;
}

/** The rows among `touched` that can be kept now. */
export function keepableRows(draft: Draft, touched: readonly string[], kept: KeptRowTexts): RowEdit[] {
  const faults = draftFaults(draft, kept);
  return touched.flatMap((key) => {
    const cells = draft.texts[key] ?? {};
    const isNew = draft.newKeys.includes(key);
    if (faults[key] !== undefined || Object.keys(cells).length === 0 || (isNew && isBlank(cells))) return [];
    return [{ key, runId: isNew ? null : key, cells }];
  });
}

function labelsOf(draft: Draft, kept: KeptRowTexts): string[] {
  return [...labelOwners(draft, kept).keys()];
}

function labelOwners(draft: Draft, kept: KeptRowTexts): Map<string, string[]> {
  const owners = new Map<string, string[]>();
  const add = (label: string, key: string) => {
    if (label !== "") owners.set(label, [...(owners.get(label) ?? []), key]);
  };
  for (const row of kept.rows)
    add((draft.texts[row.runId]?.label ?? row.cells.label ?? "").trim(), row.runId);
  for (const key of draft.newKeys) add((draft.texts[key]?.label ?? "").trim(), key);
  return owners;
}
