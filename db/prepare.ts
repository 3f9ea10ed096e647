import { fileURLToPath } from "node:url";
import { connect } from "./connect";
import { databaseFile } from "./database-file";
import { DEMO_EMAIL, makeDemoPeople, makeDemoStudies } from "./demo/make-demo";
import { hasInventedGroup } from "./group/group.queries";
import { migrateToLatest } from "./migrate-to-latest";

export interface Prepared {
  /** The demo sign-in, where there is one; its password only when it was made just now. */
  readonly demo: { readonly email: string; readonly password: string | null } | null;
}

/**
 * Makes the database ready to be served: tables up to date and, if nobody has an account yet and `demo` is true,
 * the demo group with its study.
 */
export async function prepareDatabase(
  file: string,
  options: {
    readonly demo: boolean;
    /** For the people of the demo group if they are made now; random unless tests have to know it. */
    readonly demoPassword?: string | undefined;
  },
): Promise<Prepared> {
  const db = connect(file);
  try {
    await migrateToLatest(db);
    const anybody = await db.selectFrom("account").select("id").limit(1).executeTakeFirst();
    const password =
      anybody === undefined && options.demo ? await makeDemoPeople(db, options.demoPassword) : null;
    if (options.demo) await makeDemoStudies(db);
    return { demo: (await hasInventedGroup(db)) ? { email: DEMO_EMAIL, password } : null };
  } finally {
    await db.destroy();
  }
}

export function demoInWords({ demo }: Prepared): string {
  if (demo === null) return "There is no demo group here.";
  const password = demo.password ?? "as printed when it was made; pnpm seed --new-password makes another";
  return `Demo sign-in: ${demo.email}\nPassword:     ${password}`;
}

// `pnpm dev` runs this file; the server imports it.
if (process.argv[1] === fileURLToPath(import.meta.url)) {
  console.log(demoInWords(await prepareDatabase(databaseFile(), { demo: true })));
}
