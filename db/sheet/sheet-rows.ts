import { canonicalJson } from "../canonical-json";
import { type Sheet, sheet as sheetSchema } from "./sheet.schema";

/**
 * The sheet as a flat list of rows, each under a key such as `runs/x7…` or `study/name`. Comparing, merging and
 * undoing are then the same few lines for everything a sheet holds. The row is what two people may not change at
 * once: two different runs are two rows, the same run is a conflict.
 */
export type SheetRows = ReadonlyMap<string, unknown>;

export function rowsOf(sheet: Sheet): SheetRows {
  const rows = new Map<string, unknown>();
  for (const [field, value] of Object.entries(sheet.study)) rows.set(`study/${field}`, value);
  for (const [field, value] of Object.entries(sheet.conditions)) rows.set(`conditions/${field}`, value);
  rows.set("sheet/followedSpeciesId", sheet.followedSpeciesId);
  rows.set("sheet/signal", sheet.signal);
  for (const [id, held] of Object.entries(sheet.orders)) rows.set(`orders/${id}`, held);
  for (const row of sheet.species) rows.set(`species/${row.id}`, row);
  for (const [field, value] of Object.entries(sheet.mixing)) rows.set(`mixing/${field}`, value);
  for (const [field, value] of Object.entries(sheet.calibration)) rows.set(`calibration/${field}`, value);
  for (const row of sheet.stocks) rows.set(`stocks/${row.id}`, row);
  for (const row of sheet.standards) rows.set(`standards/${row.id}`, row);
  for (const row of sheet.scans) rows.set(`scans/${row.id}`, row);
  for (const row of sheet.runs) rows.set(`runs/${row.id}`, row);
  for (const row of sheet.uploads) rows.set(`uploads/${row.id}`, row);
  return rows;
}

/** The sheet that `rows` make; throws where they do not make one, which is a programmer's error. */
export function sheetOf(version: Sheet["version"], rows: SheetRows): Sheet {
  const part = (section: string) =>
    [...rows].flatMap(([key, value]): [string, unknown][] =>
      key.startsWith(`${section}/`) ? [[key.slice(section.length + 1), value]] : [],
    );
  const list = (section: string) => part(section).map(([, value]) => value);
  return inOrder(
    sheetSchema.parse({
      version,
      study: Object.fromEntries(part("study")),
      conditions: Object.fromEntries(part("conditions")),
      ...Object.fromEntries(part("sheet")),
      orders: Object.fromEntries(part("orders")),
      species: list("species"),
      mixing: Object.fromEntries(part("mixing")),
      calibration: Object.fromEntries(part("calibration")),
      stocks: list("stocks"),
      standards: list("standards"),
      scans: list("scans"),
      runs: list("runs"),
      uploads: list("uploads"),
    }),
  );
}

/** Rows by position, uploads by time, ties by id: one order, so that equal sheets have equal hashes. */
export function inOrder(sheet: Sheet): Sheet {
  const byPosition = (a: { position: number; id: string }, b: { position: number; id: string }) =>
    a.position - b.position || byText(a.id, b.id);
  return {
    ...sheet,
    species: [...sheet.species].sort(byPosition),
    stocks: [...sheet.stocks].sort(byPosition),
    standards: [...sheet.standards].sort(byPosition),
    scans: [...sheet.scans].sort(byPosition),
    runs: [...sheet.runs].sort(byPosition),
    uploads: [...sheet.uploads].sort((a, b) => byText(a.at, b.at) || byText(a.id, b.id)),
  };
}

function byText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}

/** Keys of the rows that differ between two sheets. The revision number that a run carries is no difference. */
export function touchedRows(before: SheetRows, after: SheetRows): Set<string> {
  const touched = new Set<string>();
  for (const key of new Set([...before.keys(), ...after.keys()])) {
    if (!sameRow(key, before, after)) touched.add(key);
  }
  return touched;
}

/** Whether the row under `key` has the same contents in both, or is in neither. */
export function sameRow(key: string, a: SheetRows, b: SheetRows): boolean {
  if (a.has(key) !== b.has(key)) return false;
  const one = a.get(key);
  const other = b.get(key);
  return one === other || contents(one) === contents(other);
}

function contents(row: unknown): string {
  if (row !== null && typeof row === "object" && "changedIn" in row) {
    return canonicalJson({ ...row, changedIn: undefined });
  }
  return canonicalJson(row);
}
