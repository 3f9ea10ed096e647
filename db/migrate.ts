import { connect } from "./connect";
import { databaseFile } from "./database-file";
import { migrateToLatest } from "./migrate-to-latest";

const db = connect(databaseFile());
const done = await migrateToLatest(db);
await db.destroy();
console.log(done.length === 0 ? "The tables are up to date." : `Migrated: ${done.join(", ")}.`);
