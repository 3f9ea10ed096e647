import type { SheetScan } from "../sheet/sheet.schema";
import type { ScanTable } from "./scan.table";

export function scanColumns(studyId: string, scan: SheetScan, revision: number): ScanTable {
  return {
    study_id: studyId,
    id: scan.id,
    label: scan.label,
    position: scan.position,
    species_id: scan.speciesId,
    molar: scan.molar,
    points_sha256: scan.points.sha256,
    points: scan.points.points,
    points_upload_id: scan.points.uploadId,
    points_column: scan.points.column,
    changed_in: revision,
    removed_in: null,
  };
}

/** Unparsed: `readSheet` parses the whole. */
export function scanFromColumns(row: ScanTable) {
  return {
    id: row.id,
    label: row.label,
    position: row.position,
    speciesId: row.species_id,
    molar: row.molar,
    points: {
      sha256: row.points_sha256,
      points: row.points,
      uploadId: row.points_upload_id,
      column: row.points_column,
    },
  };
}
