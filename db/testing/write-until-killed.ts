import { connect } from "../connect";
import { actorOfMember } from "../member/member.queries";
import { addRuns } from "../run/run.commands";
import { exampleRun } from "./make-study";

/**
 * A writer for the test that kills it: adds runs to a study one after another and says on standard output which
 * revision it was told had been kept. Arguments: database file, member id, study id, a prefix for labels.
 */
const [file = "", memberId = "", studyId = "", prefix = ""] = process.argv.slice(2);
const db = connect(file);
const actor = await actorOfMember(db, memberId);
if (actor === undefined) throw new Error("the member is there");

for (let count = 0; ; count++) {
  const study = await db
    .selectFrom("study")
    .select("revision")
    .where("id", "=", studyId)
    .executeTakeFirstOrThrow();
  const run = exampleRun(`${prefix}-${count}`);
  const result = await addRuns(db, actor, { studyId, base: study.revision }, [run]);
  if (result.status !== "changed") throw new Error(JSON.stringify(result));
  process.stdout.write(`${run.label} ${result.revision}\n`);
}
