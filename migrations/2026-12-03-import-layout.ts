import { type Kysely, sql } from "kysely";

/** How a group read files of one heading: offered when such a file comes again, never applied by itself. */
const statements = [
  `create table import_layout (
    group_id text not null references research_group (id),
    heading_hash text not null,
    corrections text not null,
    file_name text not null,
    member_id text not null references member (id),
    at text not null,
    primary key (group_id, heading_hash)
  ) strict, without rowid`,
];

export async function up(db: Kysely<unknown>): Promise<void> {
  for (const statement of statements) await sql.raw(statement).execute(db);
}
