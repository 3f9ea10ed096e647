import type { Transaction } from "kysely";
import type { Database } from "../database";
import { scanColumns } from "../scan/scan.columns";
import { standardColumns } from "../standard/standard.columns";
import { stockColumns, stockContentColumns } from "../stock/stock.columns";
import { runColumns, speciesColumns, studyColumns, uploadColumns } from "./sheet.columns";
import type { Sheet } from "./sheet.schema";
import { rowsOf, touchedRows } from "./sheet-rows";

/** Rows per statement: SQLite takes 32 766 parameters, a run has 29. */
const ROWS_PER_STATEMENT = 500;

/**
 * Makes the noun tables show `sheet` as of `revision`. Only rows that differ from `previous` are written; without
 * `previous` all are. The study's row exists already.
 */
export async function writeSheet(
  trx: Transaction<Database>,
  target: { studyId: string; revision: number; at: string },
  sheet: Sheet,
  previous?: Sheet,
): Promise<void> {
  const { studyId, revision, at } = target;
  const touched = touchedRows(previous === undefined ? new Map() : rowsOf(previous), rowsOf(sheet));
  await trx
    .updateTable("study")
    .set({ ...studyColumns(sheet), revision, updated_at: at })
    .where("id", "=", studyId)
    .execute();
  await writeSpecies(trx, target, sheet, touched);
  await writeOrders(trx, target, sheet, touched);
  await writeStocks(trx, target, sheet, touched);
  await writeStandards(trx, target, sheet, touched);
  await writeScans(trx, target, sheet, touched);
  await writeRuns(trx, studyId, sheet, touched);
  await writeUploads(trx, target, sheet, touched);
}

async function writeSpecies(
  trx: Transaction<Database>,
  { studyId, revision }: { studyId: string; revision: number },
  sheet: Sheet,
  touched: ReadonlySet<string>,
) {
  const ids = touchedIds(touched, "species");
  const rows = sheet.species.filter((species) => ids.has(species.id));
  // A species that left the sheet keeps its row, so that what runs held of it stays readable.
  await inChunks([...ids], (chunk) =>
    trx
      .updateTable("species")
      .set({ changed_in: revision, removed_in: revision })
      .where("study_id", "=", studyId)
      .where("id", "in", chunk)
      .execute(),
  );
  await inChunks(rows, (chunk) =>
    trx
      .replaceInto("species")
      .values(chunk.map((species) => speciesColumns(studyId, species, revision)))
      .execute(),
  );
}

async function writeOrders(
  trx: Transaction<Database>,
  { studyId, revision }: { studyId: string; revision: number },
  sheet: Sheet,
  touched: ReadonlySet<string>,
) {
  const ids = touchedIds(touched, "orders");
  await inChunks([...ids], (chunk) =>
    trx
      .updateTable("species_order")
      .set({ changed_in: revision, removed_in: revision })
      .where("study_id", "=", studyId)
      .where("species_id", "in", chunk)
      .execute(),
  );
  const rows = Object.entries(sheet.orders)
    .filter(([id]) => ids.has(id))
    .map(([species_id, held_at]) => ({
      study_id: studyId,
      species_id,
      held_at,
      changed_in: revision,
      removed_in: null,
    }));
  await inChunks(rows, (chunk) => trx.replaceInto("species_order").values(chunk).execute());
}

async function writeRuns(
  trx: Transaction<Database>,
  studyId: string,
  sheet: Sheet,
  touched: ReadonlySet<string>,
) {
  const ids = touchedIds(touched, "runs");
  const rows = sheet.runs.filter((run) => ids.has(run.id));
  // Concentrations go with their run (cascade) and come back with it.
  await inChunks([...ids], (chunk) =>
    trx.deleteFrom("run").where("study_id", "=", studyId).where("id", "in", chunk).execute(),
  );
  await inChunks(rows, (chunk) =>
    trx
      .insertInto("run")
      .values(chunk.map((run) => runColumns(studyId, run)))
      .execute(),
  );
  const concentrations = rows.flatMap((run) =>
    Object.entries(run.concentrations).map(([species_id, of]) => ({
      study_id: studyId,
      run_id: run.id,
      species_id,
      molar: of.molar,
      relative_uncertainty: of.relativeUncertainty,
    })),
  );
  await inChunks(concentrations, (chunk) => trx.insertInto("run_concentration").values(chunk).execute());
  const volumes = rows.flatMap((run) =>
    Object.entries(run.volumes).map(([stock_id, microlitre]) => ({
      study_id: studyId,
      run_id: run.id,
      stock_id,
      microlitre,
    })),
  );
  await inChunks(volumes, (chunk) => trx.insertInto("run_volume").values(chunk).execute());
}

