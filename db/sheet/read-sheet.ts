import type { Handle } from "../database";
import { scanFromColumns } from "../scan/scan.columns";
import { standardFromColumns } from "../standard/standard.columns";
import { stockFromColumns } from "../stock/stock.columns";
import { runFromColumns, speciesFromColumns, studyFromColumns, uploadFromColumns } from "./sheet.columns";
import { SHEET_VERSION, type Sheet, sheet as sheetSchema } from "./sheet.schema";
import { inOrder } from "./sheet-rows";

/**
 * The present sheet of a study, parsed; undefined where there is none. Decides nothing about who may see it:
 * `readStudy`, `changeStudy` and `openShareLink` have done so before they come here.
 */
export async function readSheet(db: Handle, studyId: string): Promise<Sheet | undefined> {
  const study = await db.selectFrom("study").selectAll().where("id", "=", studyId).executeTakeFirst();
  if (study === undefined) return undefined;
  const species = await db
    .selectFrom("species")
    .selectAll()
    .where("study_id", "=", studyId)
    .where("removed_in", "is", null)
    .execute();
  const orders = await db
    .selectFrom("species_order")
    .selectAll()
    .where("study_id", "=", studyId)
    .where("removed_in", "is", null)
    .execute();
  // The bin is part of the sheet: runs keep their row and say in which revision they were removed.
  const runs = await db.selectFrom("run").selectAll().where("study_id", "=", studyId).execute();
  const concentrations = await db
    .selectFrom("run_concentration")
    .selectAll()
    .where("study_id", "=", studyId)
    .execute();
  const volumes = await db.selectFrom("run_volume").selectAll().where("study_id", "=", studyId).execute();
  const stocks = await db
    .selectFrom("stock")
    .selectAll()
    .where("study_id", "=", studyId)
    .where("removed_in", "is", null)
    .execute();
  const contents = await db.selectFrom("stock_content").selectAll().where("study_id", "=", studyId).execute();
  const standards = await db
    .selectFrom("standard")
    .selectAll()
    .where("study_id", "=", studyId)
    .where("removed_in", "is", null)
    .execute();
  const scans = await db
    .selectFrom("scan")
    .selectAll()
    .where("study_id", "=", studyId)
    .where("removed_in", "is", null)
    .execute();
  const uploads = await db
    .selectFrom("upload")
    .selectAll()
    .where("study_id", "=", studyId)
    .where("removed_in", "is", null)
    .execute();
  const concentrationsOf = groupedBy(concentrations, (row) => row.run_id);
  const volumesOf = groupedBy(volumes, (row) => row.run_id);
  const contentsOf = groupedBy(contents, (row) => row.stock_id);
  return inOrder(
    sheetSchema.parse({
      version: SHEET_VERSION,
      ...studyFromColumns(study),
      species: species.map(speciesFromColumns),
      orders: Object.fromEntries(orders.map((order) => [order.species_id, order.held_at])),
      stocks: stocks.map((stock) => stockFromColumns(stock, contentsOf.get(stock.id) ?? [])),
      standards: standards.map(standardFromColumns),
      scans: scans.map(scanFromColumns),
      runs: runs.map((run) =>
        runFromColumns(run, concentrationsOf.get(run.id) ?? [], volumesOf.get(run.id) ?? []),
      ),
      uploads: uploads.map(uploadFromColumns),
    }),
  );
}

function groupedBy<Row>(rows: readonly Row[], keyOf: (row: Row) => string): Map<string, Row[]> {
  const groups = new Map<string, Row[]>();
  for (const row of rows) {
    const group = groups.get(keyOf(row));
    if (group === undefined) groups.set(keyOf(row), [row]);
    else group.push(row);
  }
  return groups;
}
