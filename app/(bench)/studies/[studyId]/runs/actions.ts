"use server";

import { notFound } from "next/navigation";
import { type ActionResult, done, refused } from "@/app/_server/action-result";
import { memberAction } from "@/app/_server/member-action";
import { changeWithEffect, type LawPreview, previewEffect } from "@/app/_server/study-change";
import { rateDisplay } from "@/app/_worksheet/display-units";
import { lawSpecies } from "@/app/_worksheet/present-runs";
import { workedOut } from "@/app/_worksheet/worked-out";
import { newIdentifier } from "@/db/identifier";
import { addRuns, removeRuns, restoreRuns, setRunsAside, takeRunsBack } from "@/db/run/run.commands";
import { stockedSpecies } from "@/db/sheet/mixed-run";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { readStudy } from "@/db/study/study.queries";
import { keptRows } from "./kept-rows";
import { cellsOf, newRunOf, nextLabel, type RowShape, readCells } from "./run-row";
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

/** Keeps edited and new rows together as one revision. */
export const keepRows = memberAction(rowsInput, "analyst", ({ db, actor, input }) =>
  keptRows(db, actor, input, (sheet) => {
    const shape = shapeOf(sheet);
    return {
      edit: (cells, before) => readCells(cells, before, shape),
      make: (row, id) => newRunOf(row, id, shape),
      cellsOf: (run) => cellsOf(run, shape),
    };
  }),
);

function shapeOf(sheet: Sheet): RowShape {
  return {
    species: lawSpecies(sheet),
    rateFactor: rateDisplay(sheet).factor,
    stocked: [...stockedSpecies(sheet.stocks)],
  };
}
