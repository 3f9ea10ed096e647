import "./load-env-file";
import path from "node:path";

/** Where the database lives: DATABASE_FILE, else data/ratewright.sqlite under the folder the command runs in. */
export function databaseFile(): string {
  const file = process.env.DATABASE_FILE;
  if (file !== undefined && file !== "") return file;
  return path.join(/* turbopackIgnore: true */ process.cwd(), "data", "ratewright.sqlite");
}
