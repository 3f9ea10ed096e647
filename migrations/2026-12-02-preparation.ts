import { type Kysely, sql } from "kysely";

/**
 * Preparation: stocks and volumes, standards and scans, and what a run says about its trace beside time zero. What was
 * there before keeps its meaning: no volumes, no dead time, nothing trimmed or marked, totals not made up to a mark.
 */
const statements = [
  "alter table study add column activation_energy real",
  "alter table study add column activation_energy_uncertainty real",
  "alter table study add column reference_ionic_strength_molar real",
  "alter table study add column sample_interval_seconds real",
  "alter table study add column signal_blank real",
  "alter table study add column signal_blank_uncertainty real",
  "alter table study add column signal_source text check (signal_source in ('typed', 'standards'))",
  "update study set signal_source = 'typed' where signal_kind = 'calibrated'",
  "alter table study add column mixing_volume_unit text not null default 'uL'",
  "alter table study add column mixing_mark_microlitre real",
  "alter table study add column mixing_deliveries text not null default '[]'",
  "alter table study add column calibration_species_id text",
  "alter table study add column calibration_intercept text not null default 'fitted'",
  "alter table study add column calibration_weighting text not null default 'none'",
  "alter table study add column calibration_range_low_molar real",
  "alter table study add column calibration_range_high_molar real",
  "alter table study add column calibration_stock_relative real not null default 0",

  "alter table run add column mark_microlitre real",
  "alter table run add column dead_time_seconds real not null default 0",
  "alter table run add column trim_from_seconds real",
  "alter table run add column trim_to_seconds real",
  "alter table run add column spikes text not null default '[]'",
  "alter table run add column end_signal real",
  "alter table run add column end_signal_uncertainty real",

  `create table run_volume (
    study_id text not null,
    run_id text not null,
    stock_id text not null,
    microlitre real not null,
    primary key (study_id, run_id, stock_id),
    foreign key (study_id, run_id) references run (study_id, id) on delete cascade
  ) strict, without rowid`,

  `create table stock (
    study_id text not null references study (id),
    id text not null,
    symbol text not null,
    name text not null,
    position integer not null,
    from_stock_id text,
    taken_microlitre real,
    taken_microlitre_uncertainty real,
    mark_microlitre real,
    mark_microlitre_uncertainty real,
    lot text not null,
    made_on text not null,
    how_known text not null,
    changed_in integer not null,
    removed_in integer,
    primary key (study_id, id)
  ) strict, without rowid`,

  `create table stock_content (
    study_id text not null,
    stock_id text not null,
    species_id text not null,
    molar real not null,
    molar_uncertainty real not null,
    primary key (study_id, stock_id, species_id),
    foreign key (study_id, stock_id) references stock (study_id, id) on delete cascade
  ) strict, without rowid`,

  `create table standard (
    study_id text not null references study (id),
    id text not null,
    label text not null,
    position integer not null,
    molar real not null,
    molar_uncertainty real not null,
    signals text not null,
    is_blank integer not null check (is_blank in (0, 1)),
    set_aside_reason text,
    set_aside_member_id text,
    set_aside_at text,
    remark text not null,
    changed_in integer not null,
    removed_in integer,
    primary key (study_id, id)
  ) strict, without rowid`,

  `create table scan (
    study_id text not null references study (id),
    id text not null,
    label text not null,
    position integer not null,
    species_id text,
    molar real,
    points_sha256 text not null,
    points integer not null,
    points_upload_id text,
    points_column text not null,
    changed_in integer not null,
    removed_in integer,
    primary key (study_id, id)
  ) strict, without rowid`,
  "create index scan_points on scan (points_sha256)",
];

export async function up(db: Kysely<unknown>): Promise<void> {
  for (const statement of statements) await sql.raw(statement).execute(db);
}
