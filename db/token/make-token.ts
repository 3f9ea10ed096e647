import { parseArgs } from "node:util";
import { listAccounts } from "../account/account.queries";
import { normalEmail } from "../account/create-account";
import { connect } from "../connect";
import { databaseFile } from "../database-file";
import { actorOfMember } from "../member/member.queries";
import { migrateToLatest } from "../migrate-to-latest";
import { createToken } from "./token.commands";
import { tokenScope } from "./token.table";

/** `pnpm run token name@example.org [--scope read|write] [--days 90]`; without an e-mail it lists the accounts. */
const { values, positionals } = parseArgs({
  allowPositionals: true,
  options: {
    scope: { type: "string", default: "write" },
    days: { type: "string", default: "90" },
    name: { type: "string", default: "made on the command line" },
  },
});

const db = connect(databaseFile());
try {
  await migrateToLatest(db);
  process.exitCode = await main(positionals[0]);
} finally {
  await db.destroy();
}

async function main(email: string | undefined): Promise<number> {
  const accounts = await listAccounts(db);
  const account = accounts.find((one) => email !== undefined && one.email === normalEmail(email));
  if (account === undefined) {
    const known = accounts.map((one) => `  ${one.email}  (${one.role}, ${one.groupName})`);
    const head =
      email === undefined
        ? "Say whose token it is: pnpm run token <e-mail>"
        : `No account has the e-mail ${email}.`;
    console.error(
      [head, known.length === 0 ? "There are no accounts yet." : "Accounts:", ...known].join("\n"),
    );
    return email === undefined ? 0 : 2;
  }
  const scope = tokenScope.safeParse(values.scope);
  const days = Number(values.days);
  if (!scope.success || !(days > 0)) {
    console.error("--scope is read or write, --days a number above 0.");
    return 2;
  }
  const actor = await actorOfMember(db, account.memberId);
  if (actor === undefined) throw new Error(`Member ${account.memberId} is listed and cannot be found.`);
  const expiresAt = new Date(Date.now() + days * 24 * 3600 * 1000);
  const { token } = await createToken(db, actor, { name: values.name, scope: scope.data, expiresAt });
  console.error(
    `A token of ${account.email} to ${scope.data}, good until ${expiresAt.toISOString().slice(0, 10)}. It is shown this once:`,
  );
  console.log(token);
  return 0;
}
