import type { Kysely } from "kysely";
import { createAccount } from "../account/create-account";
import type { Database } from "../database";
import { createGroup } from "../group/create-group";
import type { Actor } from "../member/actor";
import { addMember } from "../member/add-member";
import { actorOfMember } from "../member/member.queries";

export const TEST_PASSWORD = "a password for tests";

export interface TestGroup {
  readonly groupId: string;
  readonly lead: Actor;
  readonly analyst: Actor;
  readonly reader: Actor;
}

/** A group with one member in each role: lead@, analyst@ and reader@ `domain`, all with `TEST_PASSWORD`. */
export async function makeGroup(db: Kysely<Database>, domain = "group.example"): Promise<TestGroup> {
  const groupId = await db
    .transaction()
    .execute((trx) => createGroup(trx, { name: `Group of ${domain}`, invented: false }));
  const join = async (role: Actor["role"], initials: string): Promise<Actor> => {
    const accountId = await createAccount(db, {
      email: `${role}@${domain}`,
      name: `The ${role} of ${domain}`,
      initials,
      password: TEST_PASSWORD,
    });
    const memberId = await db
      .transaction()
      .execute((trx) => addMember(trx, { groupId, accountId, role }, null));
    const actor = await actorOfMember(db, memberId);
    if (actor === undefined) throw new Error("a member who just joined is there");
    return actor;
  };
  return {
    groupId,
    lead: await join("lead", "LD"),
    analyst: await join("analyst", "AN"),
    reader: await join("reader", "RD"),
  };
}
