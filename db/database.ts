import type { Kysely } from "kysely";
import type { AccountTable } from "./account/account.table";
import type { AnalysisTable } from "./analysis/analysis.table";
import type { AuditEntryTable } from "./audit/audit.table";
import type { BlobPartTable, BlobTable } from "./blob/blob.table";
import type { ResearchGroupTable } from "./group/group.table";
import type { ImportLayoutTable } from "./import-layout/import-layout.table";
import type { MemberTable } from "./member/member.table";
import type { RevisionTable } from "./revision/revision.table";
import type { RunConcentrationTable, RunTable, RunVolumeTable } from "./run/run.table";
import type { ScanTable } from "./scan/scan.table";
import type { SessionTable } from "./session/session.table";
import type { ShareLinkTable } from "./share-link/share-link.table";
import type { SpeciesOrderTable, SpeciesTable } from "./species/species.table";
import type { StandardTable } from "./standard/standard.table";
import type { StockContentTable, StockTable } from "./stock/stock.table";
import type { StudyTable } from "./study/study.table";
import type { PersonalTokenTable } from "./token/token.table";
import type { IncomingUploadTable, UploadTable } from "./upload/upload.table";

/** Every table by name. The columns are defined in each noun's folder, once, as the schema that parses its rows. */
export interface Database {
  account: AccountTable;
  analysis: AnalysisTable;
  audit_entry: AuditEntryTable;
  blob: BlobTable;
  blob_part: BlobPartTable;
  import_layout: ImportLayoutTable;
  incoming_upload: IncomingUploadTable;
  member: MemberTable;
  personal_token: PersonalTokenTable;
  research_group: ResearchGroupTable;
  revision: RevisionTable;
  run: RunTable;
  run_concentration: RunConcentrationTable;
  run_volume: RunVolumeTable;
  scan: ScanTable;
  session: SessionTable;
  share_link: ShareLinkTable;
  species: SpeciesTable;
  species_order: SpeciesOrderTable;
  standard: StandardTable;
  stock: StockTable;
  stock_content: StockContentTable;
  study: StudyTable;
  upload: UploadTable;
}

/** A database handle or a transaction on one. */
export type Handle = Kysely<Database>;
