import { closeSync, mkdirSync, openSync } from "node:fs";
import path from "node:path";
import SqliteFile from "better-sqlite3";
import {
  CompiledQuery,
  type DatabaseConnection,
  Kysely,
  SqliteDialect,
  SqliteDriver,
  type TransactionSettings,
} from "kysely";
import type { Database } from "./database";

/**
 * Opens the database file, making it and its folder where they are missing. Server, migration, seed and tests all
 * come through here, so all of them write with the same promises: acknowledged means on disk.
 *
 * One connection stands behind the handle: inside a transaction await nothing but that transaction, else every
 * other request waits for it.
 */
export function connect(file: string): Kysely<Database> {
  return new Kysely<Database>({ dialect: new ImmediateSqliteDialect({ database: openFile(file) }) });
}

/** The bare connection with the same settings, for a library that brings its own statements. */
export function openFile(file: string): SqliteFile.Database {
  mkdirSync(path.dirname(path.resolve(/* turbopackIgnore: true */ file)), { recursive: true, mode: 0o700 });
  // Made for the server's user alone where it is missing; SQLite gives its side files the same mode.
  closeSync(openSync(file, "a", 0o600));
  const sqlite = new SqliteFile(file);
  sqlite.pragma("journal_mode = WAL");
  // In WAL the library's default is NORMAL, which may lose acknowledged commits when power fails.
  sqlite.pragma("synchronous = FULL");
  sqlite.pragma("foreign_keys = ON");
  sqlite.pragma("busy_timeout = 5000");
  sqlite.pragma(`journal_size_limit = ${64 * 1024 * 1024}`);
  return sqlite;
}

/**
 * A transaction takes the write lock at its start. A deferred one that reads first and writes later fails with
 * SQLITE_BUSY_SNAPSHOT when another process wrote in between, and no busy timeout ever retries that. One that says
 * `setAccessMode("read only")` takes no lock and sees one state throughout.
 */
class ImmediateSqliteDriver extends SqliteDriver {
  override async beginTransaction(
    connection: DatabaseConnection,
    settings?: TransactionSettings,
  ): Promise<void> {
    const begin = settings?.accessMode === "read only" ? "begin" : "begin immediate";
    await connection.executeQuery(CompiledQuery.raw(begin));
  }
}

class ImmediateSqliteDialect extends SqliteDialect {
  readonly #config: { database: SqliteFile.Database };

  constructor(config: { database: SqliteFile.Database }) {
    super(config);
    this.#config = config;
  }

  override createDriver(): SqliteDriver {
    return new ImmediateSqliteDriver(this.#config);
  }
}
