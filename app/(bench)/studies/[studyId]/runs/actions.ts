"use server";

import { notFound } from "next/navigation";
import { type ActionResult, done, refused } from "@/app/_server/action-result";
import { memberAction } from "@/app/_server/member-action";
import {
  type ChangedLaw,
  changeWithEffect,
  type LawPreview,
  previewEffect,
} from "@/app/_server/study-change";
import { rateDisplay } from "@/app/_worksheet/display-units";
import { lawSpecies } from "@/app/_worksheet/present-runs";
import { workedOut } from "@/app/_worksheet/worked-out";
import { newIdentifier } from "@/db/identifier";
import { addRuns, removeRuns, restoreRuns, setRunsAside, takeRunsBack } from "@/db/run/run.commands";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { readStudy } from "@/db/study/study.queries";
import { changeRows, type RowsRefusal } from "./change-rows";
import { cellsOf, nextLabel, type RowShape } from "./run-row";
import { previewInput, recipeInput, rowsInput, runsInput, setAsideInput } from "./schema";

/** The law with and without these runs; nothing is written. */
export const previewAside = memberAction(
  previewInput,
  "analyst",
  async ({ db, actor, input }): Promise<ActionResult<LawPreview>> => {
    const asked = new Set(input.runIds);
    const setAside = input.aside
      ? { reason: "asked about", memberId: actor.memberId, at: new Date().toISOString() }
      : null;
    return done(
      await previewEffect(db, actor, input.studyId, (sheet) => ({
        ...sheet,
        runs: sheet.runs.map((run) => (asked.has(run.id) ? { ...run, setAside } : run)),
      })),
    );
  },
);

export const setAside = memberAction(setAsideInput, "analyst", ({ db, actor, input }) =>
  changeWithEffect(db, actor, input.studyId, () =>
    setRunsAside(db, actor, input, input.runIds, input.reason),
  ),
);

export const takeBack = memberAction(runsInput, "analyst", ({ db, actor, input }) =>
  changeWithEffect(db, actor, input.studyId, () => takeRunsBack(db, actor, input, input.runIds)),
);

export const putIntoBin = memberAction(runsInput, "analyst", ({ db, actor, input }) =>
  changeWithEffect(db, actor, input.studyId, () => removeRuns(db, actor, input, input.runIds)),
);

export const restoreFromBin = memberAction(runsInput, "analyst", ({ db, actor, input }) =>
  changeWithEffect(db, actor, input.studyId, () => restoreRuns(db, actor, input, input.runIds, workedOut)),
);

/** Plans a run with another run's recipe. */
export const repeatRecipe = memberAction(recipeInput, "analyst", async ({ db, actor, input }) => {
  const study = (await readStudy(db, actor, input.studyId)) ?? notFound();
  const source = study.sheet.runs.find((run) => run.id === input.runId && run.removedIn === null);
  if (source === undefined)
    return refused("The run whose recipe was wanted is not on the sheet. Load the page again.");
  const label = nextLabel(study.sheet.runs.map((run) => run.label));
  return changeWithEffect(db, actor, input.studyId, () =>
    addRuns(db, actor, input, [
      {
        id: newIdentifier(),
        label,
        concentrations: source.concentrations,
        volumes: source.volumes,
        markMicrolitre: source.markMicrolitre,
        remark: `Repeats ${source.label}`,
      },
    ]),
  );
});

export type KeptRows =
  /** `runIds` by the page's key of each row. */
  | ({ readonly status: "kept"; readonly runIds: Readonly<Record<string, string>> } & ChangedLaw)
  /** Some rows are not read; nothing was kept. By row key and column. */
  | { readonly status: "faults"; readonly faults: RowsRefusal }
  /** Others changed the same rows: their texts as they are now, by run id. */
  | {
      readonly status: "conflict";
      readonly revision: number;
      readonly theirs: Readonly<Record<string, Readonly<Record<string, string>>>>;
    };

/** Keeps edited and new rows together as one revision. */
export const keepRows = memberAction(
  rowsInput,
  "analyst",
  async ({ db, actor, input }): Promise<ActionResult<KeptRows>> => {
    const study = (await readStudy(db, actor, input.studyId)) ?? notFound();
    const shape = shapeOf(study.sheet);
    const runIds = Object.fromEntries(input.rows.map((row) => [row.key, row.runId ?? newIdentifier()]));
    const seen: { faults: RowsRefusal | null; conflict: boolean } = { faults: null, conflict: false };
    const outcome = await changeWithEffect(db, actor, input.studyId, async () => {
      const result = await changeRows(db, actor, input, { rows: input.rows, runIds, shape });
      if ("faults" in result) {
        seen.faults = result.faults;
        return { status: "unchanged" };
      }
      seen.conflict = result.status === "conflict";
      return result;
    });
    if (seen.faults !== null) return done({ status: "faults", faults: seen.faults });
    if (seen.conflict) return done(await conflictOf(db, actor, input));
    return outcome.ok ? done({ status: "kept", runIds, ...outcome.value }) : outcome;
  },
);

function shapeOf(sheet: Sheet): RowShape {
  return { species: lawSpecies(sheet), rateFactor: rateDisplay(sheet).factor };
}

async function conflictOf(
  db: Parameters<typeof readStudy>[0],
  actor: Parameters<typeof readStudy>[1],
  input: { studyId: string; rows: readonly { runId: string | null }[] },
): Promise<Extract<KeptRows, { status: "conflict" }>> {
  const { sheet, revision } = (await readStudy(db, actor, input.studyId)) ?? notFound();
  const shape = shapeOf(sheet);
  const wanted = new Set(input.rows.map(({ runId }) => runId));
  const theirs = sheet.runs.flatMap((run) =>
    wanted.has(run.id) ? [[run.id, cellsOf(run, shape)] as const] : [],
  );
  return { status: "conflict", revision, theirs: Object.fromEntries(theirs) };
}
