import type { z } from "zod";
import {
  type Sheet,
  sheetRun,
  sheetScan,
  sheet as sheetSchema,
  sheetSpecies,
  sheetStandard,
  sheetStock,
  sheetUpload,
} from "./sheet.schema";
import { inOrder } from "./sheet-rows";

/**
 * `current` with the rows named in `touched` (keys of `rowsOf`) as they are in `wanted`. Those rows are parsed, the
 * others are the very same objects as before, so that comparing and writing afterwards cost what was changed and
 * not what the study holds. Throws where a touched row does not fit the schema: a programmer's error.
 */
export function mergeSheets(current: Sheet, wanted: Sheet, touched: ReadonlySet<string>): Sheet {
  const { shape } = sheetSchema;
  return inOrder({
    version: current.version,
    study: shape.study.parse(mergedFields("study", current.study, wanted.study, touched)),
    conditions: shape.conditions.parse(
      mergedFields("conditions", current.conditions, wanted.conditions, touched),
    ),
    followedSpeciesId: shape.followedSpeciesId.parse(
      (touched.has("sheet/followedSpeciesId") ? wanted : current).followedSpeciesId,
    ),
    signal: shape.signal.parse((touched.has("sheet/signal") ? wanted : current).signal),
    orders: shape.orders.parse(mergedFields("orders", current.orders, wanted.orders, touched)),
    species: mergedRows("species", sheetSpecies, current.species, wanted.species, touched),
    mixing: shape.mixing.parse(mergedFields("mixing", current.mixing, wanted.mixing, touched)),
    calibration: shape.calibration.parse(
      mergedFields("calibration", current.calibration, wanted.calibration, touched),
    ),
    stocks: mergedRows("stocks", sheetStock, current.stocks, wanted.stocks, touched),
    standards: mergedRows("standards", sheetStandard, current.standards, wanted.standards, touched),
    scans: mergedRows("scans", sheetScan, current.scans, wanted.scans, touched),
    runs: mergedRows("runs", sheetRun, current.runs, wanted.runs, touched),
    uploads: mergedRows("uploads", sheetUpload, current.uploads, wanted.uploads, touched),
  });
}

function mergedFields(
  section: string,
  current: Readonly<Record<string, unknown>>,
  wanted: Readonly<Record<string, unknown>>,
  touched: ReadonlySet<string>,
): Record<string, unknown> {
  const isTouched = ([field]: [string, unknown]) => touched.has(`${section}/${field}`);
  return Object.fromEntries([
    ...Object.entries(current).filter((entry) => !isTouched(entry)),
    ...Object.entries(wanted).filter(isTouched),
  ]);
}

function mergedRows<T extends { id: string }>(
  section: string,
  schema: z.ZodType<T>,
  current: readonly T[],
  wanted: readonly T[],
  touched: ReadonlySet<string>,
): T[] {
  const isTouched = (row: T) => touched.has(`${section}/${row.id}`);
  return [
    ...current.filter((row) => !isTouched(row)),
    ...wanted.filter(isTouched).map((row) => schema.parse(row)),
  ];
}
