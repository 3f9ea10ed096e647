import type { Handle } from "../database";
import type { RunConcentrationTable } from "../run/run.table";
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
  const uploads = await db
    .selectFrom("upload")
    .selectAll()
    .where("study_id", "=", studyId)
    .where("removed_in", "is", null)
    .execute();
  const byRun = groupByRun(concentrations);
  return inOrder(
    sheetSchema.parse({
      version: SHEET_VERSION,
      ...studyFromColumns(study),
      species: species.map(speciesFromColumns),
      orders: Object.fromEntries(orders.map((order) => [order.species_id, order.held_at])),
      runs: runs.map((run) => runFromColumns(run, byRun.get(run.id) ?? [])),
      uploads: uploads.map(uploadFromColumns),
    }),
  );
}

function groupByRun(rows: readonly RunConcentrationTable[]): Map<string, RunConcentrationTable[]> {
  const groups = new Map<string, RunConcentrationTable[]>();
  for (const row of rows) {
    const group = groups.get(row.run_id);
    if (group === undefined) groups.set(row.run_id, [row]);
    else group.push(row);
  }
  return groups;
}
