import { parseArgs } from "node:util";
import { createAccount } from "./account/create-account";
import { randomPassword } from "./account/random-password";
import { connect } from "./connect";
import { databaseFile } from "./database-file";
import { DEMO_EMAIL, renewDemoPassword } from "./demo/make-demo";
import { createGroup } from "./group/create-group";
import { addMember } from "./member/add-member";
import { demoInWords, prepareDatabase } from "./prepare";

/**
 * `pnpm seed`: tables, and the demo group where nobody has an account yet.
 * `pnpm seed --new-password`: a new password for the people of the demo group.
 * `pnpm seed --group "Name" --lead name@example.org`: a real group with its first lead; no demo.
 */
const { values } = parseArgs({
  options: {
    "new-password": { type: "boolean", default: false },
    group: { type: "string" },
    lead: { type: "string" },
  },
});

process.exitCode = await main();

async function main(): Promise<number> {
  if (values.group !== undefined || values.lead !== undefined) {
    if (values.group === undefined || values.lead === undefined || !values.lead.includes("@")) {
      console.error('Say both: pnpm seed --group "Name of the group" --lead name@example.org');
      return 2;
    }
    await prepareDatabase(databaseFile(), { demo: false });
    const password = await makeFirstLead(values.group, values.lead);
    console.log(`Sign-in:  ${values.lead}\nPassword: ${password}`);
    return 0;
  }
  const prepared = await prepareDatabase(databaseFile(), { demo: true });
  if (!values["new-password"] || prepared.demo?.password != null) {
    console.log(demoInWords(prepared));
    return 0;
  }
  const db = connect(databaseFile());
  const password = await renewDemoPassword(db).finally(() => db.destroy());
  if (password === undefined) {
    console.error("There is no demo group here.");
    return 1;
  }
  console.log(demoInWords({ demo: { email: DEMO_EMAIL, password } }));
  return 0;
}

async function makeFirstLead(groupName: string, email: string): Promise<string> {
  const db = connect(databaseFile());
  try {
    const password = randomPassword();
    const name = email.slice(0, email.indexOf("@"));
    const initials = name.slice(0, 2).toUpperCase();
    const accountId = await createAccount(db, { email, name, initials, password });
    await db.transaction().execute(async (trx) => {
      const groupId = await createGroup(trx, { name: groupName, invented: false });
      await addMember(trx, { groupId, accountId, role: "lead" }, null);
    });
    return password;
  } finally {
    await db.destroy();
  }
}
