import type { Migration } from "kysely";
import * as firstTables from "./2026-12-01-first-tables";
import * as preparation from "./2026-12-02-preparation";
import * as importLayout from "./2026-12-03-import-layout";

/** All migrations by name, oldest first. Forward only: a mistake is mended by the next one. */
export const migrations: Readonly<Record<string, Migration>> = {
  "2026-12-01-first-tables": firstTables,
  "2026-12-02-preparation": preparation,
  "2026-12-03-import-layout": importLayout,
};
