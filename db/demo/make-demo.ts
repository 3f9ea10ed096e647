import type { Kysely } from "kysely";
import { insertAccount } from "../account/create-account";
import { hashPassword } from "../account/password";
import { randomPassword } from "../account/random-password";
import { setPassword } from "../account/set-password";
import type { Database } from "../database";
import { createGroup } from "../group/create-group";
import { addMember } from "../member/add-member";
import { actorOfMember } from "../member/member.queries";
import type { Role } from "../member/member.table";
import { makeDemoStudy } from "./demo-study";

/** Fictional people of the demo group; `.example` is reserved for documentation (RFC 2606). */
const PEOPLE: readonly { role: Role; initials: string; name: string; email: string }[] = [
  { role: "lead", initials: "LD", name: "Demo lead", email: "ld@demo.example" },
  { role: "analyst", initials: "AN", name: "Demo analyst", email: "an@demo.example" },
  { role: "reader", initials: "RD", name: "Demo reader", email: "rd@demo.example" },
];

export const DEMO_EMAIL = "ld@demo.example";

/** The demo group and its people with one password, all at once. Gives the password, which is not kept. */
export async function makeDemoPeople(db: Kysely<Database>, password = randomPassword()): Promise<string> {
  const passwordHash = await hashPassword(password);
  await db.transaction().execute(async (trx) => {
    const groupId = await createGroup(trx, { name: "Demo group", invented: true });
    for (const { role, ...person } of PEOPLE) {
      const accountId = await insertAccount(trx, person, passwordHash);
      await addMember(trx, { groupId, accountId, role }, null);
    }
  });
  return password;
}

/** The demo study in the demo group, where that has no study yet: also when a first start was cut off before it. */
export async function makeDemoStudies(db: Kysely<Database>): Promise<void> {
  const analyst = await db
    .selectFrom("member")
    .innerJoin("research_group", "research_group.id", "member.group_id")
    .leftJoin("study", "study.group_id", "research_group.id")
    .select("member.id")
    .where("research_group.invented", "=", 1)
    .where("member.role", "=", "analyst")
    .where("study.id", "is", null)
    .executeTakeFirst();
  const actor = analyst === undefined ? undefined : await actorOfMember(db, analyst.id);
  if (actor !== undefined) await makeDemoStudy(db, actor);
}

/** A new random password for everybody in the demo group; undefined where there is none. */
export async function renewDemoPassword(db: Kysely<Database>): Promise<string | undefined> {
  const people = await db
    .selectFrom("member")
    .innerJoin("research_group", "research_group.id", "member.group_id")
    .select("member.account_id")
    .where("research_group.invented", "=", 1)
    .execute();
  if (people.length === 0) return undefined;
  const password = randomPassword();
  for (const { account_id } of people) await setPassword(db, account_id, password);
  return password;
}
