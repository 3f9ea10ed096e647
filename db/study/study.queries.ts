import { z } from "zod";
import { flag, moment } from "../column";
import type { Handle } from "../database";
import type { Actor } from "../member/actor";
import { readSheet } from "../sheet/read-sheet";
import type { Sheet } from "../sheet/sheet.schema";

export interface OpenStudy {
  readonly studyId: string;
  /** Counts within the group. */
  readonly number: number;
  readonly groupId: string;
  /** The latest revision, which `sheet` is. */
  readonly revision: number;
  readonly sheet: Sheet;
  readonly updatedAt: string;
}

/** A study of the actor's group with its present sheet; undefined for an outsider or where there is none. */
export async function readStudy(db: Handle, actor: Actor, studyId: string): Promise<OpenStudy | undefined> {
  // Revision and sheet come from several statements: a transaction keeps a change from falling between them.
  if (!db.isTransaction) {
    return db
      .transaction()
      .setAccessMode("read only")
      .execute((trx) => readStudy(trx, actor, studyId));
  }
  const row = await db
    .selectFrom("study")
    .select(["number", "group_id", "revision", "updated_at"])
    .where("id", "=", studyId)
    .where("group_id", "=", actor.groupId)
    .executeTakeFirst();
  const sheet = row === undefined ? undefined : await readSheet(db, studyId);
  if (row === undefined || sheet === undefined) return undefined;
  return {
    studyId,
    number: row.number,
    groupId: row.group_id,
    revision: row.revision,
    sheet,
    updatedAt: moment.parse(row.updated_at),
  };
}

const studySummary = z.object({
  studyId: z.string(),
  number: z.number(),
  name: z.string(),
  invented: flag.transform((value) => value === 1),
  reaction: z.string(),
  revision: z.number(),
  updatedAt: moment,
  temperatureKelvin: z.number().nullable(),
  ionicStrengthMolar: z.number().nullable(),
  wavelengthNanometre: z.number().nullable(),
  signalQuantity: z.string().nullable(),
  /** Runs that are neither in the bin nor set aside, and those set aside. */
  runs: z.number(),
  setAside: z.number(),
});

export type StudySummary = z.infer<typeof studySummary>;

/** The studies of the actor's group, newest number first. */
export async function listStudies(db: Handle, actor: Actor): Promise<StudySummary[]> {
  const rows = await db
    .selectFrom("study")
    .select((eb) => [
      "study.id as studyId",
      "study.number",
      "study.name",
      "study.invented",
      "study.reaction",
      "study.revision",
      "study.updated_at as updatedAt",
      "study.temperature_kelvin as temperatureKelvin",
      "study.ionic_strength_molar as ionicStrengthMolar",
      "study.wavelength_nanometre as wavelengthNanometre",
      "study.signal_quantity as signalQuantity",
      eb
        .selectFrom("run")
        .select((of) => of.fn.countAll<number>().as("n"))
        .whereRef("run.study_id", "=", "study.id")
        .where("run.removed_in", "is", null)
        .where("run.set_aside_at", "is", null)
        .as("runs"),
      eb
        .selectFrom("run")
        .select((of) => of.fn.countAll<number>().as("n"))
        .whereRef("run.study_id", "=", "study.id")
        .where("run.removed_in", "is", null)
        .where("run.set_aside_at", "is not", null)
        .as("setAside"),
    ])
    .where("study.group_id", "=", actor.groupId)
    .orderBy("study.number", "desc")
    .execute();
  return rows.map((row) => studySummary.parse(row));
}