/** A stock, a standard or a scan that leaves the sheet keeps its row, marked, like a species. */
async function leave(
  trx: Transaction<Database>,
  table: "stock" | "standard" | "scan",
  { studyId, revision }: { studyId: string; revision: number },
  ids: ReadonlySet<string>,
) {
  await inChunks([...ids], (chunk) =>
    trx
      .updateTable(table)
      .set({ changed_in: revision, removed_in: revision })
      .where("study_id", "=", studyId)
      .where("id", "in", chunk)
      .execute(),
  );
}

async function writeStocks(
  trx: Transaction<Database>,
  target: { studyId: string; revision: number },
  sheet: Sheet,
  touched: ReadonlySet<string>,
) {
  const ids = touchedIds(touched, "stocks");
  const rows = sheet.stocks.filter((stock) => ids.has(stock.id));
  await leave(trx, "stock", target, ids);
  // Contents go with the row that is replaced (cascade) and come back with it.
  await inChunks(rows, (chunk) =>
    trx
      .replaceInto("stock")
      .values(chunk.map((stock) => stockColumns(target.studyId, stock, target.revision)))
      .execute(),
  );
  await inChunks(
    rows.flatMap((stock) => stockContentColumns(target.studyId, stock)),
    (chunk) => trx.insertInto("stock_content").values(chunk).execute(),
  );
}

async function writeStandards(
  trx: Transaction<Database>,
  target: { studyId: string; revision: number },
  sheet: Sheet,
  touched: ReadonlySet<string>,
) {
  const ids = touchedIds(touched, "standards");
  await leave(trx, "standard", target, ids);
  await inChunks(
    sheet.standards.filter((standard) => ids.has(standard.id)),
    (chunk) =>
      trx
        .replaceInto("standard")
        .values(chunk.map((standard) => standardColumns(target.studyId, standard, target.revision)))
        .execute(),
  );
}

async function writeScans(
  trx: Transaction<Database>,
  target: { studyId: string; revision: number },
  sheet: Sheet,
  touched: ReadonlySet<string>,
) {
  const ids = touchedIds(touched, "scans");
  await leave(trx, "scan", target, ids);
  await inChunks(
    sheet.scans.filter((scan) => ids.has(scan.id)),
    (chunk) =>
      trx
        .replaceInto("scan")
        .values(chunk.map((scan) => scanColumns(target.studyId, scan, target.revision)))
        .execute(),
  );
}

async function writeUploads(
  trx: Transaction<Database>,
  { studyId, revision }: { studyId: string; revision: number },
  sheet: Sheet,
  touched: ReadonlySet<string>,
) {
  const ids = touchedIds(touched, "uploads");
  const rows = sheet.uploads.filter((upload) => ids.has(upload.id));
  await inChunks([...ids], (chunk) =>
    trx
      .updateTable("upload")
      .set({ changed_in: revision, removed_in: revision })
      .where("study_id", "=", studyId)
      .where("id", "in", chunk)
      .execute(),
  );
  await inChunks(rows, (chunk) =>
    trx
      .replaceInto("upload")
      .values(chunk.map((upload) => uploadColumns(studyId, upload, revision)))
      .execute(),
  );
}

function touchedIds(touched: ReadonlySet<string>, section: string): Set<string> {
  const prefix = `${section}/`;
  return new Set([...touched].filter((key) => key.startsWith(prefix)).map((key) => key.slice(prefix.length)));
}

async function inChunks<T>(rows: readonly T[], write: (chunk: T[]) => Promise<unknown>): Promise<void> {
  for (let start = 0; start < rows.length; start += ROWS_PER_STATEMENT) {
    await write(rows.slice(start, start + ROWS_PER_STATEMENT));
  }
}
