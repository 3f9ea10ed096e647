import type { Kysely } from "kysely";
import type { Database } from "../database";
import type { Actor } from "../member/actor";
import { addTraces } from "../run/add-traces";
import { setRunsAside } from "../run/run.commands";
import type { ChangeResult } from "../study/change-study";
import { createStudy } from "../study/create-study";
import { readStudy } from "../study/study.queries";
import { receiveUpload } from "../upload/receive-upload";
import { DEMO_RUNS, demoCsv, demoReadings } from "./alkaline-hydrolysis";
import { demoSetUp } from "./demo-set-up";

/** What pipetting leaves on each starting concentration, one standard uncertainty. */
const PIPETTING = 0.006;

/** Makes the demo study through the same commands that people use, so that its history reads like theirs. */
export async function makeDemoStudy(db: Kysely<Database>, actor: Actor): Promise<string> {
  const { ester, hydroxide, ...setUp } = demoSetUp();
  const made = await createStudy(db, actor, setUp, { invented: true });
  if (made.status !== "created") throw new Error(`The demo study was not created: ${made.status}.`);
  const { studyId } = made;

  const csv = Buffer.from(demoCsv());
  const received = await receiveUpload(
    db,
    actor,
    { studyId, fileName: "alkaline-hydrolysis.csv", declaredBytes: csv.byteLength },
    inOnePiece(csv),
  );
  if (received.status !== "received") throw new Error(`The demo file was not received: ${received.status}.`);

  const readings = new Map(demoReadings().map((run) => [run.label, run]));
  const runs = DEMO_RUNS.map((run, index) => {
    const { timeSeconds = [], absorbance = [] } = readings.get(run.label) ?? {};
    return {
      label: run.label,
      column: `column ${index + 2}, ${run.label}`,
      concentrations: {
        [ester]: { molar: run.esterMolar, relativeUncertainty: PIPETTING },
        [hydroxide]: { molar: run.hydroxideMolar, relativeUncertainty: PIPETTING },
      },
      temperatureKelvin: Math.round((run.celsius + 273.15) * 100) / 100,
      remark: run.remark,
      trace: { timeSeconds: Float64Array.from(timeSeconds), signal: Float64Array.from(absorbance) },
    };
  });
  let base = revisionOf(
    await addTraces(
      db,
      actor,
      { studyId, base: 1 },
      {
        uploadId: received.uploadId,
        reading:
          "Comma between columns, point for decimals, one time column in s, one column of absorbance a run.",
        runs,
      },
    ),
  );
  const ids = new Map((await readStudy(db, actor, studyId))?.sheet.runs.map((run) => [run.label, run.id]));
  for (const run of DEMO_RUNS) {
    const id = ids.get(run.label);
    if (run.setAside === null || id === undefined) continue;
    base = revisionOf(await setRunsAside(db, actor, { studyId, base }, [id], run.setAside));
  }
  return studyId;
}

function revisionOf(result: ChangeResult): number {
  if (result.status !== "changed") throw new Error(`The demo study could not be changed: ${result.status}.`);
  return result.revision;
}

async function* inOnePiece(bytes: Uint8Array): AsyncGenerator<Uint8Array> {
  yield bytes;
}
