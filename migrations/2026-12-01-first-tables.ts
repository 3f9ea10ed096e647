import { type Kysely, sql } from "kysely";

/**
 * The first tables. Noun tables (study, species, species_order, run, run_concentration, upload) hold the present;
 * `changed_in` and `removed_in` are revision numbers. Everything is STRICT, so a column holds what it says.
 * Times are ISO 8601 in UTC. Secrets are kept as SHA-256 only, passwords as argon2id.
 */
const tables = [
  `create table research_group (
    id text primary key,
    name text not null,
    invented integer not null check (invented in (0, 1)),
    created_at text not null
  ) strict`,

  `create table account (
    id text primary key,
    email text not null unique,
    name text not null,
    initials text not null,
    password_hash text not null,
    created_at text not null
  ) strict`,

  `create table member (
    id text primary key,
    group_id text not null references research_group (id),
    account_id text not null references account (id),
    role text not null check (role in ('lead', 'analyst', 'reader')),
    joined_at text not null,
    removed_at text,
    unique (group_id, account_id)
  ) strict`,
  "create index member_account on member (account_id)",

  `create table session (
    token_hash text primary key,
    account_id text not null references account (id),
    created_at text not null,
    last_seen_at text not null,
    idle_seconds integer not null,
    expires_at text not null,
    ended_at text
  ) strict`,
  "create index session_account on session (account_id)",

  `create table personal_token (
    id text primary key,
    member_id text not null references member (id),
    name text not null,
    token_hash text not null unique,
    scope text not null check (scope in ('read', 'write')),
    created_at text not null,
    expires_at text,
    last_used_at text,
    revoked_at text
  ) strict`,
  "create index personal_token_member on personal_token (member_id)",

  `create table study (
    id text primary key,
    group_id text not null references research_group (id),
    number integer not null,
    revision integer not null,
    created_at text not null,
    updated_at text not null,
    name text not null,
    invented integer not null check (invented in (0, 1)),
    reaction text not null,
    time_unit text not null,
    hazards text not null,
    followed_species_id text,
    temperature_kelvin real,
    temperature_kelvin_uncertainty real,
    ionic_strength_molar real,
    ionic_strength_molar_uncertainty real,
    path_length_centimetre real,
    path_length_centimetre_uncertainty real,
    wavelength_nanometre real,
    solvent text not null,
    electrolyte text not null,
    signal_kind text check (signal_kind in ('concentration', 'calibrated')),
    signal_quantity text,
    signal_unit text,
    signal_per_molar real,
    signal_per_molar_uncertainty real,
    unique (group_id, number)
  ) strict`,

  `create table species (
    study_id text not null references study (id),
    id text not null,
    symbol text not null,
    name text not null,
    formula text not null,
    stoichiometric_number real not null,
    charge integer not null,
    role text not null,
    in_law integer not null check (in_law in (0, 1)),
    unit text not null,
    position integer not null,
    changed_in integer not null,
    removed_in integer,
    primary key (study_id, id)
  ) strict, without rowid`,

  `create table species_order (
    study_id text not null references study (id),
    species_id text not null,
    held_at real,
    changed_in integer not null,
    removed_in integer,
    primary key (study_id, species_id)
  ) strict, without rowid`,

  `create table run (
    study_id text not null references study (id),
    id text not null,
    label text not null,
    position integer not null,
    temperature_kelvin real,
    block text,
    mixture text,
    trace_sha256 text,
    trace_points integer,
    trace_upload_id text,
    trace_column text,
    entered_rate_molar_per_second real,
    entered_rate_standard_error real,
    time_zero_seconds real not null,
    window_from_seconds real,
    window_to_seconds real,
    set_aside_reason text,
    set_aside_member_id text,
    set_aside_at text,
    remark text not null,
    changed_in integer not null,
    removed_in integer,
    primary key (study_id, id)
  ) strict, without rowid`,
  "create index run_trace on run (trace_sha256)",

  `create table run_concentration (
    study_id text not null,
    run_id text not null,
    species_id text not null,
    molar real not null,
    relative_uncertainty real not null,
    primary key (study_id, run_id, species_id),
    foreign key (study_id, run_id) references run (study_id, id) on delete cascade
  ) strict, without rowid`,

  `create table upload (
    study_id text not null references study (id),
    id text not null,
    sha256 text not null,
    file_name text not null,
    size integer not null,
    at text not null,
    member_id text not null,
    reading text not null,
    changed_in integer not null,
    removed_in integer,
    primary key (study_id, id)
  ) strict, without rowid`,
  "create index upload_sha256 on upload (sha256)",

  // Bytes in parts of at most 1 MiB, so that no insert holds the writer for long. Unnamed until whole.
  `create table blob (
    id integer primary key,
    sha256 text unique,
    state text not null check (state in ('receiving', 'stored')),
    codec text not null check (codec in ('none', 'deflate')),
    size integer not null,
    created_at text not null
  ) strict`,
  `create table blob_part (
    blob_id integer not null references blob (id) on delete cascade,
    n integer not null,
    bytes blob not null check (length(bytes) <= 1048576),
    primary key (blob_id, n)
  ) strict`,

  // A file on its way in: gone once its runs are stored (then it is an upload) or when it is dropped.
  `create table incoming_upload (
    id text primary key,
    study_id text not null references study (id),
    member_id text not null references member (id),
    blob_id integer not null references blob (id),
    file_name text not null,
    state text not null check (state in ('receiving', 'received')),
    size integer not null,
    sha256 text,
    at text not null
  ) strict`,

  // One chain per group. Holds member ids, never names, so a person can be forgotten without breaking it.
  `create table audit_entry (
    group_id text not null references research_group (id),
    number integer not null,
    study_id text references study (id),
    revision integer,
    sheet_hash text,
    member_id text references member (id),
    verb text not null,
    summary text not null,
    at text not null,
    previous_hash text not null,
    hash text not null unique,
    primary key (group_id, number),
    unique (study_id, revision)
  ) strict, without rowid`,

  // The whole sheet at every revision, deflated JSON; who, when and why are its audit entry.
  `create table revision (
    study_id text not null references study (id),
    number integer not null,
    sheet blob not null,
    primary key (study_id, number),
    foreign key (study_id, number) references audit_entry (study_id, revision)
  ) strict`,

  `create table share_link (
    id text primary key,
    study_id text not null references study (id),
    token_hash text not null unique,
    label text not null,
    frozen_revision integer,
    member_id text not null references member (id),
    created_at text not null,
    expires_at text,
    revoked_at text,
    last_requested_at text,
    requests integer not null
  ) strict`,
  "create index share_link_study on share_link (study_id)",

  // What was computed, by the hash of its inputs; may be emptied at any time.
  `create table analysis (
    hash text primary key,
    kind text not null,
    core_version text not null,
    json text not null,
    bytes integer not null,
    last_used_at text not null
  ) strict`,
  "create index analysis_last_used on analysis (last_used_at)",
];

export async function up(db: Kysely<unknown>): Promise<void> {
  for (const statement of tables) await sql.raw(statement).execute(db);
}
