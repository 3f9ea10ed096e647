import { parseArgs } from "node:util";
import { connect } from "../connect";
import { databaseFile } from "../database-file";
import { verifyChainOfGroup } from "./chain-verdict";

/** `pnpm audit:verify [--head <hash>]`: checks the chain of every group and prints its head. */
const { values } = parseArgs({ options: { head: { type: "string" } } });

const db = connect(databaseFile());
try {
  const groups = await db.selectFrom("research_group").select(["id", "name"]).orderBy("name").execute();
  let broken = 0;
  let headFound = false;
  for (const group of groups) {
    const verdict = await verifyChainOfGroup(db, group.id);
    if (verdict.status === "broken") {
      broken++;
      console.log(`${group.name}: BROKEN at entry ${verdict.entry}. ${verdict.message}`);
      continue;
    }
    console.log(`${group.name}: ${verdict.entries} entries hold. Head ${verdict.head}`);
    if (values.head !== undefined) {
      headFound ||= (await verifyChainOfGroup(db, group.id, values.head)).status === "holds";
    }
  }
  if (values.head !== undefined) {
    console.log(
      headFound
        ? "The head you gave is part of a chain that holds."
        : "No chain here holds the head you gave.",
    );
  }
  process.exitCode = broken > 0 || (values.head !== undefined && !headFound) ? 1 : 0;
} finally {
  await db.destroy();
}
